import type { EntityManager } from 'typeorm';
import { blindReason } from '@/server/features/bench/blindness';
import { custodyOf } from '@/server/features/custody/custody.service';
import { forbidden } from '@/server/http/problem';
import { cursorValues, pageOf, rowsToAsk } from '@/server/http/paging';
import type { Page } from '@shared/api/common';
import type { LoanState, PaymentState, StaffLoanRow, StaffLoanView } from '@shared/api/loans';
import { isOverdue, loanView } from './loanView';
import type { StaffLoansQuery } from './loans.dto';
import { noSuchLoan } from './loanState';

interface Row {
  id: string;
  kitId: string;
  kitNumber: string;
  title: string;
  neutralTitle: string;
  borrowerId: string;
  borrowerName: string;
  state: LoanState;
  reservedAt: Date;
  reservedKey: string;
  dueAt: Date;
  depositMinor: string;
  currency: string;
  depositState: PaymentState | null;
  openSlots: string | null;
  objected: boolean;
}

const columns = `l.id, l.kit_id AS "kitId", k.number AS "kitNumber", k.title, k.neutral_title AS "neutralTitle",
  l.borrower_id AS "borrowerId", a.name AS "borrowerName", l.state, l.due_at AS "dueAt",
  to_char(l.reserved_at AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') AS "reservedKey",
  l.deposit_minor AS "depositMinor", l.currency,
  (SELECT p.state FROM payment p WHERE p.loan_id = l.id ORDER BY (p.state = 'cancelled'), p.created_at DESC LIMIT 1) AS "depositState",
  (SELECT string_agg(s.slot, ', ' ORDER BY s.slot) FROM loan_stone s WHERE s.loan_id = l.id AND s.ending IS NULL) AS "openSlots",
  EXISTS (SELECT 1 FROM objection o WHERE o.loan_id = l.id AND o.answer IS NULL) AS objected`;
const tables = 'FROM loan l JOIN kit k ON k.id = l.kit_id JOIN account a ON a.id = l.borrower_id';

/** The school's loans, newest first. A loan of the viewer's own shows its neutral title only. */
export async function staffLoans(tx: EntityManager, viewerId: string, query: StaffLoansQuery, now: Date): Promise<Page<StaffLoanRow>> {
  const [reservedKey, id] = cursorValues(query, 2) ?? [];
  const rows: Row[] = await tx.query(
    `SELECT ${columns} ${tables}
      WHERE ($1::text IS NULL OR l.state = $1) AND ($2::uuid IS NULL OR l.borrower_id = $2) AND ($3::uuid IS NULL OR l.kit_id = $3)
        AND ($4::timestamptz IS NULL OR (l.reserved_at, l.id) < ($4::timestamptz, $5::uuid))
      ORDER BY l.reserved_at DESC, l.id DESC LIMIT $6`,
    [query.state ?? null, query.borrowerId ?? null, query.kitId ?? null, reservedKey ?? null, id ?? null, rowsToAsk(query)],
  );
  return pageOf(query, rows, (row) => [row.reservedKey, row.id], (row) => toRow(row, row.borrowerId === viewerId, now));
}

/**
 * One loan for staff, with the custody of its kit and stones meanwhile.
 * @throws Forbidden `own_loan` for the borrower, who sees it as any borrower does
 */
export async function staffLoan(tx: EntityManager, loanId: string, viewerId: string, now: Date): Promise<StaffLoanView> {
  const [row]: Row[] = await tx.query(`SELECT ${columns} ${tables} WHERE l.id = $1`, [loanId]);
  if (row === undefined) throw noSuchLoan();
  if (row.borrowerId === viewerId) throw forbidden('You borrowed this kit, so it opens to you under your own loans only. A colleague sees to the rest.', 'own_loan');
  // Whoever still owes a blind reading must not learn from the title or the events what the first reader found.
  const isBlind = (await blindReason(tx, viewerId, row.kitId)) !== null;
  const custody = await custodyOf(tx, { loanId });
  return {
    ...toRow(row, isBlind, now),
    loan: await loanView(tx, loanId, viewerId, now),
    custody: isBlind ? custody.filter((event) => !telling.has(event.kind)) : custody,
    ownLoan: false,
  };
}

const telling: ReadonlySet<string> = new Set(['verdict_reached', 'stone_ended', 'jar_damaged_bench', 'second_reading_asked', 'stone_accepted']);

function toRow(row: Row, isBlind: boolean, now: Date): StaffLoanRow {
  return {
    id: row.id, kitId: row.kitId, kitNumber: row.kitNumber,
    title: isBlind ? row.neutralTitle : row.title,
    borrower: { id: row.borrowerId, name: row.borrowerName },
    state: row.state, dueAt: row.dueAt.toISOString(), overdue: isOverdue(row, now),
    depositMinor: Number(row.depositMinor), currency: row.currency, depositState: row.depositState ?? 'none',
    open: openWords(row),
  };
}

function openWords(row: Row): string {
  if (row.objected) return 'objection to answer';
  const jars = row.openSlots === null ? '' : `jar ${row.openSlots} open`;
  switch (row.state) {
    case 'reserved':
      return 'being taken out';
    case 'returned':
      return 'in the return box';
    case 'checking':
      return jars;
    case 'set_aside':
      return jars === '' ? 'deposit to decide' : jars;
    default:
      return '';
  }
}
