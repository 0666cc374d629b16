import type { EntityManager } from 'typeorm';
import { endingFromVerdicts, nextStep } from '@shared/lending';
import type { StoneEnding } from '@shared/api/loans';
import type { BackState } from '@shared/api/loans';
import { recordCustody } from '@/server/features/custody/custody.service';
import { lockLoan, moveLoan } from '@/server/features/loans/loanState';
import { queueMail } from '@/server/mail/queueMail';
import { releaseAll } from '@/server/features/settlement/release';
import { setKitAside } from '@/server/features/kits/standing';
import { benchStones, secondReaders, type BenchLoan, type BenchStoneRow } from './bench.queries';

/** Gives a stone its end, with its custody event; the stone's own standing follows where it is no longer in the kit as recorded. */
export async function endStone(
  tx: EntityManager,
  loan: BenchLoan,
  stone: { stoneId: string; slot: string },
  end: { ending: StoneEnding; reason: string; actorId: string; now: Date },
): Promise<void> {
  await tx.query(
    'UPDATE loan_stone SET ending = $3, ended_at = $4, ended_by = $5, end_reason = $6 WHERE loan_id = $1 AND stone_id = $2 AND ending IS NULL',
    [loan.id, stone.stoneId, end.ending, end.now, end.actorId, end.reason],
  );
  if (end.ending === 'missing' || end.ending === 'damaged' || end.ending === 'different') {
    await tx.query('UPDATE stone SET standing = $2, version = version + 1 WHERE id = $1', [stone.stoneId, end.ending]);
  }
  await recordCustody(tx, {
    schoolId: loan.schoolId, kitId: loan.kitId, stoneId: stone.stoneId, loanId: loan.id, kind: 'stone_ended',
    actorId: end.actorId, at: end.now, detail: { ending: end.ending.replace('_', ' '), reason: end.reason || 'readings' },
  });
}

/** Ends a stone when its verdicts alone allow it. */
export async function endByVerdicts(tx: EntityManager, loan: BenchLoan, stone: BenchStoneRow, actorId: string, now: Date): Promise<void> {
  const ending = endingFromVerdicts(stone);
  if (ending !== null) await endStone(tx, loan, stone, { ending, reason: '', actorId, now });
}

/**
 * Moves the loan on after something happened at the bench.
 * All stones the same: settled, the whole deposit released. Nothing left for the first reader but somebody else is
 * wanted: set aside. Else the check simply goes on.
 */
export async function advance(tx: EntityManager, loanId: string, actorId: string, now: Date): Promise<void> {
  const loan = await lockLoan(tx, loanId);
  const stones = await benchStones(tx, loanId);
  if (loan.state !== 'checking' && loan.state !== 'set_aside') return;
  const bad: readonly (StoneEnding | null)[] = ['missing', 'damaged', 'different'];
  if (stones.every((stone) => stone.ending !== null && !bad.includes(stone.ending))) {
    await releaseAll(tx, loan, actorId, now);
    return;
  }
  if (loan.state === 'checking' && stones.every((stone) => waitsForOthers(stone))) await setAside(tx, loanId, actorId, now);
}

function waitsForOthers(stone: BenchStoneRow): boolean {
  if (stone.ending !== null) return true;
  const step = nextStep(stone, stone.firstReaderId ?? '', true);
  return step === 'admin' || step === 'two_people' || (step === 'second_reader' && stone.secondReadingWanted);
}

const absent: readonly (BackState | null)[] = ['missing', 'damaged'];

/** The kit leaves lending until people decide: its loan, its standing, and mail to the borrower, the other instructors and the admins. */
export async function setAside(tx: EntityManager, loanId: string, actorId: string, now: Date): Promise<void> {
  const loan = await lockLoan(tx, loanId);
  const stones = await benchStones(tx, loanId);
  const open = stones.filter((stone) => stone.ending === null || stone.ending === 'missing' || stone.ending === 'damaged' || stone.ending === 'different');
  const slots = open.map((stone) => stone.slot);
  if (loan.state === 'checking') {
    await moveLoan(tx, loan, 'set_aside', now);
    const reason = `Bench check: open question about jar ${slots.join(', ')}`;
    await setKitAside(tx, { kitId: loan.kitId, schoolId: loan.schoolId, reason, actorId, loanId, now });
  }
  const [kit] = await tx.query<{ kitNumber: string; neutralTitle: string }[]>(
    'SELECT number AS "kitNumber", neutral_title AS "neutralTitle" FROM kit WHERE id = $1', [loan.kitId]);
  if (kit === undefined) return;
  const about = { loanId, kit };
  const deposit = loan.depositMinor === 0 ? null : { amountMinor: loan.depositMinor, currency: loan.currency };
  await queueMail(tx, {
    schoolId: loan.schoolId, toAccountId: loan.borrowerId, template: 'kit-set-aside', dedupeKey: `kit-set-aside:${loanId}`, data: { ...about, slots, deposit },
  });
  const wanted = open.filter((stone) => stone.secondReadingWanted && stone.secondReaderId === null).map((stone) => stone.slot);
  const toTell = wanted.length > 0 || open.some((stone) => absent.includes(stone.benchState)) ? slots : [];
  if (toTell.length === 0) return;
  const readers = open.flatMap((stone) => (stone.firstReaderId === null ? [] : [stone.firstReaderId]));
  for (const accountId of await secondReaders(tx, [loan.borrowerId, ...readers])) {
    await queueMail(tx, {
      schoolId: loan.schoolId, toAccountId: accountId, template: 'second-reading-wanted',
      dedupeKey: `second-reading:${loanId}:${toTell.join('')}`, data: { ...about, slots: toTell },
    });
  }
}
