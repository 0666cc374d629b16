import type { Attribute, CategoryReading, NumericAttribute, ReadingInput, RefractiveAttribute } from '../api/evidence';
import { ATTRIBUTES, CATEGORY_VALUES, REFRACTIVE_ATTRIBUTES } from '../api/evidence';
import type { ByBlunders, PieceBody, SubstituteSizes } from './body';
import { byBlunders, ONE, ownDensity, SIZE_ATTRIBUTES, substituteBody, substituteSizes, times, total } from './body';
import type { Component } from './components';
import { speciesModels } from './components';
import type { CategoryReadings } from './optics';
import { appearanceChance, ownOptics, substituteOptics } from './optics';
import type { PooledNumber } from './pooling';
import { poolNumbers } from './pooling';
import type { PreparedRecord } from './record';
import { ownRefraction, substituteRefraction } from './refraction';
import { isCategory } from './settings';

/** Readings sorted by attribute and pooled; the order they came in is gone. */
export interface PooledReadings {
  readonly numbers: Readonly<Partial<Record<NumericAttribute, PooledNumber>>>;
  readonly categories: CategoryReadings;
  /** Attributes read, in the fixed order of a verdict. */
  readonly present: readonly Attribute[];
}

/** Likelihoods after each attribute in `present`: the contributions are the steps between them. */
export interface Likelihoods {
  readonly present: readonly Attribute[];
  /** p(readings so far | the recorded stone), up to a factor shared with `another`. */
  readonly own: readonly number[];
  /** p(readings so far | another stone), over all species. */
  readonly another: readonly number[];
  /** w_k · p(all readings | another stone of species k), in the order of the species models. */
  readonly bySpecies: readonly number[];
}

export function poolReadings(record: PreparedRecord, readings: readonly ReadingInput[]): PooledReadings {
  const pooled: PooledReadings = { numbers: {}, categories: {}, present: [] };
  return ATTRIBUTES.reduce((sofar, attribute) => {
    const taken = readings.filter((reading) => reading.attribute === attribute);
    return taken.length === 0 ? sofar : withReadings(record, sofar, attribute, taken);
  }, pooled);
}

/** The same readings with those of one attribute (all of them, earlier ones included) put in place. */
export function withReadings(record: PreparedRecord, pooled: PooledReadings, attribute: Attribute, taken: readonly ReadingInput[]): PooledReadings {
  const present = pooled.present.includes(attribute)
    ? pooled.present
    : ATTRIBUTES.filter((entry) => entry === attribute || pooled.present.includes(entry));
  if (isCategory(attribute)) {
    const sorted = [...(taken as readonly CategoryReading[])].sort((a, b) => rankOf(a) - rankOf(b));
    return { ...pooled, present, categories: { ...pooled.categories, [attribute]: sorted } };
  }
  const read = poolNumbers(attribute, taken, record.settings, blunderDensity(record, attribute, taken));
  return { ...pooled, present, numbers: { ...pooled.numbers, [attribute]: read } };
}

/** A place for each category and observer, so that digits do not depend on the order the readings came in. */
function rankOf({ attribute, value, observer }: CategoryReading): number {
  return 2 * (CATEGORY_VALUES[attribute] as readonly string[]).indexOf(value) + (observer === 'student' ? 1 : 0);
}

/** Flat density of a blundered number, per unit of the attribute. */
function blunderDensity(record: PreparedRecord, attribute: NumericAttribute, readings: readonly ReadingInput[]): number {
  const span = record.settings.blunderSpan[attribute];
  if ('span' in span) return 1 / span.span;
  const own = record.numbers[attribute]?.value;
  const read = readings.reduce((largest, reading) => ('value' in reading && typeof reading.value === 'number' ? Math.max(largest, reading.value) : largest), 0);
  return 1 / (span.timesValue * (own ?? read));
}

