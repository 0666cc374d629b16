import type { EntityManager } from 'typeorm';
import type { BenchStone, BenchView, OpenedStone } from '@shared/api/bench';
import type { Attribute } from '@shared/api/evidence';
import { nextStep } from '@shared/lending';
import { speciesName } from '@/server/features/species/speciesName';
import { photosOf } from '@/server/features/photos/photo.queries';
import { recordOf } from '@/server/features/stones/record';
import { checkReadingViews } from '@/server/features/stones/readingViews';
import { Stone } from '@/server/features/stones/stone.entity';
import { benchLoanFor } from './access';
import { benchStones, type BenchStoneRow } from './bench.queries';
import { headline } from './headline';
import { Verdict } from './verdict.entity';

/** Offered for every first entry alike, so that the list is no hint of the record. */
const firstReadings: Attribute[] = ['weight_ct', 'length_mm', 'width_mm', 'height_mm', 'polariscope'];

/** A check as one reader may see it: each stone's record, readings and verdicts open once their own first entry is in, or once it has its end. */
export async function benchView(tx: EntityManager, loanId: string, accountId: string): Promise<BenchView> {
  const loan = await benchLoanFor(tx, loanId, accountId);
  const stones: BenchStone[] = [];
  for (const stone of await benchStones(tx, loanId)) stones.push(await stoneView(tx, loanId, stone, accountId));
  return {
    loanId,
    kitId: loan.kitId,
    kitNumber: loan.kitNumber,
    neutralTitle: loan.neutralTitle,
    state: loan.state === 'returned' || loan.state === 'checking' || loan.state === 'set_aside' ? loan.state : 'settled',
    opened: loan.state !== 'returned',
    stones,
    complete: stones.every((stone) => stone.ending !== null),
  };
}

async function stoneView(tx: EntityManager, loanId: string, stone: BenchStoneRow, accountId: string): Promise<BenchStone> {
  const hasRead = stone.firstReaderId === accountId || stone.secondReaderId === accountId;
  const opened = hasRead || stone.ending !== null ? await openedStone(tx, loanId, stone.stoneId) : null;
  const latest = opened?.verdicts.at(-1);
  return {
    stoneId: stone.stoneId,
    slot: stone.slot,
    neutralDescription: stone.neutralDescription,
    marks: stone.marks,
    flags: stone.flags,
    backState: stone.backState,
    backCondition: stone.backCondition,
    benchState: stone.benchState,
    step: nextStep(stone, accountId, latest === undefined || latest.result.next.length > 0),
    ending: stone.ending,
    suggested: firstReadings,
    opened,
  };
}

async function openedStone(tx: EntityManager, loanId: string, stoneId: string): Promise<OpenedStone> {
  const stone = await tx.findOneByOrFail(Stone, { id: stoneId });
  const record = await recordOf(tx, stoneId);
  const verdicts = await tx.find(Verdict, { where: { loanId, stoneId }, order: { seq: 'ASC' } });
  const acceptances = await tx.query<{ id: string; name: string; reason: string; at: Date }[]>(
    `SELECT a.account_id AS id, p.name, a.reason, a.at FROM stone_acceptance a JOIN account p ON p.id = a.account_id
      WHERE a.loan_id = $1 AND a.stone_id = $2 ORDER BY a.at`,
    [loanId, stoneId],
  );
  return {
    species: stone.species,
    speciesName: speciesName(stone.species),
    record: record.values,
    gaps: record.gaps,
    readings: await checkReadingViews(tx, loanId, stoneId),
    photos: await photosOf(tx, stoneId),
    verdicts: verdicts.map(({ id, basis, verdict, result, computedAt }) => ({
      id, basis, verdict, result, headline: headline(result, speciesName), computedAt: computedAt.toISOString(),
    })),
    acceptances: acceptances.map(({ id, name, reason, at }) => ({ by: { id, name }, reason, at: at.toISOString() })),
  };
}
