import type { NumericAttribute } from '../api/evidence';
import type { Component } from './components';
import { normalDensity } from './normal';
import type { PooledNumber, Variant } from './pooling';
import { MAX_BLUNDERS } from './pooling';
import type { PreparedRecord, RecordedNumber } from './record';
import { HALF_ELLIPSOID_LOG } from './record';

/** Probability split by how many readings are blunders: none, one, two. Products drop what needs more than two. */
export type ByBlunders = readonly [number, number, number];

export const ONE: ByBlunders = [1, 0, 0];

export function times(a: ByBlunders, b: ByBlunders): ByBlunders {
  return [a[0] * b[0], a[0] * b[1] + a[1] * b[0], a[0] * b[2] + a[1] * b[1] + a[2] * b[0]];
}

export function total(a: ByBlunders): number {
  return a[0] + a[1] + a[2];
}

/** Sums variants against a density of the true value. */
export function byBlunders(variants: readonly Variant[], density: (sound: NonNullable<Variant['sound']>) => number): ByBlunders {
  const sums: [number, number, number] = [0, 0, 0];
  for (const { blunders, weight, sound } of variants) {
    sums[blunders as 0 | 1 | 2] += sound === null ? weight : weight * density(sound);
  }
  return sums;
}

export const SIZE_ATTRIBUTES = ['length_mm', 'width_mm', 'height_mm'] as const;
type SizeAttribute = (typeof SIZE_ATTRIBUTES)[number];

/** One explanation of the sizes: the volume they leave, as a factor on SG that gives the weight. */
interface SizeCase {
  readonly blunders: number;
  readonly weight: number;
  readonly ctPerSg: number;
  readonly variance: number;
}

export interface BodyReadings {
  readonly sizes: Readonly<Partial<Record<SizeAttribute, PooledNumber>>>;
  readonly sg: PooledNumber | undefined;
  readonly weight: PooledNumber | undefined;
}

/** Sizes under "another stone": the same for every species, so worked out once per verdict. */
export interface SubstituteSizes {
  /** Probability of the sizes read so far, after length, width and height. */
  readonly prefix: readonly ByBlunders[];
  readonly cases: readonly SizeCase[];
}

/** A case this much less probable than the best with as many blunders cannot matter: one blunder more would explain it better. */
const NEGLIGIBLE = 1e-8;

export function substituteSizes(record: PreparedRecord, body: BodyReadings): SubstituteSizes {
  const { cutting } = record.settings;
  const matched = sizeCases(record, body, 1 - cutting.unmatchedShare, (attribute, value) => (attribute === 'height_mm'
    ? Math.SQRT2 * cutting.depthShare * value
    : Math.max(cutting.lengthWidthMm, cutting.lengthWidthShare * value)));
  const unmatched = sizeCases(record, body, cutting.unmatchedShare, (_, value) => cutting.unmatchedSpread * value);
  const prefix = matched.prefix.map((sums, i): ByBlunders => {
    const other = unmatched.prefix[i] ?? [0, 0, 0];
    return [sums[0] + other[0], sums[1] + other[1], sums[2] + other[2]];
  });
  const best: [number, number, number] = [0, 0, 0];
  const cases = [...matched.cases, ...unmatched.cases];
  for (const entry of cases) best[entry.blunders as 0 | 1 | 2] = Math.max(best[entry.blunders as 0 | 1 | 2], entry.weight);
  // A case must also stand beside the best that has a blunder left to spend on the weight itself.
  const least = NEGLIGIBLE * Math.max(best[0], best[1]);
  return { prefix, cases: cases.filter((entry) => entry.weight > Math.max(least, NEGLIGIBLE * best[entry.blunders as 0 | 1 | 2])) };
}

interface OpenCase { blunders: number; weight: number; log: number; variance: number; width: number }

