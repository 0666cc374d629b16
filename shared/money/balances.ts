import type { AccountKind, Posting } from './postings';
import { accountKinds } from './postings';

export type Balances = Readonly<Record<AccountKind, number>>;

const sides: Record<AccountKind, 1 | -1> = {
  card_holds: 1,
  holds_for_students: -1,
  payment_service: 1,
  deposits_of_students: -1,
  kept_deposits: -1,
};

export const noBalances: Balances = {
  card_holds: 0,
  holds_for_students: 0,
  payment_service: 0,
  deposits_of_students: 0,
  kept_deposits: 0,
};

/** Balances after some postings. */
export function addPostings(balances: Balances, postings: readonly Posting[]): Balances {
  const sums: Record<AccountKind, number> = { ...balances };
  for (const { account, amountMinor } of postings) sums[account] += amountMinor;
  return sums;
}

/**
 * The accounts of one deposit that stand on the wrong side: money released that was not held, paid back or kept that
 * was not there. A movement that would lead here must not be posted; so nothing is both released and kept.
 */
export function overdrawn(balances: Balances): AccountKind[] {
  return accountKinds.filter((account) => balances[account] * sides[account] < 0);
}

/** Sum over all accounts: anything but 0 is an error of the books. */
export function sumOf(balances: Balances): number {
  return accountKinds.reduce((sum, account) => sum + balances[account], 0);
}
