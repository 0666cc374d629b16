import type { SettlementRequest, SettlementStone } from '@shared/api/settlement';
import { parseMoney } from '@shared/money';

/** One itemised reason as it is being typed. */
export interface KeepDraft {
  stoneId: string;
  slot: string;
  reason: string;
  amount: string;
}

/** A line for each stone that gives ground to keep money, with its reason begun. */
export function keepDrafts(stones: readonly SettlementStone[]): KeepDraft[] {
  return stones.filter((stone) => stone.mayKeep).map((stone) => ({
    stoneId: stone.stoneId,
    slot: stone.slot,
    reason: stone.reason || reasonFor(stone),
    amount: '',
  }));
}

function reasonFor(stone: SettlementStone): string {
  if (stone.ending === 'different') return `Jar ${stone.slot}: two readers found another stone than the recorded ${stone.speciesName}`;
  return `Jar ${stone.slot}: ${stone.speciesName} ${stone.ending ?? ''}`;
}

export type Kept = { ok: true; items: SettlementRequest['items']; totalMinor: number } | { ok: false; faults: Record<string, string> };

/** The items to keep; a line without an amount is left out. Faults are named by `stoneId.field`. */
export function keptItems(drafts: readonly KeepDraft[], currency: string): Kept {
  const faults: Record<string, string> = {};
  const items: SettlementRequest['items'] = [];
  for (const draft of drafts) {
    if (draft.amount.trim() === '') continue;
    const money = parseMoney(draft.amount, currency);
    if (!money.ok) faults[`${draft.stoneId}.amount`] = money.reason === 'too_many_digits' ? 'Too many digits after the point for this currency.' : 'Type an amount, such as 25.00.';
    else if (draft.reason.trim().length < 3) faults[`${draft.stoneId}.reason`] = 'Say why, so that the borrower can understand it.';
    else if (money.amountMinor > 0) items.push({ stoneId: draft.stoneId, reason: draft.reason.trim(), amountMinor: money.amountMinor });
  }
  if (Object.keys(faults).length > 0) return { ok: false, faults };
  return { ok: true, items, totalMinor: items.reduce((sum, item) => sum + item.amountMinor, 0) };
}
