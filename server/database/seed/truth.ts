import type { OpticFigure, OpticSign, PolariscopeReaction, StoneColour, StoneShape } from '@shared/api/evidence';

/** What a stone of the demo truly is; its readings are made from this with small errors. */
export interface StoneTruth {
  readonly species: string;
  readonly colour: StoneColour;
  readonly shape: StoneShape;
  readonly nominalSize: string;
  readonly neutralDescription: string;
  readonly valueMinor: number;
  /** mm: length, width, height of the dome. */
  readonly sizeMm: readonly [number, number, number];
  readonly sg: number;
  /** Weight over that of a half ellipsoid of this size: how full the dome is. */
  readonly fullness: number;
  /** What a spot on the dome reads, sodium D, or `over_limit`; left out where it is not read. */
  readonly spot?: number | 'over_limit';
  /** Lowest and highest index on a flat polished back, where the stone has one. */
  readonly flat?: readonly [number, number];
  readonly polariscope?: PolariscopeReaction;
  readonly figure?: OpticFigure;
  readonly sign?: OpticSign;
  /** Weighed in water too. */
  readonly weighedInWater?: boolean;
  readonly marks?: string;
  readonly source?: string;
}

export interface KitTruth {
  readonly number: string;
  readonly title: string;
  readonly neutralTitle: string;
  /** In slot order from A. */
  readonly stones: readonly StoneTruth[];
}
