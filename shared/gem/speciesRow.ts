import type { StoneColour } from '../api/evidence';

export type Range = readonly [number, number];

/** How a figure came to be known; kept with the data so that an invented number is never shown as a read one. */
export type SourceKind = 'read' | 'memory' | 'common practice' | 'invented' | 'computed from read coefficients';

/** Indices of refraction at sodium D, as the species' optic character allows. `spot` is the usual distant-vision value of an aggregate. */
export type IndexTable =
  | { readonly n: Range }
  | { readonly omega: Range; readonly epsilon: Range }
  | { readonly alpha: Range; readonly beta: Range; readonly gamma: Range }
  | { readonly range: Range; readonly spot: number };

export interface CrossCheck {
  readonly source: string;
  readonly figuresRead: string;
  readonly result: string;
  readonly sourceKind: string;
}

/** One species, as the handbooks have it. Ranges admit a species; `spread` is the standard deviation between its stones. */
export interface SpeciesRow {
  readonly id: string;
  readonly name: string;
  readonly group: string;
  readonly crystalSystem: string;
  readonly opticCharacter: string;
  readonly opticSign: '+' | '-' | '+/-' | null;
  readonly ri: IndexTable;
  readonly birefringence: Range | null;
  readonly sg: Range;
  readonly sgTypical: number | null;
  readonly spread: { readonly sg: number; readonly ri: number };
  readonly adrCommon: 'yes' | 'seldom' | 'no' | 'aggregate';
  readonly polariscope: string;
  readonly opticFigure: string;
  readonly pleochroism: string;
  readonly uvLong: string;
  readonly uvShort: string;
  readonly hardnessMohs: Range;
  readonly colours: readonly StoneColour[];
  readonly substituteWeight: number;
  readonly source: string;
  readonly handbooksDiffer: string | null;
  readonly note: string | null;
  readonly crossChecks: readonly CrossCheck[];
}

/** Where each column of the table comes from. */
export const SPECIES_SOURCE_KINDS: Readonly<Record<'properties' | 'colours' | 'substituteWeight' | 'spread', SourceKind>> = {
  properties: 'memory',
  colours: 'memory',
  substituteWeight: 'invented',
  spread: 'invented',
};
