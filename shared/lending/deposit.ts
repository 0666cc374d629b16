import type { DepositRule } from '@shared/api/school';

/**
 * The deposit of a kit in minor units.
 * A share is rounded up to the next whole minor unit, so that a share of anything is never nothing by rounding.
 */
export function depositMinor(rule: DepositRule, replacementValueMinor: number): number {
  if (rule.kind === 'fixed') return rule.amountMinor;
  const share = Math.ceil((replacementValueMinor * rule.percent) / 100);
  const floored = Math.max(share, rule.minimumMinor);
  return rule.maximumMinor === null ? floored : Math.min(floored, rule.maximumMinor);
}

export const hourMs = 3_600_000;
export const dayMs = 24 * hourMs;

/** A card hold placed while the customer is present lasts seven days (Stripe's documentation, "Place a hold on a payment method"). */
export const holdLastsMs = 7 * dayMs;

/**
 * Hold or charge: a deposit is held only where the due time, the grace and the checking time all end before the hold lapses;
 * a longer loan is charged and paid back. `holdUntil` is the hold's expected (before paying) or actual `capture_before` end.
 */
export function depositMode(loan: { dueAt: Date; lateGraceHours: number; checkingDays: number; holdUntil: Date }): 'hold' | 'charge' {
  const settledBy = loan.dueAt.getTime() + loan.lateGraceHours * hourMs + loan.checkingDays * dayMs;
  return settledBy < loan.holdUntil.getTime() ? 'hold' : 'charge';
}

/** How long before a hold lapses an open check secures the whole deposit. */
export const secureBeforeLapseMs = 24 * hourMs;
