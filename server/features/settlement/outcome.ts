import type { EntityManager } from 'typeorm';
import type { LoanOutcome, StoneEnding } from '@shared/api/loans';
import { speciesName } from '@/server/features/species/speciesName';
import { dayMs } from '@shared/lending';
import { Settlement } from './settlement.entity';

interface OutcomeStone { stoneId: string; slot: string; neutralDescription: string; ending: StoneEnding | null; endReason: string; species: string }

/**
 * What a borrower may see of a loan's outcome: nothing before a settlement is proposed or decided; a finding only for a
 * stone that money is proposed to be kept for, where fairness goes before blindness.
 */
export async function outcomeOf(tx: EntityManager, loanId: string): Promise<LoanOutcome | null> {
  const settlement = await tx.findOneBy(Settlement, { loanId });
  if (settlement === null) return null;
  const stones = await tx.query<OutcomeStone[]>(
    `SELECT s.stone_id AS "stoneId", s.slot, t.neutral_description AS "neutralDescription", s.ending, s.end_reason AS "endReason", t.species
       FROM loan_stone s JOIN stone t ON t.id = s.stone_id WHERE s.loan_id = $1 ORDER BY s.slot`,
    [loanId],
  );
  const items = await tx.query<{ stoneId: string | null; reason: string; amountMinor: string; slot: string | null }[]>(
    `SELECT i.stone_id AS "stoneId", i.reason, i.amount_minor AS "amountMinor", s.slot
       FROM settlement_item i LEFT JOIN loan_stone s ON s.loan_id = i.loan_id AND s.stone_id = i.stone_id
      WHERE i.loan_id = $1 ORDER BY s.slot NULLS LAST, i.id`,
    [loanId],
  );
  const keptFor = new Set(items.map((item) => item.stoneId));
  return {
    state: settlement.state,
    keptMinor: settlement.keptMinor,
    releasedMinor: settlement.releasedMinor,
    currency: settlement.currency,
    items: items.map(({ reason, amountMinor, slot }) => ({ reason, amountMinor: Number(amountMinor), slot })),
    stones: stones.map((stone) => ({
      slot: stone.slot,
      neutralDescription: stone.neutralDescription,
      ending: settlement.state === 'proposed' && !keptFor.has(stone.stoneId) ? null : stone.ending,
      finding: keptFor.has(stone.stoneId) ? finding(stone) : null,
    })),
    objectUntil: await objectUntil(tx, settlement),
    objection: await objectionOf(tx, loanId),
  };
}

function finding(stone: OutcomeStone): string {
  const recorded = speciesName(stone.species);
  if (stone.ending === 'different') return `The record says ${recorded}. Two people, each with readings of their own, found another stone in the jar.`;
  if (stone.ending === 'missing') return `The jar came back without its stone, recorded as ${recorded}.`;
  if (stone.ending === 'damaged') return `Recorded as ${recorded}. ${stone.endReason}`;
  return `Recorded as ${recorded}.`;
}

async function objectUntil(tx: EntityManager, settlement: Settlement): Promise<string | null> {
  const from = settlement.decidedAt ?? settlement.proposedAt;
  if (from === null || settlement.keptMinor === 0) return null;
  const [school] = await tx.query<{ days: number }[]>('SELECT objection_days AS days FROM school WHERE id = current_school()');
  return new Date(from.getTime() + (school?.days ?? 0) * dayMs).toISOString();
}

async function objectionOf(tx: EntityManager, loanId: string): Promise<LoanOutcome['objection']> {
  const [row] = await tx.query<{ text: string; madeAt: Date; answer: string | null; answeredAt: Date | null }[]>(
    'SELECT text, made_at AS "madeAt", answer, answered_at AS "answeredAt" FROM objection WHERE loan_id = $1', [loanId]);
  if (row === undefined) return null;
  return { text: row.text, madeAt: row.madeAt.toISOString(), answer: row.answer, answeredAt: row.answeredAt?.toISOString() ?? null };
}
