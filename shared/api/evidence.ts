/**
 * What travels between browser and server about readings, records and verdicts.
 * A measured number is `{ value, u }`: `u` is a standard uncertainty (k = 1) in the unit its key names.
 */

export const ATTRIBUTES = [
  'length_mm', 'width_mm', 'height_mm', 'sg', 'weight_ct',
  'ri_spot', 'ri_low', 'ri_high',
  'polariscope', 'optic_figure', 'optic_sign',
  'uv_long', 'uv_short', 'pleochroism',
] as const;
export type Attribute = (typeof ATTRIBUTES)[number];

export const NUMERIC_ATTRIBUTES = [
  'length_mm', 'width_mm', 'height_mm', 'sg', 'weight_ct', 'ri_spot', 'ri_low', 'ri_high',
] as const satisfies readonly Attribute[];
export type NumericAttribute = (typeof NUMERIC_ATTRIBUTES)[number];

export const REFRACTIVE_ATTRIBUTES = ['ri_spot', 'ri_low', 'ri_high'] as const satisfies readonly Attribute[];
export type RefractiveAttribute = (typeof REFRACTIVE_ATTRIBUTES)[number];

export const CATEGORY_VALUES = {
  polariscope: ['SR', 'DR', 'ADR', 'AGG'],
  optic_figure: ['uniaxial', 'quartz', 'spiral', 'biaxial', 'not_found'],
  optic_sign: ['+', '-'],
  uv_long: ['inert', 'weak', 'moderate', 'strong'],
  uv_short: ['inert', 'weak', 'moderate', 'strong'],
  pleochroism: ['none', 'weak', 'distinct', 'strong'],
} as const;
export type CategoryAttribute = keyof typeof CATEGORY_VALUES;
export type PolariscopeReaction = (typeof CATEGORY_VALUES.polariscope)[number];
export type OpticFigure = (typeof CATEGORY_VALUES.optic_figure)[number];
export type OpticSign = (typeof CATEGORY_VALUES.optic_sign)[number];
export type FluorescenceStrength = (typeof CATEGORY_VALUES.uv_long)[number];
export type PleochroismStrength = (typeof CATEGORY_VALUES.pleochroism)[number];
export type CategoryValue = (typeof CATEGORY_VALUES)[CategoryAttribute][number];

export const OBSERVERS = ['instructor', 'student'] as const;
export type Observer = (typeof OBSERVERS)[number];

export const STONE_COLOURS = [
  'colourless', 'white', 'grey', 'black', 'brown', 'red', 'pink', 'orange', 'yellow', 'green', 'blue', 'violet',
] as const;
export type StoneColour = (typeof STONE_COLOURS)[number];

export const STONE_SHAPES = ['oval', 'round', 'cushion', 'other'] as const;
export type StoneShape = (typeof STONE_SHAPES)[number];

export const STONE_FLAGS = ['deep_red', 'axis_up', 'porous', 'metamict', 'fragile', 'coated_or_filled'] as const;
export type StoneFlag = (typeof STONE_FLAGS)[number];

/** A number with its standard uncertainty. `n` is how many readings it rests on; `uInstrument` the part of `u` that more readings on that instrument would not reduce. */
export interface MeasuredValue { value: number; u: number; n?: number; uInstrument?: number; instrument?: string }
/** A refractive index above the contact liquid: known only to exceed `limit`. */
export interface OverLimit { value: 'over_limit'; limit: number; n?: number }
/** Weighings in air and in water of known temperature; `uCt` is the standard uncertainty of each weighing, `uWaterC` of the temperature (0.5 °C when left out). */
export interface HydrostaticWeighing { airCt: number; waterCt: number; waterC: number; uCt: number; uWaterC?: number }

/** What the school's record holds of one stone. Values that were not taken are left out. */
export interface RecordedValues {
  length_mm?: MeasuredValue;
  width_mm?: MeasuredValue;
  height_mm?: MeasuredValue;
  weight_ct?: MeasuredValue;
  sg?: MeasuredValue | HydrostaticWeighing;
  ri_spot?: MeasuredValue | OverLimit;
  ri_low?: MeasuredValue | OverLimit;
  ri_high?: MeasuredValue | OverLimit;
  polariscope?: PolariscopeReaction;
  optic_figure?: OpticFigure;
  optic_sign?: OpticSign;
  uv_long?: FluorescenceStrength;
  uv_short?: FluorescenceStrength;
  pleochroism?: PleochroismStrength;
}

export interface RecordedStone {
  /** Species id of `GET /species`. */
  species: string;
  colour?: StoneColour;
  shape?: StoneShape;
  flags?: StoneFlag[];
  values: RecordedValues;
}

/** What every reading may say about how it was taken. */
export interface ReadingContext {
  /** Who looked; instructors and students confuse categories at different rates. Instructor when left out. */
  observer?: Observer;
  /** Register id of the instrument: readings of one instrument share its own part of the uncertainty. */
  instrument?: string;
  /** The part of `u` that belongs to the instrument, same unit; averaging does not reduce it. */
  uInstrument?: number;
  /** An instructor saw fresh damage that accounts for this reading (weight, sizes). */
  explained?: 'damage';
}

