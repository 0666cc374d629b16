import type { AccountKind, TransferKind } from './postings';

/** The books' accounts in plain words, for statements. */
export const accountWords: Record<AccountKind, string> = {
  card_holds: 'Held on the card',
  holds_for_students: 'Holds owed to students',
  payment_service: 'With the payment service',
  deposits_of_students: 'Owed back to students',
  kept_deposits: 'Kept by the school',
};

/** What each movement was, as the end of "Deposit for kit 014: …". */
export const transferWords: Record<TransferKind, string> = {
  hold_placed: 'held on the card',
  hold_released: 'hold ended, nothing taken',
  hold_secured: 'charged before the hold ended, still the borrower’s',
  hold_captured_kept: 'kept from the hold, the rest released',
  deposit_charged: 'charged',
  deposit_refunded: 'paid back',
  deposit_kept: 'kept',
  reversal: 'earlier entry put right',
};