/** `bodies` may be handed in where only optics, refraction or appearance changed since they were worked out. */
export function likelihoods(record: PreparedRecord, pooled: PooledReadings, bodies = substituteBodies(record, pooled)): Likelihoods {
  return { present: pooled.present, own: ownLikelihoods(record, pooled), ...anotherLikelihoods(record, pooled, bodies) };
}

function isRefractive(attribute: Attribute): attribute is RefractiveAttribute {
  return (REFRACTIVE_ATTRIBUTES as readonly Attribute[]).includes(attribute);
}

const APPEARANCE = ['uv_long', 'uv_short', 'pleochroism'] as const;
const OPTICS: readonly Attribute[] = ['polariscope', 'optic_figure', 'optic_sign'];

/** Under "the recorded stone" the attributes are independent about the record; what it lacks is left to the recorded species' pieces. */
function ownLikelihoods(record: PreparedRecord, pooled: PooledReadings): number[] {
  const opticsSoFar = ownOptics(record, pooled.categories);
  const factors = pooled.present.map((attribute) => ownFactor(record, pooled, attribute));
  const unled = refractionReadings(pooled, (attribute) => factors[pooled.present.indexOf(attribute)] === 'unled');
  const needsPieces = factors.some((factor) => factor === 'unled' || typeof factor === 'function');
  const pieces = needsPieces ? record.own : record.own.slice(0, 1).map((piece) => ({ ...piece, weight: 1 }));
  const sums = pooled.present.map(() => 0);
  for (const piece of pieces) {
    let running: ByBlunders = ONE;
    let refraction: ByBlunders = ONE;
    let optics: ByBlunders = ONE;
    pooled.present.forEach((attribute, i) => {
      const factor = factors[i] ?? ONE;
      if (factor === 'optics') optics = opticsSoFar[OPTICS.indexOf(attribute)] ?? ONE;
      else if (factor === 'unled') refraction = substituteRefraction(record, unled, piece, attribute as RefractiveAttribute);
      else running = times(running, typeof factor === 'function' ? factor(piece) : factor);
      sums[i] = (sums[i] ?? 0) + piece.weight * total(times(times(running, refraction), optics));
    });
  }
  return sums;
}

/** An attribute's probability by itself; or by piece of the species; or as part of a group taken together. */
type OwnFactor = ByBlunders | ((piece: Component) => ByBlunders) | 'optics' | 'unled';

function ownFactor(record: PreparedRecord, pooled: PooledReadings, attribute: Attribute): OwnFactor {
  if (OPTICS.includes(attribute)) return 'optics';
  if (isCategory(attribute)) {
    return appearanceChance(record, attribute as 'uv_long' | 'uv_short' | 'pleochroism', pooled.categories[attribute] ?? [], record.model.row, true);
  }
  const numeric = attribute;
  const read = pooled.numbers[numeric];
  if (read === undefined) return ONE;
  if (isRefractive(attribute)) return ownRefraction(record, attribute, read) ?? 'unled';
  const recorded = record.numbers[numeric];
  if (recorded !== undefined) return byBlunders(read.variants, ownDensity(record, numeric, read, recorded));
  if (attribute === 'sg') {
    return (piece) => substituteBody({ prefix: [ONE, ONE, ONE], cases: [] }, { sizes: {}, sg: read, weight: undefined }, piece).afterSg;
  }
  if (attribute === 'weight_ct') return unrecordedWeight(record, pooled, read);
  // A size the record lacks says nothing about which stone this is; it still serves the weight.
  return byBlunders(read.variants, () => 1);
}

function refractionReadings(pooled: PooledReadings, keep: (attribute: RefractiveAttribute) => boolean) {
  return Object.fromEntries(REFRACTIVE_ATTRIBUTES.filter(keep).map((attribute) => [attribute, pooled.numbers[attribute]]).filter(([, read]) => read !== undefined)) as Partial<Record<RefractiveAttribute, PooledNumber>>;
}

