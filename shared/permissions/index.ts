export { isPermission, isRole, may } from './may';
export { permissions, roles, type Permission, type Role } from './permissions';
