import type { EntityManager } from 'typeorm';
import type { BenchRow } from '@shared/api/bench';

const listMax = 200;

interface Row extends Omit<BenchRow, 'returnedAt'> { returnedAt: Date }

/** What waits at the bench for this person: returned kits and checks going on, never a loan of their own; second readings wanted first. */
export async function benchList(tx: EntityManager, accountId: string): Promise<BenchRow[]> {
  const rows = await tx.query<Row[]>(
    `SELECT l.id AS "loanId", k.number AS "kitNumber", k.neutral_title AS "neutralTitle", l.state, l.returned_at AS "returnedAt",
            count(*)::int AS "stoneCount", count(s.ending)::int AS "endedCount",
            bool_or(s.ending IS NULL AND s.second_reading_wanted_at IS NOT NULL
                    AND NOT EXISTS (SELECT 1 FROM bench_submission b
                                     WHERE b.loan_id = s.loan_id AND b.stone_id = s.stone_id AND (b.reader_id = $1 OR b.pass = 2))) AS "secondReadingWanted",
            EXISTS (SELECT 1 FROM bench_submission b WHERE b.loan_id = l.id AND b.reader_id = $1) AS mine
       FROM loan l JOIN kit k ON k.id = l.kit_id JOIN loan_stone s ON s.loan_id = l.id
      WHERE l.state IN ('returned', 'checking', 'set_aside') AND l.borrower_id <> $1
      GROUP BY l.id, k.id ORDER BY "secondReadingWanted" DESC, l.returned_at LIMIT ${listMax}`,
    [accountId],
  );
  return rows.map((row) => ({ ...row, returnedAt: row.returnedAt.toISOString() }));
}