export interface NumberReading extends ReadingContext { attribute: NumericAttribute; value: number; u: number }
export interface OverLimitReading extends ReadingContext { attribute: RefractiveAttribute; value: 'over_limit'; limit: number }
export interface WeighingReading extends ReadingContext, HydrostaticWeighing { attribute: 'sg' }
export interface CategoryReading extends ReadingContext { attribute: CategoryAttribute; value: CategoryValue }
export type ReadingInput = NumberReading | OverLimitReading | WeighingReading | CategoryReading;

/** Body of `POST /verdicts/trial`; the bench check computes from the same shape. */
export interface VerdictRequest {
  recorded: RecordedStone;
  /** In any order; an attribute that stands twice was read twice, from separate placements. At most 60. */
  readings: ReadingInput[];
  /** Attributes the lab cannot read now (no instrument, or one out of control): never proposed as the next reading. */
  unavailable?: Attribute[];
}

export const VERDICTS = ['same', 'different', 'not_settled'] as const;
export type VerdictWord = (typeof VERDICTS)[number];

export type SupportWord =
  | 'no support' | 'weak' | 'moderate' | 'moderately strong' | 'strong' | 'very strong' | 'extremely strong';
export type SupportedProposition = 'recorded_stone' | 'another_stone' | 'neither';

/** How one attribute moved the verdict, given the attributes before it in the fixed order (size, SG, weight, RI, optics). */
export interface Contribution {
  attribute: Attribute;
  /** The value used: the mean where it was read more than once; the derived SG for weighings. */
  value: number | 'over_limit' | CategoryValue;
  u: number | null;
  recorded: number | 'over_limit' | CategoryValue | null;
  recordedU: number | null;
  /** All contributions sum to the verdict's `log10LR`. */
  log10LR: number;
  /** Distance from the record in combined standard uncertainties; null for categories, censored and unrecorded values. */
  z: number | null;
  /** E_n of ISO 13528 with U = 2u; |E_n| ≤ 1 is agreement. Null as for `z`. */
  en: number | null;
  /** How many readings stand behind `value`. */
  readings: number;
  /** The contact liquid's limit where `value` is `over_limit`. */
  limit?: number;
}

/** A species the returned stone could be, if it is another stone; shares sum to 1 over all species, the smallest left out. */
export interface Alternative { species: string; share: number }

export interface NextReading {
  attribute: Attribute;
  /** True when the attribute has been read already: take it again, from a fresh placement. */
  repeat: boolean;
  /** Expected information about "recorded stone" against "another stone", bits. */
  bits: number;
  /** Chance that the verdict is settled after this reading. */
  settles: number;
  /** Bench time assumed for it. */
  seconds: number;
}

export const CAUTION_CODES = [
  'contact_liquid_harms_health', 'contact_liquid_harms_stone', 'uv_harms_eyes', 'no_water', 'fragile', 'heat_sensitive',
  'soft', 'radioactive', 'light_sensitive', 'loss_unexplained', 'gain_unexplained', 'reading_far_from_record',
  'readings_disagree', 'nothing_recorded', 'axis_up', 'no_reading_left',
] as const;
export type CautionCode = (typeof CAUTION_CODES)[number];
/** A short sentence for the screen; the lab's own rules and a qualified person come first. */
export interface Caution { code: CautionCode; attribute: Attribute | null; message: string }

export interface VerdictResponse {
  verdict: VerdictWord;
  /** log10 of p(readings | recorded stone) / p(readings | another stone). */
  log10LR: number;
  support: SupportWord;
  supports: SupportedProposition;
  contributions: Contribution[];
  alternatives: Alternative[];
  /** Best first; empty when nothing is left to read or the ranking was not asked for. */
  next: NextReading[];
  cautions: Caution[];
  engine: string;
}

/** One row of `GET /species`. */
export interface SpeciesSummary {
  id: string;
  name: string;
  group: string;
  opticCharacter: string;
  opticSign: string | null;
  /** Lowest and highest refractive index the species shows, sodium D. */
  riLow: number;
  riHigh: number;
  /** Range of birefringence; null where aggregates show none or it is not tabulated. */
  birefringence: [number, number] | null;
  sg: [number, number];
  polariscope: string;
  opticFigure: string;
  hardnessMohs: [number, number];
  colours: StoneColour[];
  /** Where the row's figures come from: all present rows are from memory of handbooks. */
  sourceKind: string;
  source: string;
}

/** One thing a record still lacks before a verdict can rest on it. */
export interface RecordGap { attribute: Attribute | null; message: string }

/** One field of a request that cannot be used, with the dotted path to it, e.g. `readings[2].value`. */
export interface FieldError { field: string; message: string }
