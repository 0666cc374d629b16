import type { Role } from '@shared/api/common';
import type { To } from '@/components/ui/Link';

export type PlaceId = 'borrow' | 'scan' | 'loans' | 'bench' | 'kits' | 'instruments' | 'desk' | 'labels' | 'people' | 'money' | 'settings';

export interface Place {
  id: PlaceId;
  to: To;
  label: string;
  roles: readonly Role[];
}

/** Every place of the signed-in app that a tab may lead to. A place that has no route yet does not stand here. */
export const places: Readonly<Record<PlaceId, Place>> = {
  desk: { id: 'desk', to: '/desk', label: 'Desk', roles: ['admin'] },
  bench: { id: 'bench', to: '/bench', label: 'Bench', roles: ['instructor', 'admin'] },
  borrow: { id: 'borrow', to: '/borrow', label: 'Borrow', roles: ['student'] },
  scan: { id: 'scan', to: '/scan', label: 'Scan', roles: ['student', 'instructor', 'admin'] },
  kits: { id: 'kits', to: '/kits', label: 'Kits', roles: ['instructor', 'admin'] },
  loans: { id: 'loans', to: '/loans', label: 'My loans', roles: ['student'] },
  instruments: { id: 'instruments', to: '/instruments', label: 'Instruments', roles: ['instructor', 'admin'] },
  labels: { id: 'labels', to: '/labels', label: 'Labels', roles: ['instructor', 'admin'] },
  people: { id: 'people', to: '/people', label: 'People', roles: ['admin'] },
  money: { id: 'money', to: '/money', label: 'Money', roles: ['admin'] },
  settings: { id: 'settings', to: '/settings', label: 'Settings', roles: ['admin'] },
};

/** What each role reaches for, most wanted first. The first entry is where that role starts. */
const wanted: Readonly<Record<Role, readonly PlaceId[]>> = {
  admin: ['desk', 'scan', 'kits', 'bench', 'people', 'money', 'instruments', 'labels', 'settings'],
  instructor: ['bench', 'scan', 'kits', 'instruments', 'labels'],
  student: ['borrow', 'scan', 'loans'],
};

/** Roles in the order in which their day comes first when one person holds several. */
const precedence: readonly Role[] = ['admin', 'instructor', 'student'];

const mostTabs = 4;

/** All places of somebody with these roles, in the rail's order. */
export function placesFor(roles: readonly Role[]): Place[] {
  const held = precedence.filter((role) => roles.includes(role));
  const ids = new Set(held.flatMap((role) => wanted[role]));
  return [...ids].map((id) => places[id]);
}

export interface PhoneTabs {
  tabs: Place[];
  /** What stands behind "More"; empty where everything has a tab. */
  more: Place[];
}

/**
 * At most four tabs on a phone. Of several roles each gets its first place, then scanning, then what is left;
 * what does not fit goes behind "More", which takes the fourth place.
 */
export function phoneTabsFor(roles: readonly Role[]): PhoneTabs {
  const all = placesFor(roles);
  const held = precedence.filter((role) => roles.includes(role));
  const first = new Set<PlaceId>(held.map((role) => wanted[role][0] as PlaceId));
  const order = held.length > 1 ? [...all.filter((place) => first.has(place.id)), ...all.filter((place) => !first.has(place.id))] : all;
  // An instructor's four suffice: labels are reached from the kits.
  const shown = held.length === 1 && held[0] === 'instructor' ? order.filter((place) => place.id !== 'labels') : order;
  if (shown.length <= mostTabs) return { tabs: shown, more: [] };
  return { tabs: shown.slice(0, mostTabs - 1), more: shown.slice(mostTabs - 1) };
}

/** Where somebody with these roles starts; null for somebody without a role. */
export function homeFor(roles: readonly Role[]): To | null {
  return placesFor(roles)[0]?.to ?? null;
}

/** Whether an address lies in a place: `/kits/…` is in Kits. A stone is looked at from its kit. */
export function isWithin(place: Place, pathname: string): boolean {
  if (place.id === 'kits' && pathname.startsWith('/stones/')) return true;
  return pathname === place.to || pathname.startsWith(`${place.to}/`);
}
