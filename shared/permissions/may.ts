import { permissions, roles, type Permission, type Role } from './permissions';

/** True when any of `held` is allowed `permission`; false for no role at all. */
export function may(held: readonly Role[], permission: Permission): boolean {
  const allowed: readonly Role[] = permissions[permission];
  return held.some((role) => allowed.includes(role));
}

/** True when `text` is the key of a permission. */
export function isPermission(text: string): text is Permission {
  return Object.hasOwn(permissions, text);
}

/** True when `text` names a role. */
export function isRole(text: unknown): text is Role {
  return roles.some((role) => role === text);
}
