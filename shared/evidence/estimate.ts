import type {
  Attribute, CategoryReading, CategoryValue, MeasuredValue, NumericAttribute, OverLimit, ReadingInput, RecordedValues,
} from '../api/evidence';
import { ATTRIBUTES } from '../api/evidence';
import { poolNumbers } from './pooling';
import type { EngineSettings } from './settings';
import { DEFAULT_SETTINGS, isCategory } from './settings';

/** Standard uncertainty and count behind a recorded number. */
export interface Estimate extends MeasuredValue { n: number; uInstrument: number }

/** With this many readings their own scatter is believed where it exceeds what their instruments promise. */
const SCATTER_FROM = 3;

/**
 * The record's values from repeated intake readings: the mean of each number and its standard uncertainty by GUM 4.2
 * and 5.1 (repeatability shrinks with √n, the instrument's own part does not, and a scatter larger than the instruments
 * promise is used instead of the promise), and the category most readers saw. "Over the limit" is kept where no number
 * was read. Attributes without a reading are left out.
 */
export function estimateRecord(readings: readonly ReadingInput[], settings: EngineSettings = DEFAULT_SETTINGS): RecordedValues {
  const entries = ATTRIBUTES.flatMap((attribute): [Attribute, unknown][] => {
    const taken = readings.filter((reading) => reading.attribute === attribute);
    if (taken.length === 0) return [];
    return [[attribute, isCategory(attribute) ? mostSeen(taken as CategoryReading[]) : estimateNumber(attribute, taken, settings)]];
  });
  return Object.fromEntries(entries);
}

function estimateNumber(attribute: NumericAttribute, readings: readonly ReadingInput[], settings: EngineSettings): Estimate | OverLimit {
  const pooled = poolNumbers(attribute, readings, settings, 0);
  if (pooled.reads.length === 0) {
    return { value: 'over_limit', limit: pooled.over.reduce((high, { limit }) => Math.max(high, limit), 0), n: pooled.over.length };
  }
  const n = pooled.reads.length;
  const scatter = n < SCATTER_FROM ? 0 : sampleStdDev(pooled.reads.map((read) => read.value)) / Math.sqrt(n);
  const promised = Math.sqrt(Math.max(pooled.u ** 2 - pooled.uInstrument ** 2, 0));
  return {
    value: pooled.mean,
    u: Math.hypot(Math.max(scatter, promised), pooled.uInstrument),
    n,
    uInstrument: pooled.uInstrument,
    ...(pooled.instrument === null ? {} : { instrument: pooled.instrument }),
  };
}

/** Standard deviation of a sample (n − 1). NaN for fewer than two values. */
export function sampleStdDev(values: readonly number[]): number {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  return Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1));
}

/** The value most readings name; a tie goes to the one named first in the attribute's list. */
function mostSeen(readings: readonly CategoryReading[]): CategoryValue {
  const counts = new Map<CategoryValue, number>();
  for (const { value } of readings) counts.set(value, (counts.get(value) ?? 0) + 1);
  const ranked = [...counts].sort(([a, times], [b, others]) => others - times || (a < b ? -1 : 1));
  return ranked[0]?.[0] ?? 'not_found';
}

