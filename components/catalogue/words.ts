import type { KitPlace, StoneStanding } from '@shared/api/kits';
import type { BadgeState } from '@/components/ui';

interface Badge { state: BadgeState; label: string }

export const placeBadges: Readonly<Record<KitPlace, Badge>> = {
  shelf: { state: 'same', label: 'on the shelf' },
  incomplete: { state: 'open', label: 'record incomplete' },
  reserved: { state: 'neutral', label: 'being taken out' },
  out: { state: 'out', label: 'out' },
  returned: { state: 'open', label: 'in the return box' },
  checking: { state: 'open', label: 'at the bench' },
  set_aside: { state: 'different', label: 'set aside' },
  retired: { state: 'neutral', label: 'retired' },
};

export const standingBadges: Readonly<Record<StoneStanding, Badge>> = {
  in_kit: { state: 'same', label: 'in the kit' },
  missing: { state: 'different', label: 'missing' },
  damaged: { state: 'different', label: 'damaged' },
  different: { state: 'different', label: 'another stone' },
  retired: { state: 'neutral', label: 'retired' },
};

export const flagWords = {
  deep_red: 'Deep red',
  axis_up: 'Cut with the optic axis up',
  porous: 'Porous',
  metamict: 'Metamict, may be weakly radioactive',
  fragile: 'Fragile',
  coated_or_filled: 'Coated or filled',
} as const;

export const flagHints = {
  deep_red: 'crossed polars leak deep red, so SR, ADR and DR are easily taken for each other',
  axis_up: 'it may stay dark through the dome although doubly refractive',
  porous: 'no contact liquid, no water',
  metamict: 'wash hands, do not store many together; ask a qualified person',
  fragile: 'cleaves or chips easily',
  coated_or_filled: 'liquids and heat may harm it',
} as const;

/** A trade name as a heading writes it. */
export const headingName = (name: string): string => name.charAt(0).toUpperCase() + name.slice(1);
