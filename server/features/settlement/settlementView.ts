import type { EntityManager } from 'typeorm';
import type { SettlementStone, SettlementView } from '@shared/api/settlement';
import type { StoneEnding } from '@shared/api/loans';
import { speciesName } from '@/server/features/species/speciesName';
import { outcomeOf } from './outcome';

const keepEndings: readonly (StoneEnding | null)[] = ['missing', 'damaged', 'different'];

interface LoanRow {
  loanId: string; kitId: string; kitNumber: string; title: string; borrowerId: string; borrowerName: string; depositMinor: string; currency: string;
}
interface StoneRow { stoneId: string; slot: string; species: string; ending: StoneEnding | null; reason: string; value: string }

/** The money question of one loan as an admin sees it; null where there is no such loan. */
export async function settlementView(tx: EntityManager, loanId: string): Promise<SettlementView | null> {
  const [loan] = await tx.query<LoanRow[]>(
    `SELECT l.id AS "loanId", k.id AS "kitId", k.number AS "kitNumber", k.title, a.id AS "borrowerId", a.name AS "borrowerName",
            l.deposit_minor AS "depositMinor", l.currency
       FROM loan l JOIN kit k ON k.id = l.kit_id JOIN account a ON a.id = l.borrower_id WHERE l.id = $1`,
    [loanId],
  );
  if (loan === undefined) return null;
  const rows = await tx.query<StoneRow[]>(
    `SELECT s.stone_id AS "stoneId", s.slot, t.species, s.ending, s.end_reason AS reason, t.replacement_value_minor AS value
       FROM loan_stone s JOIN stone t ON t.id = s.stone_id WHERE s.loan_id = $1 ORDER BY s.slot`,
    [loanId],
  );
  const stones = rows.map(toStone);
  const open = stones.filter((stone) => stone.ending === null).map((stone) => stone.slot);
  return {
    loanId: loan.loanId, kitId: loan.kitId, kitNumber: loan.kitNumber, title: loan.title,
    borrower: { id: loan.borrowerId, name: loan.borrowerName },
    depositMinor: Number(loan.depositMinor), currency: loan.currency,
    outcome: await outcomeOf(tx, loanId),
    stones,
    ready: open.length === 0,
    waitingFor: open.length === 0 ? '' : `Jar ${open.join(', ')} has not reached its end. The deposit can be decided once every stone has.`,
  };
}

function toStone(row: StoneRow): SettlementStone {
  return {
    stoneId: row.stoneId, slot: row.slot, speciesName: speciesName(row.species), ending: row.ending, reason: row.reason,
    mayKeep: keepEndings.includes(row.ending), replacementValueMinor: Number(row.value),
  };
}

/** Loans whose money waits for a person, oldest first; never those the viewer borrowed. */
export async function openSettlements(tx: EntityManager, accountId: string): Promise<SettlementView[]> {
  const loans = await tx.query<{ id: string }[]>(
    `SELECT id FROM loan WHERE state = 'set_aside' AND borrower_id <> $1 ORDER BY returned_at LIMIT 100`, [accountId]);
  const views = [];
  for (const { id } of loans) views.push(await settlementView(tx, id));
  return views.filter((view) => view !== null);
}
