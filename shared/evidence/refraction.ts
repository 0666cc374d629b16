import type { RefractiveAttribute } from '../api/evidence';
import type { ByBlunders } from './body';
import { comparedVariance, ONE, times } from './body';
import type { Component } from './components';
import { intervalDensity, normalCdf, normalDensity } from './normal';
import type { PooledNumber, Variant } from './pooling';
import { MAX_BLUNDERS } from './pooling';
import type { PreparedRecord, RecordedNumber } from './record';

/** The edge of the contact liquid's shadow blurs the limit a little: u of the comparison with it. Common practice, no source. */
const U_LIMIT = 0.003;
/** Chance left to a reading that contradicts a censored one outright. */
const NEVER = 1e-6;

export type RefractionReadings = Readonly<Partial<Record<RefractiveAttribute, PooledNumber>>>;

/**
 * Where the stone's own index for an attribute lies, by its record: an interval [low, high] with the uncertainty of its
 * ends. A spot may fall anywhere between the flat readings; lacking those, within the species' birefringence of the
 * recorded spot. Null where the record holds no index at all.
 */
export function recordedInterval(record: PreparedRecord, attribute: RefractiveAttribute): { low: number; high: number; ends: RecordedNumber } | null {
  const { ri_spot: spot, ri_low: low, ri_high: high } = record.numbers;
  const split = record.birefringence;
  if (attribute === 'ri_spot') {
    if (low && high) return { low: Math.min(low.value, high.value), high: Math.max(low.value, high.value), ends: wider(low, high) };
    if (low) return { low: low.value, high: low.value + split, ends: low };
    if (high) return { low: high.value - split, high: high.value, ends: high };
    return spot ? { low: spot.value - split, high: spot.value + split, ends: spot } : null;
  }
  const same = record.numbers[attribute];
  if (same) return { low: same.value, high: same.value, ends: same };
  const other = attribute === 'ri_low' ? high : low;
  const sign = attribute === 'ri_low' ? -1 : 1;
  const from = other ?? spot;
  if (!from) return null;
  return { low: Math.min(from.value, from.value + sign * split), high: Math.max(from.value, from.value + sign * split), ends: from };
}

function wider(a: RecordedNumber, b: RecordedNumber): RecordedNumber {
  return a.u >= b.u ? a : b;
}

/** The liquid's limit the record was taken against, where the attribute or the spot was over it. */
export function recordedLimit(record: PreparedRecord, attribute: RefractiveAttribute): number | undefined {
  return record.limits[attribute] ?? record.limits.ri_spot ?? record.limits.ri_low;
}

/** Probability of one attribute's readings under "the recorded stone"; undefined where the record says nothing about it. */
export function ownRefraction(record: PreparedRecord, attribute: RefractiveAttribute, pooled: PooledNumber): ByBlunders | undefined {
  const interval = recordedInterval(record, attribute);
  const limit = recordedLimit(record, attribute);
  if (interval === null && limit === undefined) return undefined;
  let result: ByBlunders = ONE;
  if (pooled.reads.length > 0) {
    result = sumVariants(pooled.variants, (sound) => {
      if (interval !== null) {
        return pooled.scale * intervalDensity(sound.mean, interval.low, interval.high, comparedVariance(interval.ends, sound, pooled.instrument));
      }
      // Known only to be above a limit: a number well above it is possible with a better liquid, one below is not.
      const floor = limit ?? 0;
      return pooled.scale * Math.max(intervalDensity(sound.mean, floor, floor + 0.3, sound.variance + U_LIMIT ** 2), NEVER);
    });
  }
  if (pooled.over.length > 0) {
    const asked = liquidLimit(pooled);
    const p = interval !== null
      ? chanceAbove(asked, interval.low, interval.high, Math.hypot(interval.ends.u, U_LIMIT))
      : (limit ?? 0) >= asked - 1e-9 ? 1 - NEVER : 0.5;
    result = times(result, overVariants(record, pooled, p));
  }
  return result;
}

