import type { EntityManager } from 'typeorm';
import type { BackState } from '@shared/api/loans';
import { nextStep } from '@shared/lending';
import { invalid, refused } from '@/server/http/problem';
import { recordCustody } from '@/server/features/custody/custody.service';
import { resolveLabel } from '@/server/features/labels/resolve';
import { lockLoan, moveLoan } from '@/server/features/loans/loanState';
import { advance, endStone, setAside } from './advance';
import { benchLoanFor, openCheckFor, openStone } from './access';
import { benchStones } from './bench.queries';

interface By { accountId: string; now: Date }

/** Begins the check with a scan of the kit's own label; scanning it again later changes nothing. */
export async function openCheck(tx: EntityManager, loanId: string, code: string, by: By): Promise<void> {
  const loan = await benchLoanFor(tx, loanId, by.accountId);
  const label = await resolveLabel(tx, code, 'code');
  if (label.kitId !== loan.kitId) throw invalid('code', `This label belongs to kit ${label.kitNumber}. Scan the label of kit ${loan.kitNumber}.`);
  if (label.stoneId !== null) throw invalid('code', `This is the label of jar ${label.slot ?? ''}. Scan the label of the kit itself first.`);
  const locked = await lockLoan(tx, loanId);
  if (locked.state === 'checking' || locked.state === 'set_aside') return;
  await moveLoan(tx, locked, 'checking', by.now);
  await tx.query('UPDATE loan SET bench_opened_at = $2 WHERE id = $1', [loanId, by.now]);
  await recordCustody(tx, { schoolId: loan.schoolId, kitId: loan.kitId, loanId, kind: 'bench_opened', actorId: by.accountId, at: by.now });
}

const jarEvents = { seen: 'jar_seen_bench', missing: 'jar_missing_bench', damaged: 'jar_damaged_bench' } as const;

/** Notes what the bench finds of one jar: seen (by its label, or picked from the list), missing or damaged. */
export async function seeJar(
  tx: EntityManager, loanId: string,
  jar: { code?: string | undefined; stoneId?: string | undefined; state: BackState; condition?: string | undefined }, by: By,
): Promise<void> {
  const loan = await openCheckFor(tx, loanId, by.accountId);
  await lockLoan(tx, loanId);
  const stoneId = await jarStone(tx, loan, jar);
  const stone = await openStone(tx, loan, stoneId);
  if (stone.firstReaderId !== null && jar.state === 'missing') {
    throw refused('already_read', `Jar ${stone.slot} has readings in this check, so its stone was here. Look for it, or note damage.`);
  }
  await tx.query('UPDATE loan_stone SET bench_state = $3, bench_at = $4 WHERE loan_id = $1 AND stone_id = $2', [loanId, stoneId, jar.state, by.now]);
  if (stone.benchState !== jar.state) {
    await recordCustody(tx, {
      schoolId: loan.schoolId, kitId: loan.kitId, stoneId, loanId, kind: jarEvents[jar.state], actorId: by.accountId, at: by.now,
      detail: { condition: jar.condition ?? '' },
    });
  }
  await advance(tx, loanId, by.accountId, by.now);
}

async function jarStone(tx: EntityManager, loan: { kitId: string; kitNumber: string }, jar: { code?: string | undefined; stoneId?: string | undefined }): Promise<string> {
  if (jar.code === undefined) {
    if (jar.stoneId === undefined) throw invalid('code', 'Scan or type the code of a jar, or pick the jar from the list.');
    return jar.stoneId;
  }
  const label = await resolveLabel(tx, jar.code, 'code');
  if (label.kitId !== loan.kitId) throw invalid('code', `This jar belongs to kit ${label.kitNumber}. Put it back there and scan a jar of kit ${loan.kitNumber}.`);
  if (label.stoneId === null) throw invalid('code', 'This is the label of the kit. Scan one of its jars.');
  return label.stoneId;
}

