import type { EntityManager } from 'typeorm';
import { cursorValues, pageOf, rowsToAsk, PageQuery } from '@/server/http/paging';
import type { Page } from '@shared/api/common';
import type { LoanView } from '@shared/api/loans';
import { loanViews } from './loanView';

const pageDefault = 20;

/** The viewer's own loans, newest first, each as its borrower sees it. */
export async function myLoans(tx: EntityManager, viewerId: string, asked: PageQuery, now: Date): Promise<Page<LoanView>> {
  const query = Object.assign(new PageQuery(), asked, { limit: asked.limit ?? pageDefault });
  const [reservedKey, id] = cursorValues(query, 2) ?? [];
  const rows: { id: string; reservedKey: string }[] = await tx.query(
    `SELECT id, to_char(reserved_at AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') AS "reservedKey" FROM loan
      WHERE borrower_id = $1 AND ($2::timestamptz IS NULL OR (reserved_at, id) < ($2::timestamptz, $3::uuid))
      ORDER BY reserved_at DESC, id DESC LIMIT $4`,
    [viewerId, reservedKey ?? null, id ?? null, rowsToAsk(query)],
  );
  const page = pageOf(query, rows, (row) => [row.reservedKey, row.id], (row) => row.id);
  return { items: await loanViews(tx, page.items, viewerId, now), nextCursor: page.nextCursor };
}
