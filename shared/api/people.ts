import type { Role } from './common';

/** GET /people (admin) */
export interface PersonView { id: string; name: string; email: string; roles: Role[]; since: string }
/** GET /people/invitations (admin): those still open */
export interface InvitationView { id: string; email: string; name: string; roles: Role[]; createdAt: string; expiresAt: string }
/** POST /people/invitations (admin) */
export interface InviteRequest { email: string; name?: string; roles: Role[] }
/** PATCH /people/:accountId (admin) */
export interface ChangeRolesRequest { roles: Role[] }

/** GET /invitations/:token (public) */
export interface InvitationOffer { schoolName: string; email: string; name: string; roles: Role[] }
/** POST /invitations/:token/acceptance (public); somebody who has an account proves it with its password */
export interface AcceptInvitationRequest { name: string; password: string }
