import type { EntityManager } from 'typeorm';
import { In } from 'typeorm';
import type { Attribute, VerdictRequest, VerdictResponse } from '@shared/api/evidence';
import { computeVerdict } from '@shared/evidence';
import { Reading } from '@/server/features/stones/reading.entity';
import { readingInput } from '@/server/features/stones/readingInput';
import { ReadingStrike } from '@/server/features/stones/readingStrike.entity';
import { recordOf } from '@/server/features/stones/record';
import { schoolEngineSettings } from '@/server/features/verdicts/engineSettings';
import { BenchSubmission } from './benchSubmission.entity';
import { Verdict, type VerdictBasis } from './verdict.entity';

/** The readings of a stone in this check that still count, with the pass of the reader who took each. */
export async function countingReadings(tx: EntityManager, loanId: string, stoneId: string): Promise<{ reading: Reading; pass: 1 | 2 }[]> {
  const submissions = await tx.find(BenchSubmission, { where: { loanId, stoneId } });
  const passOf = new Map(submissions.map((submission) => [submission.id, submission.pass]));
  const readings = await tx.find(Reading, { where: { loanId, stoneId, purpose: 'check' }, order: { takenAt: 'ASC', position: 'ASC' } });
  const struck = await tx.find(ReadingStrike, { where: { readingId: In(readings.map((reading) => reading.id)) } });
  const struckIds = new Set(struck.map((strike) => strike.readingId));
  return readings
    .filter((reading) => !struckIds.has(reading.id))
    .map((reading) => ({ reading, pass: passOf.get(reading.submissionId ?? '') ?? 1 }));
}

/** Computes and stores the verdict on one basis, with everything it was told. */
export async function judge(
  tx: EntityManager,
  on: { schoolId: string; loanId: string; stoneId: string; basis: VerdictBasis; unavailable: readonly Attribute[]; now: Date },
): Promise<VerdictResponse> {
  const { recorded } = await recordOf(tx, on.stoneId);
  const all = await countingReadings(tx, on.loanId, on.stoneId);
  const wanted = on.basis === 'pooled' ? all : all.filter(({ pass }) => pass === (on.basis === 'first' ? 1 : 2));
  const request: VerdictRequest = { recorded, readings: wanted.map(({ reading }) => readingInput(reading)), unavailable: [...on.unavailable] };
  const settings = await schoolEngineSettings(tx);
  const result = computeVerdict(request, settings);
  await tx.createQueryBuilder().insert().into(Verdict).values({
    schoolId: on.schoolId, loanId: on.loanId, stoneId: on.stoneId, basis: on.basis,
    verdict: result.verdict, log10Lr: result.log10LR, engine: result.engine, settings, request, result, computedAt: on.now,
  }).updateEntity(false).execute();
  return result;
}
