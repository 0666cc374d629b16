import type { CategoryAttribute, CategoryReading, Observer, OpticFigure, PolariscopeReaction } from '../api/evidence';
import { CATEGORY_VALUES } from '../api/evidence';
import { SPECIES_ROWS } from '../gem/species';
import type { SpeciesRow } from '../gem/speciesRow';
import type { ByBlunders } from './body';
import { ONE, times } from './body';
import { MAX_BLUNDERS } from './pooling';
import type { PreparedRecord } from './record';
import { strengthChance, strengthsOf } from './strength';

export type CategoryReadings = Readonly<Partial<Record<CategoryAttribute, readonly CategoryReading[]>>>;

const REACTIONS = CATEGORY_VALUES.polariscope;
type Reactions = Readonly<Record<PolariscopeReaction, number>>;

/** What stones of a species do between crossed polars, by the words of the table. Shares are assumptions for this design. */
const REACTIONS_BY_WORDS: Readonly<Record<string, Partial<Reactions>>> = {
  DR: { DR: 0.99, AGG: 0.01 },
  AGG: { AGG: 0.96, DR: 0.04 },
  'AGG / opaque': { AGG: 1 },
  opaque: { AGG: 1 },
  SR: { SR: 0.9, ADR: 0.1 },
  'SR or ADR': { SR: 0.5, ADR: 0.5 },
  'SR or ADR (curved bands, crosses)': { SR: 0.5, ADR: 0.5 },
  'SR or ADR (strain)': { SR: 0.5, ADR: 0.5 },
  "ADR (cross-hatched 'tabby' strain)": { ADR: 0.92, SR: 0.06, AGG: 0.02 },
  'ADR, strong interference colours': { ADR: 0.9, SR: 0.05, DR: 0.05 },
  'ADR, interference colours': { ADR: 0.9, SR: 0.05, DR: 0.05 },
  'SR (some ADR)': { SR: 0.8, ADR: 0.2 },
  'SR, weak DR or AGG-like': { SR: 0.5, DR: 0.25, AGG: 0.25 },
  'SR, ADR or AGG-like': { SR: 0.4, ADR: 0.3, AGG: 0.3 },
  'SR or AGG / opaque': { SR: 0.3, AGG: 0.7 },
  'DR (adularescent: may look AGG)': { DR: 0.75, AGG: 0.25 },
  'DR or AGG': { DR: 0.7, AGG: 0.3 },
  'AGG or DR': { AGG: 0.7, DR: 0.3 },
  'DR or AGG (cross-hatched twinning)': { DR: 0.6, AGG: 0.4 },
  'DR or AGG (lamellar twinning)': { DR: 0.6, AGG: 0.4 },
};

const reactionsByRow = new Map<string, Reactions>(
  SPECIES_ROWS.map(({ polariscope }) => [polariscope, { SR: 0, DR: 0, ADR: 0, AGG: 0, ...REACTIONS_BY_WORDS[polariscope] }]),
);

export function reactionsOf(row: SpeciesRow): Reactions {
  return reactionsByRow.get(row.polariscope) ?? { SR: 0.25, DR: 0.25, ADR: 0.25, AGG: 0.25 };
}

/** The figure a doubly refractive stone of the species shows when one is found. */
export function figureOf(row: SpeciesRow): OpticFigure | null {
  if (row.opticFigure.startsWith('quartz')) return 'quartz';
  if (row.opticCharacter.startsWith('uniaxial')) return 'uniaxial';
  return row.opticCharacter.startsWith('biaxial') ? 'biaxial' : null;
}

/** One reading, as a chance for each hypothetical state of the stone. */
type Chance = (reading: CategoryReading) => number;

/**
 * Probability of the readings of one category under a state of the stone, split by blunders. Repeated looks at one stone
 * partly echo each other (a twinned stone fools everyone), so a share of the chance counts an agreeing series once.
 */
