import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { type Attribute, ATTRIBUTES } from '@shared/api/evidence';
import { INSTRUMENT_FOR } from '@shared/api/instruments';
import type { ReadingEntry } from '@shared/api/kits';
import { forbidden, notFound, refused } from '@/server/http/problem';
import { recordCustody } from '@/server/features/custody/custody.service';
import { lockLoan } from '@/server/features/loans/loanState';
import { Reading } from '@/server/features/stones/reading.entity';
import { ReadingStrike } from '@/server/features/stones/readingStrike.entity';
import { prepareReadings } from '@/server/features/stones/readingEntry';
import { advance, endByVerdicts } from './advance';
import { openCheckFor, openStone } from './access';
import { benchStones, type BenchStoneRow } from './bench.queries';
import { BenchSubmission } from './benchSubmission.entity';
import { judge } from './judge';
import type { VerdictBasis } from './verdict.entity';

/**
 * Hands in one reader's readings of a stone and computes the verdict from all of theirs.
 * The first entry of each reader is blind; repeats add and never replace. Two readers who disagree are pooled.
 */
export async function submitReadings(
  tx: EntityManager, loanId: string, stoneId: string, entries: readonly ReadingEntry[], by: { accountId: string; now: Date },
): Promise<void> {
  const loan = await openCheckFor(tx, loanId, by.accountId);
  await lockLoan(tx, loanId);
  const stone = await openStone(tx, loan, stoneId);
  const pass = passFor(stone, by.accountId);
  const submission = { id: randomUUID(), schoolId: loan.schoolId, loanId, stoneId, readerId: by.accountId, pass, blind: isFirstEntry(stone, by.accountId), submittedAt: by.now };
  await tx.insert(BenchSubmission, submission);
  const rows = await prepareReadings(tx, entries);
  await tx.insert(Reading, rows.map((row, position) => ({
    ...row, schoolId: loan.schoolId, stoneId, loanId, submissionId: submission.id, purpose: 'check' as const,
    readerId: by.accountId, observer: 'instructor' as const, takenAt: by.now, position,
  })));
  await judgeStone(tx, loan, stoneId, pass, by);
  await advance(tx, loanId, by.accountId, by.now);
}

/** Strikes one of the reader's own readings, with a reason, and judges again without it; the row stays visible. */
export async function strikeReading(
  tx: EntityManager, loanId: string, readingId: string, reason: string, by: { accountId: string; now: Date },
): Promise<void> {
  const loan = await openCheckFor(tx, loanId, by.accountId);
  await lockLoan(tx, loanId);
  const reading = await tx.findOneBy(Reading, { id: readingId, loanId });
  if (reading === null) throw notFound('There is no such reading in this check. Pick one from the list.');
  const stone = await openStone(tx, loan, reading.stoneId);
  if (reading.readerId !== by.accountId) throw forbidden('Only the person who took a reading strikes it. Ask them.', 'not_your_reading');
  if (await tx.existsBy(ReadingStrike, { readingId })) throw refused('struck_already', 'This reading is struck already.');
  await tx.insert(ReadingStrike, { readingId, schoolId: loan.schoolId, struckBy: by.accountId, reason, struckAt: by.now });
  await recordCustody(tx, {
    schoolId: loan.schoolId, kitId: loan.kitId, stoneId: reading.stoneId, loanId, kind: 'reading_struck', actorId: by.accountId, at: by.now, detail: { reason },
  });
  await judgeStone(tx, loan, reading.stoneId, stone.firstReaderId === by.accountId ? 1 : 2, by);
  await advance(tx, loanId, by.accountId, by.now);
}

async function judgeStone(
  tx: EntityManager, loan: Awaited<ReturnType<typeof openCheckFor>>, stoneId: string, pass: 1 | 2, by: { accountId: string; now: Date },
): Promise<void> {
  const unavailable = await unavailableAttributes(tx);
  const basis: VerdictBasis = pass === 1 ? 'first' : 'second';
  const on = { schoolId: loan.schoolId, loanId: loan.id, stoneId, unavailable, now: by.now };
  let result = await judge(tx, { ...on, basis });
  const stone = await refreshed(tx, loan.id, stoneId);
  if (stone.secondReaderId !== null && !(stone.first === 'different' && stone.second === 'different')) {
    result = await judge(tx, { ...on, basis: 'pooled' });
  }
  await recordCustody(tx,
    { schoolId: loan.schoolId, kitId: loan.kitId, stoneId, loanId: loan.id, kind: 'stone_read', actorId: by.accountId, at: by.now },
    { schoolId: loan.schoolId, kitId: loan.kitId, stoneId, loanId: loan.id, kind: 'verdict_reached', actorId: null, at: by.now, detail: { verdict: verdictWords[result.verdict] } },
  );
  await endByVerdicts(tx, loan, await refreshed(tx, loan.id, stoneId), by.accountId, by.now);
}

const verdictWords = { same: 'same stone', different: 'different stone', not_settled: 'not settled' } as const;

async function refreshed(tx: EntityManager, loanId: string, stoneId: string): Promise<BenchStoneRow> {
  const stone = (await benchStones(tx, loanId)).find((row) => row.stoneId === stoneId);
  if (stone === undefined) throw new Error('A stone of a locked loan cannot vanish.');
  return stone;
}

/** Which reader this is. A second reader comes in only where one is wanted, and there is no third. */
function passFor(stone: BenchStoneRow, accountId: string): 1 | 2 {
  if (stone.benchState === null) throw refused('jar_not_seen', `Scan jar ${stone.slot} before you enter its readings.`);
  if (stone.benchState === 'missing') throw refused('jar_missing', `Jar ${stone.slot} was noted as missing. Scan it if it has turned up.`);
  if (stone.firstReaderId === null || stone.firstReaderId === accountId) return 1;
  if (stone.secondReaderId === accountId) return 2;
  if (stone.secondReaderId !== null) {
    throw refused('two_readers_already', `Two people have read jar ${stone.slot}. What is open now is for two people to decide.`);
  }
  if (!stone.secondReadingWanted) {
    throw refused('second_not_wanted', `A colleague is reading jar ${stone.slot}. They can ask for a second reading; take another jar meanwhile.`);
  }
  return 2;
}

const isFirstEntry = (stone: BenchStoneRow, accountId: string): boolean =>
  stone.firstReaderId !== accountId && stone.secondReaderId !== accountId;

/** Attributes for which the school has no working instrument: never proposed as the next reading. */
export async function unavailableAttributes(tx: EntityManager): Promise<Attribute[]> {
  const rows = await tx.query<{ kind: string }[]>('SELECT DISTINCT kind FROM instrument WHERE retired_at IS NULL');
  const kinds = new Set(rows.map((row) => row.kind));
  return ATTRIBUTES.filter((attribute) => {
    const kind = INSTRUMENT_FOR[attribute];
    return kind !== null && !kinds.has(kind);
  });
}