/** Probability of refractive readings for one piece of a species, jointly: all indices of a stone move together. */
export function substituteRefraction(record: PreparedRecord, readings: RefractionReadings, piece: Component, upTo: RefractiveAttribute): ByBlunders {
  const order: RefractiveAttribute[] = ['ri_low', 'ri_high', 'ri_spot'];
  const included = order.filter((attribute) => readings[attribute] && RANK[attribute] <= RANK[upTo]);
  interface Open { blunders: number; weight: number; shift: number; variance: number }
  let open: Open[] = [{ blunders: 0, weight: 1, shift: 0, variance: piece.uIndex * piece.uIndex }];
  let censored: ByBlunders = ONE;
  for (const attribute of included) {
    const pooled = readings[attribute];
    if (!pooled) continue;
    if (pooled.over.length > 0) {
      const [low, high] = attribute === 'ri_spot' ? [piece.low, piece.high] : attribute === 'ri_low' ? [piece.low, piece.low] : [piece.high, piece.high];
      const p = chanceAbove(liquidLimit(pooled), low, high, Math.hypot(piece.uIndex, U_LIMIT));
      censored = times(censored, overVariants(record, pooled, p));
    }
    if (pooled.merged.length === 0) continue;
    const next: Open[] = [];
    for (const entry of open) {
      for (const variant of pooled.merged) {
        const blunders = entry.blunders + variant.blunders;
        if (blunders > MAX_BLUNDERS) continue;
        const { sound } = variant;
        if (sound === null) {
          next.push({ ...entry, blunders, weight: entry.weight * variant.weight });
          continue;
        }
        const spread = entry.variance + sound.variance;
        if (attribute === 'ri_spot') {
          const density = pooled.scale * intervalDensity(sound.mean, piece.low + entry.shift, piece.high + entry.shift, spread);
          next.push({ ...entry, blunders, weight: entry.weight * variant.weight * density });
          continue;
        }
        const miss = sound.mean - (attribute === 'ri_low' ? piece.low : piece.high) - entry.shift;
        const gain = entry.variance / spread;
        next.push({
          blunders,
          weight: entry.weight * variant.weight * pooled.scale * normalDensity(miss, spread),
          shift: entry.shift + gain * miss,
          variance: (1 - gain) * entry.variance,
        });
      }
    }
    open = next;
  }
  const sums: [number, number, number] = [0, 0, 0];
  for (const { blunders, weight } of open) sums[blunders as 0 | 1 | 2] += weight;
  return times(sums, censored);
}

/** The order in which refractive readings are added to a verdict. */
const RANK: Readonly<Record<RefractiveAttribute, number>> = { ri_spot: 0, ri_low: 1, ri_high: 2 };

/** Several "over the limit" readings of one attribute tell no more than the one against the highest limit. */
export function liquidLimit(pooled: PooledNumber): number {
  return pooled.over.reduce((highest, reading) => Math.max(highest, reading.limit), 0);
}

function chanceAbove(limit: number, low: number, high: number, u: number): number {
  const ends = [low, (low + high) / 2, high].map((n) => normalCdf((n - limit) / u));
  const mean = ((ends[0] ?? 0) + 4 * (ends[1] ?? 0) + (ends[2] ?? 0)) / 6;
  return Math.min(Math.max(mean, NEVER), 1 - NEVER);
}

/** Censored readings of one attribute: sound ones repeat the same truth, so only the number of blunders tells cases apart. */
function overVariants(record: PreparedRecord, pooled: PooledNumber, p: number): ByBlunders {
  const n = pooled.over.length;
  const { blunderRate: rate, blunderOverLimit } = record.settings;
  const sums: [number, number, number] = [0, 0, 0];
  const choose = [1, n, (n * (n - 1)) / 2];
  for (let b = 0; b <= Math.min(n, MAX_BLUNDERS); b += 1) {
    sums[b as 0 | 1 | 2] = (choose[b] ?? 0) * (rate * blunderOverLimit) ** b * (1 - rate) ** (n - b) * (b === n ? 1 : p);
  }
  return sums;
}

function sumVariants(variants: readonly Variant[], density: (sound: NonNullable<Variant['sound']>) => number): ByBlunders {
  const sums: [number, number, number] = [0, 0, 0];
  for (const { blunders, weight, sound } of variants) sums[blunders as 0 | 1 | 2] += sound === null ? weight : weight * density(sound);
  return sums;
}