function sizeCases(record: PreparedRecord, body: BodyReadings, share: number, spread: (attribute: SizeAttribute, value: number) => number) {
  const prefix: ByBlunders[] = [];
  let open: OpenCase[] = [{ blunders: 0, weight: share, log: HALF_ELLIPSOID_LOG + record.profile.mean, variance: 0, width: 0 }];
  for (const attribute of SIZE_ATTRIBUTES) {
    const recorded = record.numbers[attribute];
    const pooled = body.sizes[attribute];
    const variants = pooled?.merged ?? [{ blunders: 0, weight: 1, sound: null }];
    const next: OpenCase[] = [];
    for (const variant of variants) {
      const part = sizePart(variant, recorded, pooled?.scale ?? 1, recorded && spread(attribute, recorded.value));
      for (const entry of open) {
        const blunders = entry.blunders + variant.blunders;
        if (blunders > MAX_BLUNDERS) continue;
        // A depth nobody measured is about half the width: cabochons in the trade, no source.
        const { mean, variance } = part ?? (attribute === 'height_mm' && entry.width > 0
          ? { mean: 0.55 * entry.width, variance: (0.1 * entry.width) ** 2 }
          : { mean: 1, variance: 1 });
        next.push({
          blunders,
          weight: entry.weight * variant.weight * (part?.density ?? 1),
          log: entry.log + Math.log(Math.max(mean, 1e-3)),
          variance: entry.variance + variance / (mean * mean),
          width: attribute === 'width_mm' && part ? mean : entry.width,
        });
      }
    }
    open = next;
    prefix.push(open.reduce<[number, number, number]>((sums, entry) => {
      sums[entry.blunders as 0 | 1 | 2] += entry.weight;
      return sums;
    }, [0, 0, 0]));
  }
  const extra = record.profile.variance + record.settings.cutting.shapeFactor ** 2;
  const cases = open.map(({ blunders, weight, log, variance }): SizeCase => ({ blunders, weight, ctPerSg: Math.exp(log), variance: variance + extra }));
  return { prefix, cases };
}

/** What is known of one size of a substitute: how probable its reading is, and the size it leaves; null where nothing is known. */
function sizePart(variant: Variant, recorded: RecordedNumber | undefined, scale: number, spread: number | undefined) {
  const { sound } = variant;
  if (recorded === undefined || spread === undefined) {
    return sound === null ? null : { mean: sound.mean, variance: sound.variance, density: 1 };
  }
  const prior = spread * spread + recorded.u * recorded.u;
  if (sound === null) return { mean: recorded.value, variance: prior, density: 1 };
  const gain = prior / (prior + sound.variance);
  return {
    mean: recorded.value + gain * (sound.mean - recorded.value),
    variance: (1 - gain) * prior,
    density: scale * normalDensity(sound.mean - recorded.value, prior + sound.variance),
  };
}

/** Sizes, SG and weight together for one piece of a species: probability after SG, and after weight. */
export interface PieceBody { readonly afterSg: ByBlunders; readonly afterWeight: ByBlunders }

/** One explanation of the SG readings, and the piece's SG as it leaves it. */
interface GravityCase { readonly blunders: number; readonly weight: number; readonly mean: number; readonly variance: number }

const UNREAD: readonly Variant[] = [{ blunders: 0, weight: 1, sound: null }];

function gravityCases(sg: PooledNumber | undefined, piece: Component): GravityCase[] {
  const prior = piece.uSg * piece.uSg;
  const scale = sg?.scale ?? 1;
  const variants = sg === undefined || sg.merged.length === 0 ? UNREAD : sg.merged;
  return variants.map(({ blunders, weight, sound }) => {
    if (sound === null) return { blunders, weight, mean: piece.sg, variance: prior };
    const gain = prior / (prior + sound.variance);
    return {
      blunders,
      weight: weight * scale * normalDensity(sound.mean - piece.sg, prior + sound.variance),
      mean: piece.sg + gain * (sound.mean - piece.sg),
      variance: (1 - gain) * prior,
    };
  });
}