/** Asks a colleague for a reading of their own: the kit is set aside until it is in. */
export async function askSecondReading(tx: EntityManager, loanId: string, stoneId: string, by: By): Promise<void> {
  const loan = await openCheckFor(tx, loanId, by.accountId);
  await lockLoan(tx, loanId);
  const stone = await openStone(tx, loan, stoneId);
  if (stone.firstReaderId === null) throw refused('no_first_reading', `Jar ${stone.slot} has no reading yet. Take the first readings, then ask for a second.`);
  if (stone.secondReadingWanted) return;
  await tx.query('UPDATE loan_stone SET second_reading_wanted_at = $3 WHERE loan_id = $1 AND stone_id = $2', [loanId, stoneId, by.now]);
  await recordCustody(tx, {
    schoolId: loan.schoolId, kitId: loan.kitId, stoneId, loanId, kind: 'second_reading_asked', actorId: by.accountId, at: by.now,
  });
  await setAside(tx, loanId, by.accountId, by.now);
}

/** One of the two people who accept a stone that readings did not settle; the second acceptance ends it. */
export async function acceptStone(tx: EntityManager, loanId: string, stoneId: string, reason: string, by: By): Promise<void> {
  const loan = await openCheckFor(tx, loanId, by.accountId);
  await lockLoan(tx, loanId);
  const stone = await openStone(tx, loan, stoneId);
  if (nextStep(stone, stone.firstReaderId ?? '', false) !== 'two_people') {
    throw refused('not_for_acceptance', `Jar ${stone.slot} is not waiting for two people: take its readings, and a second person's where the first found another stone.`);
  }
  if (stone.acceptedBy.includes(by.accountId)) {
    throw refused('accepted_already', `You have accepted jar ${stone.slot} already. A second person must accept it too.`);
  }
  await tx.query(
    'INSERT INTO stone_acceptance (school_id, loan_id, stone_id, account_id, reason, at) VALUES ($1, $2, $3, $4, $5, $6)',
    [loan.schoolId, loanId, stoneId, by.accountId, reason, by.now],
  );
  await recordCustody(tx, {
    schoolId: loan.schoolId, kitId: loan.kitId, stoneId, loanId, kind: 'stone_accepted', actorId: by.accountId, at: by.now, detail: { reason },
  });
  if (stone.acceptedBy.length >= 1) await endStone(tx, loan, stone, { ending: 'accepted', reason, actorId: by.accountId, now: by.now });
  await advance(tx, loanId, by.accountId, by.now);
}

/** The admin's word on a stone that needs no verdict, or on jars put right by hand. */
export async function endByAdmin(
  tx: EntityManager, loanId: string, stoneId: string, end: { ending: 'missing' | 'damaged' | 'mixed_up'; reason: string }, by: By,
): Promise<void> {
  const loan = await openCheckFor(tx, loanId, by.accountId);
  await lockLoan(tx, loanId);
  const stone = await openStone(tx, loan, stoneId);
  if (end.ending !== 'mixed_up' && stone.benchState !== end.ending) {
    throw refused('not_found_so', `The bench has not noted jar ${stone.slot} as ${end.ending}. Note it at the bench first.`);
  }
  if (end.ending === 'mixed_up' && stone.benchState !== 'seen') {
    throw refused('not_seen', `Jar ${stone.slot} has not been seen at the bench. Scan it first.`);
  }
  if (end.ending === 'damaged' && !(await hasDamagePhoto(tx, loanId, stoneId))) {
    throw refused('photo_missing', `Add a photo of the damage to jar ${stone.slot} first, so that the borrower can see it too.`);
  }
  await endStone(tx, loan, stone, { ...end, actorId: by.accountId, now: by.now });
  await advance(tx, loanId, by.accountId, by.now);
}

/** A photo of the stone taken since it came back. */
async function hasDamagePhoto(tx: EntityManager, loanId: string, stoneId: string): Promise<boolean> {
  const rows = await tx.query<unknown[]>(
    `SELECT 1 FROM photo p JOIN loan l ON l.id = $1
      WHERE p.stone_id = $2 AND p.removed_at IS NULL AND p.created_at >= l.returned_at LIMIT 1`,
    [loanId, stoneId],
  );
  return rows.length > 0;
}

/** True when every stone of the loan has its end. */
export async function allEnded(tx: EntityManager, loanId: string): Promise<boolean> {
  return (await benchStones(tx, loanId)).every((stone) => stone.ending !== null);
}