function seriesChance(record: PreparedRecord, readings: readonly CategoryReading[], chance: Chance): ByBlunders {
  const { blunderRate: rate, categoryEcho } = record.settings;
  let result: ByBlunders = ONE;
  for (const reading of readings) {
    const flat = 1 / CATEGORY_VALUES[reading.attribute].length;
    result = times(result, [(1 - rate) * chance(reading), rate * flat, 0]);
  }
  const [first] = readings;
  if (readings.length < 2 || first === undefined) return result;
  const agreeing = readings.every((reading) => reading.value === first.value);
  // The echo keeps the least sure observer's chance, so that the order of the readings cannot matter.
  const once = agreeing ? Math.min(...readings.map(chance)) : 0;
  const echo = echoed(readings.length, rate, once, 1 / CATEGORY_VALUES[first.attribute].length);
  const mix = (b: 0 | 1 | 2) => (1 - categoryEcho) * result[b] + categoryEcho * echo[b];
  return [mix(0), mix(1), mix(2)];
}

function echoed(n: number, rate: number, once: number, flat: number): ByBlunders {
  const choose = [1, n, (n * (n - 1)) / 2];
  const at = (b: number) => (b > Math.min(n, MAX_BLUNDERS) ? 0 : (choose[b] ?? 0) * (rate * flat) ** b * (1 - rate) ** (n - b) * (b === n ? 1 : once));
  return [at(0), at(1), at(2)];
}

function observerOf(reading: CategoryReading): Observer {
  return reading.observer ?? 'instructor';
}

/** Chance of writing down a reaction of a stone whose own is `truth`. Deep red hides strain from double refraction and from darkness. */
export function reactionChance(record: PreparedRecord, truth: PolariscopeReaction, written: PolariscopeReaction, observer: Observer): number {
  const row = record.settings.polariscope[observer][truth];
  if (!(record.stone.flags ?? []).includes('deep_red') || truth === 'AGG') return row[written];
  const factor = record.settings.deepRedFactor;
  const confused = REACTIONS.filter((other) => other !== truth && other !== 'AGG');
  if (confused.includes(written)) return Math.min(factor * row[written], 0.45);
  if (written !== truth) return row[written];
  return 1 - row.AGG - confused.reduce((sum, other) => sum + Math.min(factor * row[other], 0.45), 0);
}

/** Chance of a figure being named, given the one the stone shows (null: none to see). Not finding one says almost nothing, so it counts alike everywhere. */
function figureChance(record: PreparedRecord, truth: OpticFigure | null, reading: CategoryReading): number {
  if (reading.value === 'not_found') return 1;
  const { seen, right, false: imagined } = record.settings.figure[observerOf(reading)];
  if (truth === null || truth === 'not_found') return imagined / 4;
  if (reading.value === truth) return seen * right;
  // A thin quartz looks like any uniaxial stone, and twinned quartz shows spirals: near misses within one kind.
  const family: readonly OpticFigure[] = ['uniaxial', 'quartz', 'spiral'];
  const near = family.includes(truth) && family.includes(reading.value as OpticFigure);
  return seen * (near ? 0.2 : 0.5 * (1 - right));
}

function signChance(record: PreparedRecord, truth: string | null, reading: CategoryReading): number {
  const right = record.settings.sign[observerOf(reading)];
  return truth === '+' || truth === '-' ? (reading.value === truth ? right : 1 - right) : 0.5;
}

/** Readings of polariscope, figure and sign under one state, in that order, as running products. */
function runningProducts(record: PreparedRecord, readings: CategoryReadings, reaction: Chance, figure: Chance, sign: Chance): ByBlunders[] {
  const first = seriesChance(record, readings.polariscope ?? [], reaction);
  const second = times(first, seriesChance(record, readings.optic_figure ?? [], figure));
  return [first, second, times(second, seriesChance(record, readings.optic_sign ?? [], sign))];
}