export function substituteBody(sizes: SubstituteSizes, body: BodyReadings, piece: Component): PieceBody {
  const sizesOnly = sizes.prefix[SIZE_ATTRIBUTES.length - 1] ?? ONE;
  const gravities = gravityCases(body.sg, piece);
  const { weight } = body;
  let afterSg = sizesOnly;
  if (body.sg !== undefined) {
    const sums: [number, number, number] = [0, 0, 0];
    for (const gravity of gravities) sums[gravity.blunders as 0 | 1 | 2] += gravity.weight;
    afterSg = times(sizesOnly, sums);
  }
  if (weight === undefined || weight.merged.length === 0) return { afterSg, afterWeight: afterSg };
  const sums: [number, number, number] = [0, 0, 0];
  for (const variant of weight.merged) {
    if (variant.sound === null) {
      for (let b = 0; b + variant.blunders <= MAX_BLUNDERS; b += 1) sums[(b + variant.blunders) as 0 | 1 | 2] += afterSg[b as 0 | 1 | 2] * variant.weight;
    } else {
      for (const gravity of gravities) addWeight(sums, sizes.cases, gravity, variant, variant.sound, weight.scale);
    }
  }
  return { afterSg, afterWeight: sums };
}

/** Adds one explanation of weight and SG over all explanations of the sizes: the inner loop of every verdict. */
function addWeight(
  sums: [number, number, number], cases: readonly SizeCase[], gravity: GravityCase,
  variant: Variant, { mean, variance }: NonNullable<Variant['sound']>, scale: number,
): void {
  const odds = variant.weight * gravity.weight * scale;
  if (odds === 0) return;
  const spent = variant.blunders + gravity.blunders;
  const relative = gravity.variance / (gravity.mean * gravity.mean);
  for (const size of cases) {
    const blunders = spent + size.blunders;
    if (blunders > MAX_BLUNDERS) continue;
    const expected = size.ctPerSg * gravity.mean;
    sums[blunders as 0 | 1 | 2] += odds * size.weight * normalDensity(mean - expected, expected * expected * (size.variance + relative) + variance);
  }
}

/** Combined variance of a reading against the record; an instrument used at both visits repeats its offset, which cancels. */
export function comparedVariance(recorded: RecordedNumber, sound: { variance: number; instrumentVariance: number }, instrument: string | null): number {
  const both = sound.variance + recorded.u * recorded.u;
  if (instrument === null || instrument !== recorded.instrument) return both;
  return Math.max(both - sound.instrumentVariance - Math.min(recorded.uInstrument ** 2, recorded.u ** 2), 0.05 * both);
}

/** Density of a number under "the recorded stone", about the record; weight may have lost a chip, and a porous stone gained water. */
export function ownDensity(record: PreparedRecord, attribute: NumericAttribute, pooled: PooledNumber, recorded: RecordedNumber) {
  return (sound: NonNullable<Variant['sound']>): number => {
    const variance = comparedVariance(recorded, sound, pooled.instrument);
    const distance = sound.mean - recorded.value;
    const noise = normalDensity(distance, variance);
    const losses: { share: number; mean: number; sign: 1 | -1 }[] = [];
    const { chips, damage } = record.settings;
    if (pooled.damaged && attribute !== 'sg') {
      const share = attribute === 'weight_ct' ? damage.weightShare : damage.lengthShare;
      losses.push({ share: damage.tells, mean: Math.max(share * recorded.value, chips.meanCt), sign: -1 });
    } else if (attribute === 'weight_ct') {
      losses.push({ share: chips.rate, mean: chips.meanCt, sign: -1 });
      if (record.porous) losses.push({ share: chips.porousGainRate, mean: chips.porousGainShare * recorded.value, sign: 1 });
    }
    let rest = 1;
    let density = 0;
    for (const { share, mean, sign } of losses) {
      density += share * oneSided(sign * distance, mean, variance);
      rest -= share;
    }
    return pooled.scale * (density + rest * noise);
  };
}

/**
 * A change that only goes one way (`along` > 0), exponential with the given mean, falling like the noise on the other
 * side. It joins at the record itself, so that the density never rises with distance on either side.
 */
function oneSided(along: number, mean: number, variance: number): number {
  const height = 1 / (mean + Math.sqrt((Math.PI / 2) * variance));
  return height * Math.exp(Math.max(along > 0 ? -along / mean : (-0.5 * along * along) / variance, -45));
}
