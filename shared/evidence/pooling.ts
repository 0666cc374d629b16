import type { NumericAttribute, NumberReading, OverLimitReading, ReadingInput, WeighingReading } from '../api/evidence';
import { specificGravity } from '../gem/hydrostatic';
import { EXPONENT_FLOOR } from './normal';
import type { EngineSettings } from './settings';

/** One number as read, with the part of its uncertainty that belongs to the instrument. */
export interface NumberRead {
  readonly value: number;
  readonly u: number;
  readonly uInstrument: number;
  readonly instrument: string | null;
  readonly damaged: boolean;
}

/**
 * One way to explain an attribute's readings: which of them are blunders (`blunders` of them), and what the others say
 * together. `weight` holds the blunder odds, the flat densities of the blunders and how well the others agree with each
 * other; what depends on the stone's true value is left to `mean` and `variance` (absent where every reading is a blunder).
 */
export interface Variant {
  readonly blunders: number;
  readonly weight: number;
  readonly sound: { readonly mean: number; readonly variance: number; readonly instrumentVariance: number } | null;
}

/** All readings of one numeric attribute. Densities are in units of `scale`, so that none overflows however fine the instrument. */
export interface PooledNumber {
  readonly attribute: NumericAttribute;
  readonly reads: readonly NumberRead[];
  readonly over: readonly OverLimitReading[];
  readonly mean: number;
  readonly u: number;
  readonly instrument: string | null;
  readonly uInstrument: number;
  readonly damaged: boolean;
  readonly scale: number;
  readonly variants: readonly Variant[];
  /** The same with ordinary and rough readings taken together: enough where the true value is uncertain anyway. */
  readonly merged: readonly Variant[];
}

/** At most two blunders are considered at once: three slips on one stone are a matter for people. */
export const MAX_BLUNDERS = 2;
/** With more repeats than this only the outlying ones are suspected, or the patterns would outgrow the bench. */
const MAX_SUSPECTS = 8;
/** Pairs of rough readings are considered up to this many repeats, single ones beyond. */
const MAX_ROUGH_PAIRS = 3;

/** The number a reading stands for; SG weighings are turned into SG. */
export function toNumberRead(reading: NumberReading | WeighingReading, settings: EngineSettings): NumberRead {
  const { value, u } = 'airCt' in reading ? specificGravity(reading) : reading;
  return {
    value,
    u,
    uInstrument: Math.min(reading.uInstrument ?? settings.instrumentShare * u, 0.999 * u),
    instrument: reading.instrument ?? null,
    damaged: reading.explained === 'damage',
  };
}

/** Gathers the readings of one numeric attribute; `blunderDensity` is the flat density of a blundered number, per unit. */
export function poolNumbers(
  attribute: NumericAttribute, readings: readonly ReadingInput[], settings: EngineSettings, blunderDensity: number,
): PooledNumber {
  const reads: NumberRead[] = [];
  const over: OverLimitReading[] = [];
  for (const reading of readings) {
    if ('airCt' in reading) reads.push(toNumberRead(reading, settings));
    else if (reading.value === 'over_limit') over.push(reading);
    else if (typeof reading.value === 'number') reads.push(toNumberRead(reading, settings));
  }
  // Sums run in one order whatever order the readings came in, so that the digits do not depend on it.
  reads.sort((a, b) => a.value - b.value || a.u - b.u);
  const scale = reads.reduce((largest, read) => Math.max(largest, read.u), 0);
  const all = combine(reads);
  const patterns = reads.length === 0 ? [] : patternsOf(reads, scale, settings, settings.blunderRate * blunderDensity * scale);
  return {
    attribute, reads, over, scale,
    mean: all.mean,
    u: Math.sqrt(all.variance),
    instrument: sharedInstrument(reads),
    uInstrument: Math.sqrt(all.instrumentVariance),
    damaged: reads.some((read) => read.damaged),
    variants: patterns.flat(),
    merged: patterns.map(merge),
  };
}

function sharedInstrument(reads: readonly NumberRead[]): string | null {
  const first = reads[0]?.instrument ?? null;
  return reads.every((read) => read.instrument === first) ? first : null;
}

/** Subsets of up to two of the given indices, the empty one first. */
function subsets(indices: readonly number[], most: number): number[][] {
  const found: number[][] = [[]];
  indices.forEach((a, i) => {
    found.push([a]);
    if (most > 1) for (const b of indices.slice(i + 1)) found.push([a, b]);
  });
  return found;
}

