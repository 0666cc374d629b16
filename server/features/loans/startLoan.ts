import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { recordCustody } from '@/server/features/custody/custody.service';
import { lendability } from '@/server/features/kits/lendability';
import { resolveLabel } from '@/server/features/labels/resolve';
import { forbidden, invalid, notFound, refused } from '@/server/http/problem';
import type { StartLoanRequest } from '@shared/api/loans';
import { depositMinor, dueAt } from '@shared/lending';
import { may } from '@shared/permissions';
import { lendingRules } from './lendingRules';
import type { LoanActor } from './loanAccess';

const minuteMs = 60_000;
/** Far above what a person carries; it only stops a runaway client from taking the whole shelf. */
const openLoansMax = 20;

/**
 * Reserves a kit for a borrower at once. Of any number who try, the unique index on open loans lets exactly one have it.
 * @returns the new loan's id
 * @throws Refused `kit_taken`, `kit_not_lendable`, `no_terms`, `too_many_loans`; Invalid for a code that is no kit's label
 */
export async function startLoan(tx: EntityManager, request: StartLoanRequest, actor: LoanActor, now: Date): Promise<string> {
  const kitId = await kitOf(tx, request);
  const borrowerId = await borrowerOf(tx, request, actor);
  const rules = await lendingRules(tx);
  await refuseWithoutTerms(tx);
  await refuseTooMany(tx, borrowerId);
  const deposit = depositMinor(rules.depositRule, await replacementValue(tx, kitId));
  const loanId = randomUUID();
  // A rival for the same kit waits in this INSERT until we commit, and then makes no row.
  const made: unknown[] = await tx.query(
    `INSERT INTO loan (id, school_id, kit_id, borrower_id, state, reserved_at, reserved_until, due_at, deposit_minor, currency)
     VALUES ($1, $2, $3, $4, 'reserved', $5, $6, $7, $8, $9)
     ON CONFLICT (kit_id) WHERE state NOT IN ('settled', 'cancelled') DO NOTHING RETURNING id`,
    [loanId, actor.schoolId, kitId, borrowerId, now, new Date(now.getTime() + rules.reservationMinutes * minuteMs),
      dueAt(now, rules.loanDays, rules), deposit, rules.currency],
  );
  if (made.length === 0) throw await taken(tx, kitId, borrowerId);
  await refuseUnlendable(tx, kitId, actor);
  await tx.query(
    `INSERT INTO loan_stone (school_id, loan_id, stone_id, slot)
     SELECT school_id, $1, id, slot FROM stone WHERE kit_id = $2 AND standing = 'in_kit'`,
    [loanId, kitId],
  );
  await recordCustody(tx, { schoolId: actor.schoolId, kitId, loanId, kind: 'kit_reserved', actorId: actor.accountId, forAccountId: borrowerId, at: now });
  return loanId;
}

async function kitOf(tx: EntityManager, { code, kitId }: StartLoanRequest): Promise<string> {
  if ((code === undefined) === (kitId === undefined)) throw invalid('code', 'Scan or type the code of one kit.');
  if (code !== undefined) {
    const label = await resolveLabel(tx, code, 'code');
    if (label.stoneId === null) return label.kitId;
    throw invalid('code', `This is the label of jar ${label.slot ?? ''}. Scan the label of kit ${label.kitNumber} itself first.`, 'jar_label');
  }
  const kits: { id: string }[] = await tx.query('SELECT id FROM kit WHERE id = $1', [kitId]);
  const [kit] = kits;
  if (kit === undefined) throw notFound('There is no such kit in this school. Pick one from the list.', 'kit_not_found');
  return kit.id;
}

async function borrowerOf(tx: EntityManager, { borrowerId }: StartLoanRequest, actor: LoanActor): Promise<string> {
  if (borrowerId === undefined || borrowerId === actor.accountId) return actor.accountId;
  if (!may(actor.roles, 'loan:staff')) throw forbidden('Only staff can take a kit out for somebody else. Leave the borrower out to take it yourself.');
  const members: unknown[] = await tx.query('SELECT 1 FROM membership WHERE account_id = $1 AND school_id = $2 AND ended_at IS NULL', [borrowerId, actor.schoolId]);
  if (members.length === 0) throw invalid('borrowerId', 'This person does not belong to the school. Pick somebody from the list of people.');
  return borrowerId;
}

async function refuseWithoutTerms(tx: EntityManager): Promise<void> {
  const versions: unknown[] = await tx.query('SELECT 1 FROM terms_version LIMIT 1');
  if (versions.length === 0) throw refused('no_terms', 'The school has no lending terms yet, so nothing can go out. Ask an admin to write them in the settings.');
}

async function refuseTooMany(tx: EntityManager, borrowerId: string): Promise<void> {
  const [row]: { count: number }[] = await tx.query(
    "SELECT count(*)::int AS count FROM loan WHERE borrower_id = $1 AND state IN ('reserved', 'out')", [borrowerId]);
  if ((row?.count ?? 0) >= openLoansMax) throw refused('too_many_loans', `That would be more than ${openLoansMax} kits at once. Bring one back first.`);
}

async function replacementValue(tx: EntityManager, kitId: string): Promise<number> {
  const [row]: { sum: string }[] = await tx.query(
    "SELECT coalesce(sum(replacement_value_minor), 0)::text AS sum FROM stone WHERE kit_id = $1 AND standing = 'in_kit'", [kitId]);
  const sum = Number(row?.sum ?? 0);
  if (!Number.isSafeInteger(sum)) throw new RangeError('the value of this kit is too large to be handled exactly');
  return sum;
}

async function taken(tx: EntityManager, kitId: string, borrowerId: string): Promise<Error> {
  const [row]: { number: string; isOwn: boolean }[] = await tx.query(
    `SELECT k.number, coalesce(l.borrower_id = $2, false) AS "isOwn" FROM kit k
       LEFT JOIN loan l ON l.kit_id = k.id AND l.state NOT IN ('settled', 'cancelled') WHERE k.id = $1`,
    [kitId, borrowerId],
  );
  const kit = `Kit ${row?.number ?? ''}`;
  return row?.isOwn === true
    ? refused('kit_taken', `${kit} is yours already. Open it under your loans.`)
    : refused('kit_taken', `${kit} has just been taken by somebody else, or is not back yet. Pick another kit.`);
}

/** Looked at after the loan's row is there, under the kit's lock, so that setting the kit aside comes wholly before or after. */
async function refuseUnlendable(tx: EntityManager, kitId: string, actor: LoanActor): Promise<void> {
  const [kit]: { number: string }[] = await tx.query('SELECT number FROM kit WHERE id = $1 FOR SHARE', [kitId]);
  const { lendable, reasons } = await lendability(tx, kitId);
  if (lendable) return;
  // The reasons may name a stone's readings, so only staff who do not borrow it themselves hear them.
  const why = may(actor.roles, 'kit:read') ? ` ${reasons.join(' ')}` : ' Pick another kit, or ask at the desk.';
  throw refused('kit_not_lendable', `Kit ${kit?.number ?? ''} cannot go out just now.${why}`);
}
