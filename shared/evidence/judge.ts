import type { Attribute, CategoryReading, NumericAttribute, RefractiveAttribute, VerdictWord } from '../api/evidence';
import { NUMERIC_ATTRIBUTES, REFRACTIVE_ATTRIBUTES } from '../api/evidence';
import { comparedVariance } from './body';
import type { Likelihoods, PooledReadings } from './likelihood';
import type { PooledNumber } from './pooling';
import type { PreparedRecord } from './record';
import { recordedInterval } from './refraction';
import type { EvidenceGroup } from './settings';
import { GROUP_OF, isCategory } from './settings';

/** The verdict and what it rests on. */
export interface Judgement {
  readonly verdict: VerdictWord;
  readonly log10LR: number;
  /** Step of log10 LR at each attribute of `present`. */
  readonly steps: readonly number[];
  /** Attributes with a reading too far from the record and nothing to explain it. */
  readonly unexplained: readonly Attribute[];
}

export function judge(record: PreparedRecord, pooled: PooledReadings, { present, own, another }: Likelihoods): Judgement {
  const { rule } = record.settings;
  const running = present.map((_, i) => Math.log10(own[i] ?? 1) - Math.log10(another[i] ?? 1));
  const steps = running.map((value, i) => value - (running[i - 1] ?? 0));
  const log10LR = running[running.length - 1] ?? 0;
  const unexplained = present.filter((attribute) => !isCategory(attribute) && isUnexplained(record, pooled.numbers[attribute]));
  let verdict: VerdictWord = 'not_settled';
  if (log10LR >= Math.log10(rule.sameLR) && unexplained.length === 0) verdict = 'same';
  else if (log10LR <= Math.log10(rule.differentLR) && restsOnEnough(record, pooled, present, steps)) verdict = 'different';
  return { verdict, log10LR, steps, unexplained };
}

/** Two groups that each point away, or one whose deviating reading was taken twice. */
function restsOnEnough(record: PreparedRecord, pooled: PooledReadings, present: readonly Attribute[], steps: readonly number[]): boolean {
  const groups = new Map<EvidenceGroup, number>();
  present.forEach((attribute, i) => groups.set(GROUP_OF[attribute], (groups.get(GROUP_OF[attribute]) ?? 0) + (steps[i] ?? 0)));
  const away = [...groups].filter(([, sum]) => sum <= Math.log10(record.settings.rule.groupLR)).map(([group]) => group);
  if (away.length >= 2) return true;
  return present.some((attribute) => away.includes(GROUP_OF[attribute]) && deviatesTwice(record, pooled, attribute));
}

function deviatesTwice(record: PreparedRecord, pooled: PooledReadings, attribute: Attribute): boolean {
  if (isCategory(attribute)) return agreedElsewhere(record, pooled.categories[attribute] ?? []);
  const numeric = attribute;
  const read = pooled.numbers[numeric];
  if (read === undefined) return false;
  const { farZ } = record.settings.rule;
  const scores = readingScores(record, read);
  if (Math.max(count(scores, (z) => z > farZ), count(scores, (z) => z < -farZ)) >= 2) return true;
  return read.over.length >= 2 && isRefractive(attribute) && (recordedInterval(record, attribute)?.high ?? Infinity) < read.over.reduce((low, { limit }) => Math.min(low, limit), Infinity);
}

/** Two looks that name the same other category; "not found" is no finding. */
function agreedElsewhere(record: PreparedRecord, readings: readonly CategoryReading[]): boolean {
  const attribute = readings[0]?.attribute;
  if (attribute === undefined) return false;
  const recorded = record.categories[attribute];
  return readings.some((a, i) => a.value !== recorded && a.value !== 'not_found' && readings.slice(i + 1).some((b) => b.value === a.value));
}

/** Far readings of an attribute outnumber those that came back near the record, and no damage was noted. */
function isUnexplained(record: PreparedRecord, read: PooledNumber | undefined): boolean {
  if (read === undefined || read.damaged) return false;
  const scores = readingScores(record, read);
  const far = count(scores, (z) => Math.abs(z) > record.settings.rule.farZ);
  return far > 0 && far > scores.length - far;
}

/** Each reading's distance from the record in combined standard uncertainties; empty where the record has nothing to compare. */
export function readingScores(record: PreparedRecord, read: PooledNumber): number[] {
  return read.reads.flatMap((one) => {
    const z = scoreAgainstRecord(record, read.attribute, one.value, { variance: one.u ** 2, instrumentVariance: one.uInstrument ** 2 }, one.instrument);
    return z === null ? [] : [z.z];
  });
}

/** Distance of a number from the record, or from the nearer end where the record is an interval; `en` is E_n with U = 2u. */
export function scoreAgainstRecord(
  record: PreparedRecord, attribute: NumericAttribute, value: number, sound: { variance: number; instrumentVariance: number }, instrument: string | null,
): { z: number; en: number } | null {
  const interval = isRefractive(attribute) ? recordedInterval(record, attribute) : pointOf(record, attribute);
  if (interval === null) return null;
  const distance = value < interval.low ? value - interval.low : value > interval.high ? value - interval.high : 0;
  const z = distance / Math.sqrt(comparedVariance(interval.ends, sound, instrument));
  return { z, en: z / 2 };
}

function pointOf(record: PreparedRecord, attribute: NumericAttribute) {
  const recorded = record.numbers[attribute];
  return recorded === undefined ? null : { low: recorded.value, high: recorded.value, ends: recorded };
}

function isRefractive(attribute: Attribute): attribute is RefractiveAttribute {
  return (REFRACTIVE_ATTRIBUTES as readonly Attribute[]).includes(attribute);
}

export function isNumeric(attribute: Attribute): attribute is NumericAttribute {
  return (NUMERIC_ATTRIBUTES as readonly Attribute[]).includes(attribute);
}

function count<T>(list: readonly T[], test: (entry: T) => boolean): number {
  return list.reduce((sum, entry) => sum + (test(entry) ? 1 : 0), 0);
}
