/**
 * The books of deposits. Debit is positive, credit negative; what a transfer posts sums to zero.
 *
 *   card_holds            what cards hold for the school (a claim, no money yet)        never below zero
 *   holds_for_students    the other side of it: holds belong to the students            never above zero
 *   payment_service       money the payment service has for the school                  never below zero
 *   deposits_of_students  money owed back to students                                   never above zero
 *   kept_deposits         what the school has kept                                      never above zero
 */
export const accountKinds = ['card_holds', 'holds_for_students', 'payment_service', 'deposits_of_students', 'kept_deposits'] as const;
export type AccountKind = (typeof accountKinds)[number];

export const transferKinds = [
  'hold_placed',
  'hold_released',
  'hold_secured',
  'hold_captured_kept',
  'deposit_charged',
  'deposit_refunded',
  'deposit_kept',
  'reversal',
] as const;
export type TransferKind = (typeof transferKinds)[number];

export interface Posting {
  account: AccountKind;
  amountMinor: number;
}

/** Whole minor units, above zero and exact; `keptMinor` is part of `amountMinor`. */
export type Movement =
  | { kind: 'hold_placed' | 'hold_released' | 'hold_secured' | 'deposit_charged' | 'deposit_refunded' | 'deposit_kept'; amountMinor: number }
  /** A hold of `amountMinor` captured for `keptMinor`; the service releases the rest with it. */
  | { kind: 'hold_captured_kept'; amountMinor: number; keptMinor: number };

/**
 * What one movement posts.
 * @throws RangeError for amounts that are not whole, not above zero, or a kept part larger than the hold
 * @example postingsFor({ kind: 'deposit_charged', amountMinor: 6000 })
 *   // [{ account: 'payment_service', amountMinor: 6000 }, { account: 'deposits_of_students', amountMinor: -6000 }]
 */
export function postingsFor(movement: Movement): Posting[] {
  const amount = positive(movement.amountMinor);
  switch (movement.kind) {
    case 'hold_placed':
      return move('holds_for_students', 'card_holds', amount);
    case 'hold_released':
      return move('card_holds', 'holds_for_students', amount);
    case 'hold_secured':
      return [...move('card_holds', 'holds_for_students', amount), ...move('deposits_of_students', 'payment_service', amount)];
    case 'hold_captured_kept': {
      const kept = positive(movement.keptMinor);
      if (kept > amount) throw new RangeError(`cannot keep ${kept} of a hold of ${amount}`);
      return [...move('card_holds', 'holds_for_students', amount), ...move('kept_deposits', 'payment_service', kept)];
    }
    case 'deposit_charged':
      return move('deposits_of_students', 'payment_service', amount);
    case 'deposit_refunded':
      return move('payment_service', 'deposits_of_students', amount);
    case 'deposit_kept':
      return move('kept_deposits', 'deposits_of_students', amount);
  }
}

/** What undoes a transfer: the same lines with the signs turned. */
export function reversalOf(postings: readonly Posting[]): Posting[] {
  return postings.map(({ account, amountMinor }) => ({ account, amountMinor: -amountMinor }));
}

const move = (credit: AccountKind, debit: AccountKind, amountMinor: number): Posting[] => [
  { account: debit, amountMinor },
  { account: credit, amountMinor: -amountMinor },
];

function positive(amountMinor: number): number {
  if (!Number.isSafeInteger(amountMinor) || amountMinor <= 0) throw new RangeError(`an amount must be whole minor units above zero, not ${amountMinor}`);
  return amountMinor;
}
