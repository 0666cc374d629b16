export { RequireRole, RequireSession } from './guards';
export { homeFor, phoneTabsFor, placesFor } from './places';
export { PublicShell } from './PublicShell';
export { SchoolShell } from './SchoolShell';