/** Optics under "the recorded stone": led by its own recorded reaction, figure and sign, else by its species. After polariscope, figure, sign. */
export function ownOptics(record: PreparedRecord, readings: CategoryReadings): ByBlunders[] {
  const { categories, model, stone, settings } = record;
  const recorded = categories.polariscope as PolariscopeReaction | undefined;
  const reactions = recorded === undefined ? reactionsOf(model.row) : { SR: 0, DR: 0, ADR: 0, AGG: 0, [recorded]: 1 };
  const states: { share: number; truth: PolariscopeReaction; dark: boolean }[] = [];
  for (const truth of REACTIONS) {
    const share = reactions[truth];
    if (share === 0) continue;
    const dark = truth === 'DR' && (stone.flags ?? []).includes('axis_up') ? settings.axisUpDark : 0;
    states.push({ share: share * (1 - dark), truth, dark: false }, { share: share * dark, truth, dark: true });
  }
  const recordedFigure = categories.optic_figure as OpticFigure | undefined;
  return mixStates(states.map(({ share, truth, dark }) => {
    const figure = recordedFigure !== undefined && recordedFigure !== 'not_found' ? recordedFigure : truth === 'DR' ? figureOf(model.row) : null;
    const products = runningProducts(
      record, readings,
      (reading) => reactionChance(record, dark ? 'SR' : truth, reading.value as PolariscopeReaction, observerOf(reading)),
      (reading) => figureChance(record, figure, reading),
      (reading) => signChance(record, categories.optic_sign === undefined ? model.row.opticSign : categories.optic_sign, reading),
    );
    return { share, products };
  }));
}

/** Species of one key do the same between crossed polars. */
const opticsKeys = new Map(SPECIES_ROWS.map((row) => [row, `${row.polariscope}|${figureOf(row) ?? ''}|${row.opticSign ?? ''}`]));

/** States of the optics that species share, so that each is worked out once per verdict. */
export interface SubstituteOptics { of: (row: SpeciesRow) => ByBlunders[] }

export function substituteOptics(record: PreparedRecord, readings: CategoryReadings): SubstituteOptics {
  const { polariscope = [], optic_figure: figures = [], optic_sign: signs = [] } = readings;
  const reactionOf = remembered((truth: PolariscopeReaction) => seriesChance(
    record, polariscope, (reading) => reactionChance(record, truth, reading.value as PolariscopeReaction, observerOf(reading))));
  const figureOfState = remembered((truth: OpticFigure | null) => seriesChance(record, figures, (reading) => figureChance(record, truth, reading)));
  const signOf = remembered((truth: string | null) => seriesChance(record, signs, (reading) => signChance(record, truth, reading)));
  const known = new Map<string, ByBlunders[]>();
  return {
    of(row) {
      const figure = figureOf(row);
      const key = opticsKeys.get(row) ?? row.id;
      const found = known.get(key);
      if (found !== undefined) return found;
      const reactions = reactionsOf(row);
      const built = mixStates(REACTIONS.filter((truth) => reactions[truth] > 0).map((truth) => {
        const first = reactionOf(truth);
        const second = figures.length === 0 ? first : times(first, figureOfState(truth === 'DR' ? figure : null));
        const third = signs.length === 0 ? second : times(second, signOf(truth === 'DR' ? row.opticSign : null));
        return { share: reactions[truth], products: [first, second, third] };
      }));
      known.set(key, built);
      return built;
    },
  };
}

function remembered<K, V>(work: (key: K) => V): (key: K) => V {
  const known = new Map<K, V>();
  return (key) => {
    const found = known.get(key);
    if (found !== undefined) return found;
    const value = work(key);
    known.set(key, value);
    return value;
  };
}

function mixStates(states: readonly { share: number; products: readonly ByBlunders[] }[]): ByBlunders[] {
  return [0, 1, 2].map((i) => {
    const sums: [number, number, number] = [0, 0, 0];
    for (const { share, products } of states) {
      const product = products[i] ?? ONE;
      sums[0] += share * product[0];
      sums[1] += share * product[1];
      sums[2] += share * product[2];
    }
    return sums;
  });
}

/** Fluorescence or pleochroism under a stone whose recorded strength, or whose species' words, lead. */
export function appearanceChance(
  record: PreparedRecord, attribute: 'uv_long' | 'uv_short' | 'pleochroism', readings: readonly CategoryReading[], row: SpeciesRow, own: boolean,
): ByBlunders {
  const recorded = own ? record.categories[attribute] : undefined;
  const strengths = recorded === undefined ? strengthsOf(row, attribute) : { [recorded]: 1 };
  return seriesChance(record, readings, (reading) => strengthChance(record.settings, attribute, strengths, reading.value));
}
