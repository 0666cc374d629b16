import type { Attribute, CategoryAttribute, NumericAttribute, Observer, PolariscopeReaction } from '../api/evidence';

/** Stored with every verdict; raised whenever the same readings would give other digits. */
export const ENGINE_VERSION = '1.0.0';

/** Rows: what the stone is; columns: what is written down. Each row sums to 1. */
export type ReactionTable = Readonly<Record<PolariscopeReaction, Readonly<Record<PolariscopeReaction, number>>>>;

/**
 * Everything the engine assumes. Every default below is an ASSUMPTION made for this design (no source) unless its line
 * says otherwise; a school may change them and they are stored with each verdict.
 */
export interface EngineSettings {
  readonly version: string;
  readonly rule: {
    /** "Same stone" from this LR on (brief of the product). */
    readonly sameLR: number;
    /** "Different stone" from this LR down (brief of the product). */
    readonly differentLR: number;
    /** Each of two groups must bring the LR to this or below. */
    readonly groupLR: number;
    /** A reading farther than this, in combined standard uncertainties, must be explained. */
    readonly farZ: number;
  };
  /** Chance that one reading says nothing about the stone in hand (wrong stone, slipped digit). */
  readonly blunderRate: number;
  /** Width of the flat density of a blunder: a multiple of the recorded value, or a span in the attribute's unit. */
  readonly blunderSpan: Readonly<Record<NumericAttribute, { readonly timesValue: number } | { readonly span: number }>>;
  /** Chance that a blundered refractive reading is "over the limit". */
  readonly blunderOverLimit: number;
  /** Errors are a little heavier-tailed than normal: this share of readings has `wide` times the stated uncertainty. */
  readonly tail: { readonly share: number; readonly wide: number };
  /** Part of a reading's u that its instrument repeats each time, where the reading does not say (a ratio of u). */
  readonly instrumentShare: number;
  /** Loss of weight in use: chance of a chip and its mean, ct; and for porous stones chance and mean of a gain, as a share of the weight. */
  readonly chips: { readonly rate: number; readonly meanCt: number; readonly porousGainRate: number; readonly porousGainShare: number };
  /** Damage an instructor has seen: chance that it tells in the reading, mean loss as a share of weight and of a length. */
  readonly damage: { readonly tells: number; readonly weightShare: number; readonly lengthShare: number };
  /** How a substitute's size differs from the record's: standard deviations between two stones of one nominal size. */
  readonly cutting: {
    readonly lengthWidthMm: number;
    readonly lengthWidthShare: number;
    /** Spread of depth between stones of one nominal size, as a share of the depth (the product's brief: 6 %). */
    readonly depthShare: number;
    /** Share of substitutes whose size was not matched at all, and the spread of theirs. */
    readonly unmatchedShare: number;
    readonly unmatchedSpread: number;
    /** Spread of weight / (SG · half-ellipsoid volume) between stones cut alike, and between profiles. */
    readonly shapeFactor: number;
    readonly profile: number;
  };
  readonly substitutes: {
    /** Share of the recorded species itself among substitutes (brief of the product). */
    readonly recordedSpecies: number;
    /** Factor where the colour is a neighbour of the stone's, and where it does not fit at all. */
    readonly colourNear: number;
    readonly colourOff: number;
    /** A school's own weights by species id, in place of the table's. */
    readonly weights: Readonly<Record<string, number>>;
  };
  /** A school's own spreads by species id, in place of the table's. */
  readonly spreads: Readonly<Record<string, { readonly sg: number; readonly ri: number }>>;
  readonly polariscope: Readonly<Record<Observer, ReactionTable>>;
  /** Factor on the confusion of SR, ADR and DR in deep red stones (brief of the product). */
  readonly deepRedFactor: number;
  /** Chance that a doubly refractive stone cut axis-up stays dark through its dome, at every reading. */
  readonly axisUpDark: number;
  /** Chance that repeated categories of one stone only say the same thing again. */
  readonly categoryEcho: number;
  readonly figure: Readonly<Record<Observer, { readonly seen: number; readonly right: number; readonly false: number }>>;
  readonly sign: Readonly<Record<Observer, number>>;
  /** Strengths of fluorescence and pleochroism: chance of the same word, and of a neighbouring one, at a second look. */
  readonly strength: { readonly same: number; readonly near: number };
  /** Prior chance of a swap: used only where an expectation is needed, never in the LR. */
  readonly priorSwap: number;
  /** Bench time of one reading, s. */
  readonly seconds: Readonly<Record<Attribute, number>>;
  /** Bench time that a verdict still open after the next reading costs, s. */
  readonly openSeconds: number;
}

