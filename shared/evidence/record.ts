import type {
  CategoryAttribute, CategoryValue, HydrostaticWeighing, MeasuredValue, NumericAttribute, OverLimit, RecordedStone, StoneColour,
} from '../api/evidence';
import { CT_PER_MM3 } from '../gem/cabochon';
import { caresOf } from '../gem/cares';
import { specificGravity } from '../gem/hydrostatic';
import { largestBirefringence } from '../gem/species';
import type { Component, SpeciesModel } from './components';
import { modelOf, speciesModels } from './components';
import { normalDensity } from './normal';
import type { EngineSettings } from './settings';

export interface RecordedNumber {
  readonly value: number;
  readonly u: number;
  readonly uInstrument: number;
  readonly instrument: string | null;
}

/** What the record says of an index: a number, or only that it lies above a liquid's limit. */
export type RecordedIndex = RecordedNumber | { readonly limit: number };

/** The record, ready for the engine: everything that does not depend on the readings is worked out once. */
export interface PreparedRecord {
  readonly stone: RecordedStone;
  readonly model: SpeciesModel;
  readonly numbers: Readonly<Partial<Record<NumericAttribute, RecordedNumber>>>;
  readonly limits: Readonly<Partial<Record<NumericAttribute, number>>>;
  readonly categories: Readonly<Partial<Record<CategoryAttribute, CategoryValue>>>;
  readonly birefringence: number;
  readonly porous: boolean;
  /** Log of the ratio of weight to SG · half-ellipsoid volume of stones cut to this profile, and its variance. */
  readonly profile: { readonly mean: number; readonly variance: number };
  /** The recorded species' pieces, reweighted by the record's own SG, index and weight. */
  readonly own: readonly Component[];
  /** Share of each species among substitutes, in the order of the models; sums to 1. */
  readonly shares: readonly number[];
  readonly settings: EngineSettings;
}

const SIZES = ['length_mm', 'width_mm', 'height_mm'] as const;
export const HALF_ELLIPSOID_LOG = Math.log(CT_PER_MM3 * (Math.PI / 6));

export function prepareRecord(stone: RecordedStone, settings: EngineSettings): PreparedRecord {
  const model = modelOf(stone.species, settings);
  const { values } = stone;
  const numbers: Partial<Record<NumericAttribute, RecordedNumber>> = {};
  const limits: Partial<Record<NumericAttribute, number>> = {};
  for (const attribute of ['length_mm', 'width_mm', 'height_mm', 'weight_ct', 'sg', 'ri_spot', 'ri_low', 'ri_high'] as const) {
    const entry = values[attribute];
    if (entry === undefined) continue;
    const read = readEntry(entry, settings);
    if ('limit' in read) limits[attribute] = read.limit;
    else numbers[attribute] = read;
  }
  const categories: Partial<Record<CategoryAttribute, CategoryValue>> = {};
  for (const attribute of ['polariscope', 'optic_figure', 'optic_sign', 'uv_long', 'uv_short', 'pleochroism'] as const) {
    const value = values[attribute];
    if (value !== undefined) categories[attribute] = value;
  }
  const profile = profileOf(numbers, model, settings);
  return {
    stone, model, numbers, limits, categories, profile, settings,
    birefringence: largestBirefringence(model.row),
    porous: caresOf(model.row, stone.flags).porous,
    own: ownComponents(model, numbers, limits, settings),
    shares: substituteShares(stone, model, settings),
  };
}

function readEntry(entry: MeasuredValue | HydrostaticWeighing | OverLimit, settings: EngineSettings): RecordedNumber | { limit: number } {
  if ('airCt' in entry) {
    const { value, u } = specificGravity(entry);
    return { value, u, uInstrument: settings.instrumentShare * u, instrument: null };
  }
  if ('limit' in entry) return { limit: entry.limit };
  return { value: entry.value, u: entry.u, uInstrument: entry.uInstrument ?? 0, instrument: entry.instrument ?? null };
}

/** Log weight the recorded sizes would give at SG 1 as half an ellipsoid, with its variance; null where a size is missing. */
function recordedVolume(numbers: Partial<Record<NumericAttribute, RecordedNumber>>): { log: number; variance: number } | null {
  let log = HALF_ELLIPSOID_LOG;
  let variance = 0;
  for (const attribute of SIZES) {
    const size = numbers[attribute];
    if (size === undefined) return null;
    log += Math.log(size.value);
    variance += (size.u / size.value) ** 2;
  }
  return { log, variance };
}

/**
 * How full a cabochon of this profile is. A girdle band or a double dome makes the record heavier than its half
 * ellipsoid; a substitute chosen to look alike is cut to the same profile, so the record's own fullness is carried over.
 */
