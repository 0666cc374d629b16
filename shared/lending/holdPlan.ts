/** A payment as the payment service sees it now; minor units. */
export interface SeenPayment {
  readonly status: 'held' | 'charged' | 'cancelled' | 'failed' | 'pending';
  readonly amountMinor: number;
  /** Taken from the card, before refunds. */
  readonly receivedMinor: number;
  readonly refundedMinor: number;
}

/** `secure`: take the whole of a hold before it lapses, still the student's. `settle`: keep so much, give back the rest. */
export type DepositGoal = { kind: 'secure' } | { kind: 'settle'; keepMinor: number };

export type ServiceCall =
  | { call: 'none' }
  | { call: 'cancel_hold' }
  | { call: 'capture' | 'refund'; amountMinor: number }
  /** The goal cannot be reached any more: the hold lapsed, or more went back than should have. */
  | { call: 'lost'; reason: 'hold_ended' | 'already_paid_back' | 'not_paid' };

/**
 * The one call that brings a payment to its goal from where it is now, or none when it is there.
 * Deciding from what the service says, and not from what we last wrote, is what lets a killed step be taken up again.
 */
export function planCall(seen: SeenPayment, goal: DepositGoal): ServiceCall {
  if (seen.status === 'pending' || seen.status === 'failed') return { call: 'lost', reason: 'not_paid' };
  const keepMinor = goal.kind === 'secure' ? seen.amountMinor : goal.keepMinor;
  if (seen.status === 'held') return keepMinor === 0 ? { call: 'cancel_hold' } : { call: 'capture', amountMinor: keepMinor };
  if (seen.status === 'cancelled') return keepMinor === 0 ? { call: 'none' } : { call: 'lost', reason: 'hold_ended' };
  if (goal.kind === 'secure') return { call: 'none' };
  const backMinor = seen.receivedMinor - seen.refundedMinor - keepMinor;
  if (backMinor < 0) return { call: 'lost', reason: 'already_paid_back' };
  return backMinor === 0 ? { call: 'none' } : { call: 'refund', amountMinor: backMinor };
}