const instructorTable: ReactionTable = {
  SR: { SR: 0.97, ADR: 0.02, DR: 0.007, AGG: 0.003 },
  DR: { SR: 0.01, ADR: 0.01, DR: 0.97, AGG: 0.01 },
  ADR: { SR: 0.05, ADR: 0.89, DR: 0.05, AGG: 0.01 },
  AGG: { SR: 0.005, ADR: 0.005, DR: 0.02, AGG: 0.97 },
};

const studentTable: ReactionTable = {
  SR: { SR: 0.85, ADR: 0.1, DR: 0.04, AGG: 0.01 },
  DR: { SR: 0.05, ADR: 0.07, DR: 0.85, AGG: 0.03 },
  ADR: { SR: 0.1, ADR: 0.62, DR: 0.25, AGG: 0.03 },
  AGG: { SR: 0.02, ADR: 0.03, DR: 0.1, AGG: 0.85 },
};

export const DEFAULT_SETTINGS: EngineSettings = {
  version: ENGINE_VERSION,
  rule: { sameLR: 100, differentLR: 1e-4, groupLR: 0.1, farZ: 3 },
  blunderRate: 0.01,
  blunderSpan: {
    length_mm: { timesValue: 3 }, width_mm: { timesValue: 3 }, height_mm: { timesValue: 3 }, weight_ct: { timesValue: 3 },
    sg: { span: 6 }, ri_spot: { span: 0.4 }, ri_low: { span: 0.4 }, ri_high: { span: 0.4 },
  },
  blunderOverLimit: 0.1,
  tail: { share: 0.05, wide: 2.5 },
  instrumentShare: 0.3,
  chips: { rate: 0.05, meanCt: 0.01, porousGainRate: 0.3, porousGainShare: 0.02 },
  damage: { tells: 0.9, weightShare: 0.03, lengthShare: 0.02 },
  cutting: {
    lengthWidthMm: 0.07, lengthWidthShare: 0.0115, depthShare: 0.06, unmatchedShare: 0.1, unmatchedSpread: 0.15,
    shapeFactor: 0.03, profile: 0.1,
  },
  substitutes: { recordedSpecies: 0.25, colourNear: 0.5, colourOff: 0.1, weights: {} },
  spreads: {},
  polariscope: { instructor: instructorTable, student: studentTable },
  deepRedFactor: 2,
  axisUpDark: 0.5,
  categoryEcho: 0.5,
  figure: { instructor: { seen: 0.7, right: 0.95, false: 0.03 }, student: { seen: 0.5, right: 0.75, false: 0.1 } },
  sign: { instructor: 0.93, student: 0.75 },
  strength: { same: 0.65, near: 0.25 },
  priorSwap: 0.02,
  seconds: {
    length_mm: 15, width_mm: 15, height_mm: 15, weight_ct: 20, sg: 120, ri_spot: 60, ri_low: 60, ri_high: 60,
    polariscope: 20, optic_figure: 45, optic_sign: 90, uv_long: 30, uv_short: 30, pleochroism: 40,
  },
  openSeconds: 300,
};

/** The attributes whose contributions are weighed together when a verdict asks what it rests on. */
export type EvidenceGroup = 'body' | 'refraction' | 'optics' | 'appearance';

export const GROUP_OF: Readonly<Record<Attribute, EvidenceGroup>> = {
  length_mm: 'body', width_mm: 'body', height_mm: 'body', sg: 'body', weight_ct: 'body',
  ri_spot: 'refraction', ri_low: 'refraction', ri_high: 'refraction',
  polariscope: 'optics', optic_figure: 'optics', optic_sign: 'optics',
  uv_long: 'appearance', uv_short: 'appearance', pleochroism: 'appearance',
};

export function isCategory(attribute: Attribute): attribute is CategoryAttribute {
  return GROUP_OF[attribute] === 'optics' || GROUP_OF[attribute] === 'appearance';
}