function profileOf(numbers: Partial<Record<NumericAttribute, RecordedNumber>>, model: SpeciesModel, settings: EngineSettings) {
  const prior = settings.cutting.profile ** 2;
  const volume = recordedVolume(numbers);
  const weight = numbers.weight_ct;
  if (volume === null || weight === undefined) return { mean: 0, variance: prior };
  const sg = recordedGravity(numbers.sg, model);
  const observed = Math.log(weight.value / sg.mean) - volume.log;
  const noise = volume.variance + (weight.u / weight.value) ** 2 + sg.variance / sg.mean ** 2 + settings.cutting.shapeFactor ** 2;
  const gain = prior / (prior + noise);
  return { mean: gain * observed, variance: (1 - gain) * prior };
}

/** The recorded stone's SG: its record's, sharpened by the species, or the species' alone. */
function recordedGravity(recorded: RecordedNumber | undefined, model: SpeciesModel): { mean: number; variance: number } {
  let mean = 0;
  let square = 0;
  for (const { weight, sg, uSg } of model.components) {
    mean += weight * sg;
    square += weight * (uSg * uSg + sg * sg);
  }
  const variance = square - mean * mean;
  if (recorded === undefined) return { mean, variance };
  const gain = variance / (variance + recorded.u * recorded.u);
  return { mean: mean + gain * (recorded.value - mean), variance: (1 - gain) * variance };
}

function ownComponents(
  model: SpeciesModel, numbers: Partial<Record<NumericAttribute, RecordedNumber>>,
  limits: Partial<Record<NumericAttribute, number>>, settings: EngineSettings,
): Component[] {
  const volume = recordedVolume(numbers);
  const weighed = model.components.map((piece) => {
    let w = piece.weight;
    if (numbers.sg) w *= normalDensity(numbers.sg.value - piece.sg, piece.uSg ** 2 + numbers.sg.u ** 2);
    else if (volume && numbers.weight_ct) {
      const spread = volume.variance + settings.cutting.profile ** 2 + (piece.uSg / piece.sg) ** 2;
      w *= normalDensity(Math.log(numbers.weight_ct.value / piece.sg) - volume.log, spread);
    }
    for (const [attribute, expected] of [['ri_low', piece.low], ['ri_high', piece.high], ['ri_spot', (piece.low + piece.high) / 2]] as const) {
      const index = numbers[attribute];
      const slack = attribute === 'ri_spot' ? (piece.high - piece.low) ** 2 / 12 : 0;
      if (index) w *= normalDensity(index.value - expected, piece.uIndex ** 2 + index.u ** 2 + slack);
      else if (limits[attribute] !== undefined && expected + 2 * piece.uIndex < limits[attribute]) w *= 1e-6;
    }
    return { ...piece, weight: w };
  });
  const total = weighed.reduce((sum, piece) => sum + piece.weight, 0);
  return total > 0 ? weighed.map((piece) => ({ ...piece, weight: piece.weight / total })) : [...model.components];
}

/** Colours easily taken for one another on a bench. Invented for this design. */
const NEAR_COLOURS: Readonly<Record<StoneColour, readonly StoneColour[]>> = {
  colourless: ['white'], white: ['colourless', 'grey'], grey: ['white', 'black', 'brown'], black: ['grey', 'brown'],
  brown: ['orange', 'grey', 'black', 'yellow'], red: ['pink', 'orange'], pink: ['red', 'violet'],
  orange: ['red', 'yellow', 'brown'], yellow: ['orange', 'green', 'brown'], green: ['blue', 'yellow'],
  blue: ['green', 'violet'], violet: ['blue', 'pink'],
};

const sharesKnown = new WeakMap<EngineSettings, Map<string, readonly number[]>>();

/** Shares depend on species and colour alone; a school's kits ask for few of them, many times. */
function substituteShares(stone: RecordedStone, own: SpeciesModel, settings: EngineSettings): readonly number[] {
  const known = sharesKnown.get(settings) ?? new Map<string, readonly number[]>();
  sharesKnown.set(settings, known);
  const key = `${own.row.id}|${stone.colour ?? ''}`;
  const found = known.get(key);
  if (found !== undefined) return found;
  const shares = workOutShares(stone, own, settings);
  known.set(key, shares);
  return shares;
}

function workOutShares(stone: RecordedStone, own: SpeciesModel, settings: EngineSettings): number[] {
  const { substitutes } = settings;
  const colours: readonly StoneColour[] = stone.colour === undefined ? own.row.colours : [stone.colour];
  const near = colours.flatMap((colour) => NEAR_COLOURS[colour]);
  const models = speciesModels(settings);
  const raw = models.map(({ row }) => {
    if (row.id === own.row.id) return 0;
    const fits = row.colours.some((colour) => colours.includes(colour));
    const close = row.colours.some((colour) => near.includes(colour));
    const base = substitutes.weights[row.id] ?? row.substituteWeight;
    return base * (fits ? 1 : close ? substitutes.colourNear : substitutes.colourOff);
  });
  const total = raw.reduce((sum, share) => sum + share, 0);
  return models.map(({ row }, i) => row.id === own.row.id
    ? substitutes.recordedSpecies
    : ((1 - substitutes.recordedSpecies) * (raw[i] ?? 0)) / total);
}
