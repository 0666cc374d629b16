import { all } from './bank';
import type { Bank } from './bank';
import { invalidRequest } from './errors';

/** Smallest charge by currency, minor units (docs.stripe.com/currencies#minimum-and-maximum-charge-amounts; from memory). */
const smallestMinor: Readonly<Record<string, number>> = {
  aud: 50, cad: 50, chf: 50, czk: 1500, dkk: 250, eur: 50, gbp: 30, hkd: 400, huf: 17500,
  jpy: 50, nok: 300, nzd: 50, pln: 200, sek: 300, sgd: 50, usd: 50,
};
/** Eight digits at most, for every currency. */
const largestMinor = 99_999_999;

export function assertChargeable(amountMinor: number, currency: string, param: string): void {
  if (amountMinor < (smallestMinor[currency] ?? 1)) {
    throw invalidRequest('Amount must be no less than the smallest charge in this currency.', { code: 'amount_too_small', param });
  }
  if (amountMinor > largestMinor) {
    throw invalidRequest('Amount must be no more than 99999999 minor units.', { code: 'amount_too_large', param });
  }
}

/** The published card price of a plain account: 2.9 % + 30, rounded to whole minor units. */
export function feeMinorOf(amountMinor: number): number {
  return Math.round((amountMinor * 29) / 1000) + 30;
}

/** Taken for each dispute, and not given back. */
export const disputeFeeMinor = 1500;

/** "$12.00", "¥1200", "KWD 1.200": minor units by ISO 4217 as the runtime knows them. */
export function moneyText(amountMinor: number, currency: string): string {
  const format = new Intl.NumberFormat('en', { style: 'currency', currency: currency.toUpperCase() });
  const digits = format.resolvedOptions().maximumFractionDigits ?? 2;
  return format.format(amountMinor / 10 ** digits);
}

/** One currency's totals, in minor units: what an outside bookkeeper would find here. */
export interface Books {
  currency: string;
  heldMinor: number;
  capturedMinor: number;
  refundedMinor: number;
  disputedMinor: number;
  feeMinor: number;
  /** Sum of all balance transactions, net of fees. */
  balanceMinor: number;
}

export function booksOf(bank: Bank): Books[] {
  const byCurrency = new Map<string, Books>();
  const of = (currency: string): Books => {
    const books = byCurrency.get(currency) ?? {
      currency, heldMinor: 0, capturedMinor: 0, refundedMinor: 0, disputedMinor: 0, feeMinor: 0, balanceMinor: 0,
    };
    byCurrency.set(currency, books);
    return books;
  };
  for (const intent of all(bank, 'payment_intent')) {
    of(intent.currency).heldMinor += intent.amount_capturable;
    of(intent.currency).capturedMinor += intent.amount_received;
  }
  for (const transaction of all(bank, 'balance_transaction')) {
    const books = of(transaction.currency);
    books.feeMinor += transaction.fee;
    books.balanceMinor += transaction.net;
    if (transaction.reporting_category === 'refund' || transaction.reporting_category === 'refund_failure') {
      books.refundedMinor -= transaction.amount;
    }
    if (transaction.reporting_category.startsWith('dispute')) books.disputedMinor -= transaction.amount;
  }
  return [...byCurrency.values()].sort((a, b) => a.currency.localeCompare(b.currency));
}
