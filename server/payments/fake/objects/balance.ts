import { keep, newId } from '../bank';
import type { Bank } from '../bank';
import type { BalanceTransactionDocument } from '../documents';

interface Movement {
  amountMinor: number;
  feeMinor?: number;
  currency: string;
  type: 'adjustment' | 'charge' | 'refund' | 'refund_failure';
  reportingCategory: 'charge' | 'dispute' | 'dispute_reversal' | 'refund' | 'refund_failure';
  sourceId: string;
  description?: string | null;
}

const daysToAvailable = 2;

/** Writes one line of the account's balance; `amountMinor` is negative when money leaves. */
export function move(bank: Bank, movement: Movement): BalanceTransactionDocument {
  const feeMinor = movement.feeMinor ?? 0;
  const nowS = bank.nowS();
  return keep(bank, 'balance_transaction', {
    id: newId('txn'),
    object: 'balance_transaction',
    amount: movement.amountMinor,
    available_on: nowS + daysToAvailable * 86_400,
    balance_type: 'payments',
    created: nowS,
    currency: movement.currency,
    description: movement.description ?? null,
    exchange_rate: null,
    fee: feeMinor,
    fee_details:
      feeMinor === 0
        ? []
        : [{ amount: feeMinor, application: null, currency: movement.currency, description: 'Processing fees', type: 'stripe_fee' }],
    net: movement.amountMinor - feeMinor,
    reporting_category: movement.reportingCategory,
    source: movement.sourceId,
    status: 'pending',
    type: movement.type,
  });
}

/** Money becomes available by itself: called when time has passed. */
export function settleBalance(bank: Bank): void {
  const nowS = bank.nowS();
  for (const transaction of Object.values(bank.state.documents.balance_transaction)) {
    if (transaction.status === 'pending' && transaction.available_on <= nowS) transaction.status = 'available';
  }
}
