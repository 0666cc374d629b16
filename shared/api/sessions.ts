import type { Role } from './common';

/** POST /sessions */
export interface SignInRequest { email: string; password: string }

export interface MembershipView { schoolId: string; schoolName: string; roles: Role[] }

/** Answer of POST /sessions and POST /sessions/refresh; the refresh token travels in a cookie only. */
export interface SessionView {
  accessToken: string;
  expiresAt: string;
  account: { id: string; name: string; email: string };
  memberships: MembershipView[];
}

/** GET /me */
export interface MeView {
  account: { id: string; name: string; email: string };
  memberships: MembershipView[];
}

/** POST /password-resets (always 202) */
export interface PasswordResetRequest { email: string }
/** POST /password-resets/:token */
export interface NewPasswordRequest { password: string }