/** A weight the record lacks is foretold by the stone's own sizes (recorded, else read) and its species. */
function unrecordedWeight(record: PreparedRecord, pooled: PooledReadings, weight: PooledNumber): (piece: Component) => ByBlunders {
  const tight: PreparedRecord = {
    ...record,
    settings: { ...record.settings, cutting: { ...record.settings.cutting, lengthWidthMm: 0, lengthWidthShare: 0, depthShare: 0, unmatchedShare: 0 } },
  };
  const body = { sizes: pickSizes(pooled), sg: undefined, weight };
  const cases = substituteSizes(tight, body);
  const sizes = total(cases.prefix[SIZE_ATTRIBUTES.length - 1] ?? ONE);
  return (piece) => {
    const { afterWeight } = substituteBody(cases, body, piece);
    return [afterWeight[0] / sizes, afterWeight[1] / sizes, afterWeight[2] / sizes];
  };
}

function pickSizes(pooled: PooledReadings) {
  const { length_mm: length, width_mm: width, height_mm: height } = pooled.numbers;
  return { ...(length && { length_mm: length }), ...(width && { width_mm: width }), ...(height && { height_mm: height }) };
}

/** Body likelihoods of every piece of every species, kept so that a further optical reading need not weigh the stone again. */
export interface SubstituteBodies { readonly sizes: SubstituteSizes; readonly byBody: readonly (PieceBody | undefined)[] }

export function substituteBodies(record: PreparedRecord, { numbers, ...pooled }: PooledReadings): SubstituteBodies {
  const body = { sizes: pickSizes({ numbers, ...pooled }), sg: numbers.sg, weight: numbers.weight_ct };
  const sizes = substituteSizes(record, body);
  const byBody: (PieceBody | undefined)[] = [];
  speciesModels(record.settings).forEach(({ components }, k) => {
    if (record.shares[k] === 0) return;
    for (const piece of components) byBody[piece.body] ??= substituteBody(sizes, body, piece);
  });
  return { sizes, byBody };
}

function anotherLikelihoods(record: PreparedRecord, pooled: PooledReadings, bodies: SubstituteBodies): { another: number[]; bySpecies: number[] } {
  const { present, categories } = pooled;
  const refraction = refractionReadings(pooled, () => true);
  const optics = substituteOptics(record, categories);
  const refractive = present.filter(isRefractive);
  const appearances = APPEARANCE.filter((attribute) => categories[attribute] !== undefined);
  const place = Object.fromEntries(present.map((attribute, i) => [attribute, i])) as Partial<Record<Attribute, number>>;
  const another = present.map((attribute) => {
    const i = (SIZE_ATTRIBUTES as readonly Attribute[]).indexOf(attribute);
    return i < 0 ? 0 : total(bodies.sizes.prefix[i] ?? ONE);
  });
  const add = (at: number | undefined, amount: number) => {
    if (at !== undefined) another[at] = (another[at] ?? 0) + amount;
  };
  const bySpecies = speciesModels(record.settings).map(({ row, components }, k) => {
    const share = record.shares[k] ?? 0;
    if (share === 0) return 0;
    const sums: [number, number, number] = [0, 0, 0];
    for (const piece of components) {
      const odds = share * piece.weight;
      const found = bodies.byBody[piece.body];
      if (found === undefined) continue;
      add(place.sg, odds * total(found.afterSg));
      add(place.weight_ct, odds * total(found.afterWeight));
      let running = found.afterWeight;
      for (const attribute of refractive) {
        running = times(found.afterWeight, substituteRefraction(record, refraction, piece, attribute));
        add(place[attribute], odds * total(running));
      }
      sums[0] += odds * running[0];
      sums[1] += odds * running[1];
      sums[2] += odds * running[2];
    }
    const products = optics.of(row);
    OPTICS.forEach((attribute, i) => {
      if (place[attribute] !== undefined) add(place[attribute], total(times(sums, products[i] ?? ONE)));
    });
    let running = times(sums, products[2] ?? ONE);
    for (const attribute of appearances) {
      running = times(running, appearanceChance(record, attribute, categories[attribute] ?? [], row, false));
      add(place[attribute], total(running));
    }
    return total(running);
  });
  return { another, bySpecies };
}
