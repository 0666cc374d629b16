import type { EntityManager } from 'typeorm';
import { DateTime } from 'luxon';
import type { DeskLine, DeskView } from '@shared/api/desk';
import type { LoanState, PaymentState } from '@shared/api/loans';

const listMax = 300;

interface Row {
  id: string;
  kitId: string;
  kitNumber: string;
  title: string;
  borrowerId: string;
  borrowerName: string;
  state: LoanState;
  dueAt: Date;
  depositMinor: string;
  currency: string;
  depositState: PaymentState | null;
  objected: boolean;
  openSlots: string[] | null;
}

/** The day in one list: open loans and unanswered objections, the most pressing first. Loans of the viewer's own show as a student would see them. */
export async function desk(tx: EntityManager, viewerId: string, now: Date): Promise<DeskView> {
  const rows = await tx.query<Row[]>(
    `SELECT l.id, l.kit_id AS "kitId", k.number AS "kitNumber",
            CASE WHEN l.borrower_id = $1 THEN k.neutral_title ELSE k.title END AS title,
            l.borrower_id AS "borrowerId", a.name AS "borrowerName", l.state, l.due_at AS "dueAt",
            l.deposit_minor AS "depositMinor", l.currency, p.state AS "depositState",
            o.loan_id IS NOT NULL AND o.answer IS NULL AS objected,
            array_agg(s.slot ORDER BY s.slot) FILTER (WHERE s.ending IS NULL) AS "openSlots"
       FROM loan l JOIN kit k ON k.id = l.kit_id JOIN account a ON a.id = l.borrower_id JOIN loan_stone s ON s.loan_id = l.id
       LEFT JOIN payment p ON p.loan_id = l.id AND p.state <> 'cancelled'
       LEFT JOIN objection o ON o.loan_id = l.id
      WHERE l.state NOT IN ('settled', 'cancelled') OR (l.state = 'settled' AND o.loan_id IS NOT NULL AND o.answer IS NULL)
      GROUP BY l.id, k.id, a.id, p.id, o.loan_id ORDER BY l.due_at LIMIT ${listMax}`,
    [viewerId],
  );
  const [school] = await tx.query<{ zone: string }[]>('SELECT time_zone AS zone FROM school WHERE id = current_school()');
  const today = DateTime.fromJSDate(now, { zone: school?.zone ?? 'utc' });
  const lines = rows.map((row) => toLine(row, viewerId, today));
  lines.sort((a, b) => order.indexOf(a.group) - order.indexOf(b.group));
  return { today: today.toISODate() ?? '', counts: countsOf(lines), lines };
}

const order: DeskLine['group'][] = ['to_settle', 'objection', 'set_aside', 'overdue', 'to_check', 'due_today', 'going_out', 'out'];

function toLine(row: Row, viewerId: string, today: DateTime): DeskLine {
  const overdue = row.state === 'out' && row.dueAt.getTime() < today.toMillis();
  const own = row.borrowerId === viewerId;
  const group = groupOf(row, overdue, today);
  return {
    id: row.id, kitId: row.kitId, kitNumber: row.kitNumber, title: row.title,
    borrower: { id: row.borrowerId, name: row.borrowerName },
    state: row.state, dueAt: row.dueAt.toISOString(), overdue,
    depositMinor: Number(row.depositMinor), currency: row.currency, depositState: row.depositState ?? 'none',
    open: own ? 'your own loan' : openWords(group, row),
    group, next: own ? null : nextOf(group, row),
  };
}

function groupOf(row: Row, overdue: boolean, today: DateTime): DeskLine['group'] {
  if (row.objected) return 'objection';
  if (row.state === 'set_aside') return row.openSlots === null ? 'to_settle' : 'set_aside';
  if (row.state === 'returned' || row.state === 'checking') return 'to_check';
  if (row.state === 'reserved') return 'going_out';
  if (overdue) return 'overdue';
  return DateTime.fromJSDate(row.dueAt, { zone: today.zone }).hasSame(today, 'day') ? 'due_today' : 'out';
}

function openWords(group: DeskLine['group'], row: Row): string {
  const jars = row.openSlots === null ? '' : `jar ${row.openSlots.join(', ')} open`;
  if (group === 'objection') return 'objection to answer';
  if (group === 'to_settle') return 'deposit to decide';
  if (group === 'set_aside') return jars;
  if (group === 'to_check') return row.state === 'returned' ? 'in the return box' : jars;
  return group === 'going_out' ? 'being taken out' : '';
}

function nextOf(group: DeskLine['group'], row: Row): DeskLine['next'] {
  if (group === 'to_settle') return { label: 'Decide the deposit', href: `/loans/${row.id}` };
  if (group === 'objection') return { label: 'Answer the objection', href: `/loans/${row.id}` };
  if (group === 'set_aside' || group === 'to_check') return { label: 'Open the check', href: `/bench/${row.id}` };
  return { label: 'Open the loan', href: `/loans/${row.id}` };
}

function countsOf(lines: readonly DeskLine[]): DeskView['counts'] {
  const count = (group: DeskLine['group']): number => lines.filter((line) => line.group === group).length;
  return {
    goingOut: count('going_out'),
    out: count('out') + count('due_today') + count('overdue'),
    dueToday: count('due_today'),
    overdue: count('overdue'),
    toCheck: count('to_check'),
    setAside: count('set_aside'),
    toSettle: count('to_settle'),
  };
}
