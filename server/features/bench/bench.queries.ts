import type { EntityManager } from 'typeorm';
import type { StoneFlag, VerdictWord } from '@shared/api/evidence';
import type { StoneEnding, BackState, LoanState } from '@shared/api/loans';
import type { StoneProgress } from '@shared/lending';
import type { VerdictBasis } from './verdict.entity';

export interface BenchLoan {
  id: string;
  schoolId: string;
  kitId: string;
  kitNumber: string;
  neutralTitle: string;
  borrowerId: string;
  state: LoanState;
}

/** One stone of a loan as the bench works with it. */
export interface BenchStoneRow extends StoneProgress {
  stoneId: string;
  slot: string;
  neutralDescription: string;
  marks: string;
  flags: StoneFlag[];
  backState: BackState | null;
  backCondition: string;
  endReason: string;
}

export async function benchLoan(tx: EntityManager, loanId: string): Promise<BenchLoan | null> {
  const [row] = await tx.query<BenchLoan[]>(
    `SELECT l.id, l.school_id AS "schoolId", l.kit_id AS "kitId", k.number AS "kitNumber", k.neutral_title AS "neutralTitle",
            l.borrower_id AS "borrowerId", l.state
       FROM loan l JOIN kit k ON k.id = l.kit_id WHERE l.id = $1`,
    [loanId],
  );
  return row ?? null;
}

interface StoneRecord {
  stoneId: string;
  slot: string;
  neutralDescription: string;
  marks: string;
  flags: StoneFlag[];
  backState: BackState | null;
  backCondition: string;
  benchState: BackState | null;
  ending: StoneEnding | null;
  endReason: string;
  secondReadingWanted: boolean;
  firstReaderId: string | null;
  secondReaderId: string | null;
  acceptedBy: string[] | null;
}

/** The stones of a loan in slot order, each with its readers, newest verdict on each basis and acceptances. */
export async function benchStones(tx: EntityManager, loanId: string): Promise<BenchStoneRow[]> {
  const stones = await tx.query<StoneRecord[]>(
    `SELECT s.stone_id AS "stoneId", s.slot, t.neutral_description AS "neutralDescription", t.marks, t.flags,
            s.back_state AS "backState", s.back_condition AS "backCondition", s.bench_state AS "benchState",
            s.ending, s.end_reason AS "endReason", s.second_reading_wanted_at IS NOT NULL AS "secondReadingWanted",
            (SELECT b.reader_id FROM bench_submission b WHERE b.loan_id = s.loan_id AND b.stone_id = s.stone_id AND b.pass = 1 LIMIT 1) AS "firstReaderId",
            (SELECT b.reader_id FROM bench_submission b WHERE b.loan_id = s.loan_id AND b.stone_id = s.stone_id AND b.pass = 2 LIMIT 1) AS "secondReaderId",
            (SELECT array_agg(a.account_id ORDER BY a.at) FROM stone_acceptance a WHERE a.loan_id = s.loan_id AND a.stone_id = s.stone_id) AS "acceptedBy"
       FROM loan_stone s JOIN stone t ON t.id = s.stone_id
      WHERE s.loan_id = $1 ORDER BY s.slot`,
    [loanId],
  );
  const newest = await tx.query<{ stoneId: string; basis: VerdictBasis; verdict: VerdictWord }[]>(
    `SELECT DISTINCT ON (stone_id, basis) stone_id AS "stoneId", basis, verdict
       FROM verdict WHERE loan_id = $1 ORDER BY stone_id, basis, seq DESC`,
    [loanId],
  );
  return stones.map((stone) => {
    const verdictOn = (basis: VerdictBasis): VerdictWord | null =>
      newest.find((row) => row.stoneId === stone.stoneId && row.basis === basis)?.verdict ?? null;
    return { ...stone, acceptedBy: stone.acceptedBy ?? [], first: verdictOn('first'), second: verdictOn('second'), pooled: verdictOn('pooled') };
  });
}

/** Staff of the school who may be told: instructors who are not the given people, and admins. */
export async function secondReaders(tx: EntityManager, except: readonly string[]): Promise<string[]> {
  const rows = await tx.query<{ id: string }[]>(
    `SELECT account_id AS id FROM membership
      WHERE school_id = current_school() AND ended_at IS NULL AND roles && ARRAY['instructor', 'admin'] AND NOT account_id = ANY ($1)`,
    [except],
  );
  return rows.map((row) => row.id);
}
