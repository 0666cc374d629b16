import type { Alternative, Attribute, Contribution, VerdictRequest, VerdictResponse } from '../api/evidence';
import { cautionsFor } from './cautions';
import { speciesModels } from './components';
import { isNumeric, judge, scoreAgainstRecord } from './judge';
import type { Judgement } from './judge';
import { likelihoods, poolReadings } from './likelihood';
import type { PooledReadings } from './likelihood';
import { rankNextReadings } from './next';
import type { PreparedRecord } from './record';
import { prepareRecord } from './record';
import { liquidLimit } from './refraction';
import { supportOf } from './scores';
import type { EngineSettings } from './settings';
import { DEFAULT_SETTINGS } from './settings';

export interface VerdictOptions {
  /** Rank the readings still worth taking (some milliseconds); otherwise `next` is empty. Default true. */
  readonly rankNext?: boolean;
}

/** Other species below this share are not listed. */
const SMALLEST_SHARE = 0.01;
const MOST_ALTERNATIVES = 5;

/**
 * Weighs the readings against the record: verdict, log10 LR, what each reading brought, what else the stone could be, and
 * the readings worth taking next. Pure and deterministic: the same request and settings give the same digits.
 * The request must have passed `validateVerdictRequest`; an unknown species throws RangeError.
 */
export function computeVerdict(request: VerdictRequest, settings: EngineSettings = DEFAULT_SETTINGS, { rankNext = true }: VerdictOptions = {}): VerdictResponse {
  const record = prepareRecord(request.recorded, settings);
  const pooled = poolReadings(record, request.readings);
  const found = likelihoods(record, pooled);
  const judgement = judge(record, pooled, found);
  const next = rankNext && judgement.verdict === 'not_settled' ? rankNextReadings(record, request, found, judgement) : [];
  return {
    verdict: judgement.verdict,
    log10LR: judgement.log10LR,
    ...supportOf(judgement.log10LR),
    contributions: pooled.present.map((attribute, i) => contribution(record, pooled, attribute, judgement.steps[i] ?? 0)),
    alternatives: alternatives(found.bySpecies, settings),
    next,
    cautions: cautionsFor(record, pooled, judgement, { next, ranked: rankNext }),
    engine: settings.version,
  };
}

function contribution(record: PreparedRecord, pooled: PooledReadings, attribute: Attribute, log10LR: number): Contribution {
  if (!isNumeric(attribute)) {
    const readings = pooled.categories[attribute] ?? [];
    const values = [...new Set(readings.map((reading) => reading.value))];
    const recorded = record.categories[attribute] ?? null;
    // Where looks disagree the one that differs from the record is shown: it is what the reader must see.
    const value = values.find((entry) => entry !== recorded) ?? values[0] ?? 'not_found';
    return { attribute, value, u: null, recorded, recordedU: null, log10LR, z: null, en: null, readings: readings.length };
  }
  const read = pooled.numbers[attribute];
  const recorded = record.numbers[attribute];
  const censored = record.limits[attribute] === undefined ? null : ('over_limit' as const);
  const shared = { attribute, recorded: recorded?.value ?? censored, recordedU: recorded?.u ?? null, log10LR };
  if (read === undefined || read.reads.length === 0) {
    return { ...shared, value: 'over_limit', u: null, z: null, en: null, readings: read?.over.length ?? 0, ...(read && { limit: liquidLimit(read) }) };
  }
  const sound = { variance: read.u ** 2, instrumentVariance: read.uInstrument ** 2 };
  const score = scoreAgainstRecord(record, attribute, read.mean, sound, read.instrument);
  return { ...shared, value: read.mean, u: read.u, z: score?.z ?? null, en: score?.en ?? null, readings: read.reads.length + read.over.length };
}

function alternatives(bySpecies: readonly number[], settings: EngineSettings): Alternative[] {
  const sum = bySpecies.reduce((total, share) => total + share, 0);
  return speciesModels(settings)
    .map(({ row }, k) => ({ species: row.id, share: (bySpecies[k] ?? 0) / sum }))
    .filter(({ share }) => share >= SMALLEST_SHARE)
    .sort((a, b) => b.share - a.share)
    .slice(0, MOST_ALTERNATIVES);
}

export type { Judgement };