/** For each choice of blunders, every choice of rough readings among the rest: noise is a little heavier-tailed than a bell. */
function patternsOf(reads: readonly NumberRead[], scale: number, { blunderRate, tail }: EngineSettings, blundered: number): Variant[][] {
  return subsets(suspectIndices(reads), MAX_BLUNDERS).map((pattern) => {
    const rest = reads.filter((_, i) => !pattern.includes(i));
    const odds = blundered ** pattern.length * (1 - blunderRate) ** rest.length;
    if (rest.length === 0) return [{ blunders: pattern.length, weight: odds, sound: null }];
    return subsets(rest.map((_, i) => i), rest.length > MAX_ROUGH_PAIRS ? 1 : 2).map((rough) => {
      const { mean, variance, instrumentVariance, agreement } = combine(rest, scale, rough, tail.wide);
      const weight = odds * agreement * tail.share ** rough.length * (1 - tail.share) ** (rest.length - rough.length);
      return { blunders: pattern.length, weight, sound: { mean, variance, instrumentVariance } };
    });
  });
}

/** One bell with the weight, mean and spread of several. */
function merge(variants: readonly Variant[]): Variant {
  const [first] = variants;
  if (first === undefined || first.sound === null) return first ?? { blunders: 0, weight: 1, sound: null };
  let weight = 0;
  let mean = 0;
  for (const variant of variants) {
    weight += variant.weight;
    mean += variant.weight * (variant.sound?.mean ?? 0);
  }
  if (!(weight > 0)) return first;
  mean /= weight;
  let variance = 0;
  for (const variant of variants) {
    if (variant.sound) variance += (variant.weight / weight) * (variant.sound.variance + (variant.sound.mean - mean) ** 2);
  }
  return { blunders: first.blunders, weight, sound: { mean, variance, instrumentVariance: first.sound.instrumentVariance } };
}

function suspectIndices(reads: readonly NumberRead[]): number[] {
  const indices = reads.map((_, i) => i);
  if (reads.length <= MAX_SUSPECTS) return indices;
  const median = reads[reads.length >> 1]?.value ?? 0;
  const distance = (i: number) => Math.abs((reads[i]?.value ?? 0) - median) / (reads[i]?.u ?? 1);
  return indices.sort((a, b) => distance(b) - distance(a)).slice(0, MAX_SUSPECTS).sort((a, b) => a - b);
}

/**
 * Weighted mean of repeated readings. Their own scatter shrinks with their number; the instrument's part does not.
 * `agreement` is the density of their scatter about the mean, in units of `scale`.
 */
function combine(reads: readonly NumberRead[], scale = 1, rough: readonly number[] = [], wide = 1) {
  let precision = 0;
  let weighted = 0;
  let instrumentVariance = 0;
  const own = reads.map((read, i) => {
    const variance = Math.max(read.u * read.u - read.uInstrument * read.uInstrument, 1e-6 * read.u * read.u);
    return rough.includes(i) ? wide * wide * variance : variance;
  });
  reads.forEach((read, i) => {
    const w = 1 / (own[i] ?? 1);
    precision += w;
    weighted += w * read.value;
    instrumentVariance += read.uInstrument * read.uInstrument;
  });
  const mean = weighted / precision;
  instrumentVariance /= Math.max(reads.length, 1) * countInstruments(reads);
  let exponent = 0;
  let logNorm = -0.5 * Math.log(precision);
  reads.forEach((read, i) => {
    const variance = own[i] ?? 1;
    exponent -= (0.5 * (read.value - mean) ** 2) / variance;
    logNorm -= 0.5 * Math.log(variance / (scale * scale));
  });
  logNorm += -0.5 * (reads.length - 1) * Math.log(2 * Math.PI) - Math.log(scale);
  const agreement = reads.length < 2 ? 1 : Math.exp(Math.max(exponent, EXPONENT_FLOOR) + logNorm);
  return { mean, variance: instrumentVariance + 1 / precision, instrumentVariance, agreement };
}

/** Readings that name different instruments do not share one offset; unnamed ones are taken to come from one. */
function countInstruments(reads: readonly NumberRead[]): number {
  return Math.max(new Set(reads.map((read) => read.instrument)).size, 1);
}
