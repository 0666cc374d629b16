import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import {
  accountKinds, addPostings, noBalances, overdrawn, postingsFor, reversalOf,
  type AccountKind, type Balances, type Movement, type Posting, type TransferKind,
} from '@shared/money';

/** The books would say something impossible: money released that was not held, kept that was paid back. Never shown to a client. */
export class LedgerRefusal extends Error {
  override readonly name = 'LedgerRefusal';
}

export interface NewTransfer {
  readonly schoolId: string;
  readonly loanId: string;
  /** Its row must be locked by the caller: the balances of one payment are read before they are changed. */
  readonly paymentId: string;
  readonly currency: string;
  readonly movement: Movement;
  /** Names the movement once and for all, e.g. `hold_released:<payment id>`: a retry posts nothing more. */
  readonly key: string;
  readonly memo?: string;
  readonly at: Date;
}

/**
 * Posts one movement of a deposit. The only writer of money rows is this file.
 * @returns whether it was new; false when the key was posted before
 * @throws LedgerRefusal when an account of this payment would end on its wrong side
 */
export async function post(tx: EntityManager, transfer: NewTransfer): Promise<boolean> {
  const postings = postingsFor(transfer.movement);
  return write(tx, { ...transfer, kind: transfer.movement.kind, reversesTransferId: null }, postings);
}

/** Corrects a transfer by another that undoes it; a transfer can be reversed once. */
export async function reverse(tx: EntityManager, of: { transferId: string; memo: string; at: Date }): Promise<boolean> {
  const lines: (Posting & { schoolId: string; loanId: string; paymentId: string; currency: string })[] = await tx.query(
    `SELECT a.kind AS account, p.amount_minor::float8 AS "amountMinor", t.school_id AS "schoolId", t.loan_id AS "loanId",
            t.payment_id AS "paymentId", p.currency
       FROM ledger_transfer t JOIN ledger_posting p ON p.transfer_id = t.id JOIN ledger_account a ON a.id = p.account_id
      WHERE t.id = $1`,
    [of.transferId],
  );
  const [first] = lines;
  if (first === undefined) throw new LedgerRefusal(`there is no transfer ${of.transferId}`);
  const about = { schoolId: first.schoolId, loanId: first.loanId, paymentId: first.paymentId, currency: first.currency };
  return write(tx, { ...about, ...of, kind: 'reversal', key: `reversal:${of.transferId}`, reversesTransferId: of.transferId }, reversalOf(lines));
}

interface TransferRow {
  schoolId: string; loanId: string; paymentId: string; currency: string;
  kind: TransferKind; key: string; memo?: string; at: Date; reversesTransferId: string | null;
}

async function write(tx: EntityManager, row: TransferRow, postings: readonly Posting[]): Promise<boolean> {
  const id = randomUUID();
  const made: unknown[] = await tx.query(
    `INSERT INTO ledger_transfer (id, school_id, loan_id, payment_id, kind, key, reverses_transfer_id, memo, at)
     VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9) ON CONFLICT (school_id, key) DO NOTHING RETURNING id`,
    [id, row.schoolId, row.loanId, row.paymentId, row.kind, row.key, row.reversesTransferId, row.memo ?? '', row.at],
  );
  if (made.length === 0) return false;
  const wrong = overdrawn(addPostings(await balancesOf(tx, { paymentId: row.paymentId }), postings));
  if (wrong.length > 0) throw new LedgerRefusal(`${row.kind} would overdraw ${wrong.join(', ')} of payment ${row.paymentId}`);
  for (const { account, amountMinor } of postings) {
    await tx.query(
      'INSERT INTO ledger_posting (school_id, transfer_id, account_id, amount_minor, currency) VALUES ($1, $2, $3, $4, $5)',
      [row.schoolId, id, await accountId(tx, row.schoolId, account, row.currency), amountMinor, row.currency],
    );
  }
  return true;
}

/** Accounts come to be when something is first posted to them. */
async function accountId(tx: EntityManager, schoolId: string, kind: AccountKind, currency: string): Promise<string> {
  const find = async (): Promise<string | undefined> => {
    const rows: { id: string }[] = await tx.query('SELECT id FROM ledger_account WHERE kind = $1 AND currency = $2', [kind, currency]);
    return rows[0]?.id;
  };
  const known = await find();
  if (known !== undefined) return known;
  await tx.query('INSERT INTO ledger_account (school_id, kind, currency) VALUES ($1, $2, $3) ON CONFLICT DO NOTHING', [schoolId, kind, currency]);
  const made = await find();
  if (made === undefined) throw new LedgerRefusal(`no account ${kind} in ${currency}`);
  return made;
}

/** Balances of the whole school in one currency, of one loan or of one payment; debit positive, minor units. */
export async function balancesOf(tx: EntityManager, of: { currency: string } | { loanId: string } | { paymentId: string }): Promise<Balances> {
  const [condition, value] = 'currency' in of ? ['a.currency', of.currency] : 'loanId' in of ? ['t.loan_id', of.loanId] : ['t.payment_id', of.paymentId];
  const rows: { kind: AccountKind; sum: string }[] = await tx.query(
    `SELECT a.kind, sum(p.amount_minor)::text AS sum
       FROM ledger_posting p JOIN ledger_account a ON a.id = p.account_id JOIN ledger_transfer t ON t.id = p.transfer_id
      WHERE ${condition} = $1 GROUP BY a.kind`,
    [value],
  );
  return addPostings(noBalances, rows.map(({ kind, sum }) => ({ account: kind, amountMinor: exact(sum) })));
}

/** Sum of every balance of the school over all currencies' accounts; anything but 0 is an error of the books. */
export async function ledgerSum(tx: EntityManager): Promise<number> {
  const [row]: { sum: string }[] = await tx.query('SELECT coalesce(sum(amount_minor), 0)::text AS sum FROM ledger_posting');
  return exact(row?.sum ?? '0');
}

export interface StatementLine {
  id: string;
  at: Date;
  kind: TransferKind;
  memo: string;
  account: AccountKind;
  amountMinor: number;
}

/** Every posting of a loan in the order it was made. */
export async function statementLines(tx: EntityManager, loanId: string): Promise<StatementLine[]> {
  const rows: (Omit<StatementLine, 'amountMinor'> & { amount: string })[] = await tx.query(
    `SELECT p.id, t.at, t.kind, t.memo, a.kind AS account, p.amount_minor::text AS amount
       FROM ledger_transfer t JOIN ledger_posting p ON p.transfer_id = t.id JOIN ledger_account a ON a.id = p.account_id
      WHERE t.loan_id = $1 ORDER BY t.seq, array_position($2::text[], a.kind)`,
    [loanId, accountKinds],
  );
  return rows.map(({ amount, ...line }) => ({ ...line, amountMinor: exact(amount) }));
}

function exact(text: string): number {
  const number = Number(text);
  if (!Number.isSafeInteger(number)) throw new RangeError(`the sum ${text} is too large to be handled exactly`);
  return number;
}
