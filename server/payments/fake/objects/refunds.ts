import { find, keep, newId } from '../bank';
import type { Bank } from '../bank';
import type { ChargeDocument, RefundDocument } from '../documents';
import { invalidRequest } from '../errors';
import { move } from './balance';
import { outcomeOf } from './methods';

interface NewRefund {
  amountMinor: number;
  reason: 'duplicate' | 'fraudulent' | 'requested_by_customer' | null;
  metadata: Record<string, string>;
}

/** How long a refund card of the test set takes until it goes through or fails. */
const refundSettlesS = 60;

/** Pays back a captured charge, in part or whole; never more than is left of it. */
export function createRefund(bank: Bank, charge: ChargeDocument, given: NewRefund): RefundDocument {
  if (charge.disputed) {
    throw invalidRequest(`Charge ${charge.id} has been charged back; cannot issue a refund.`, { code: 'charge_disputed' });
  }
  const leftMinor = refundableMinor(charge);
  if (leftMinor === 0) {
    throw invalidRequest(`Charge ${charge.id} has already been refunded.`, { code: 'charge_already_refunded', charge: charge.id });
  }
  if (given.amountMinor > leftMinor) {
    throw invalidRequest(`Refund amount (${given.amountMinor}) is greater than unrefunded amount on charge (${leftMinor})`, { param: 'amount' });
  }
  const outcome = charge.payment_method === null ? 'works' : outcomeOf(bank, find(bank, 'payment_method', charge.payment_method)).kind;
  const refund = addRefund(bank, charge, { ...given, status: outcome === 'refund-waits' ? 'pending' : 'succeeded' });
  refund.balance_transaction = move(bank, {
    amountMinor: -given.amountMinor,
    currency: charge.currency,
    type: 'refund',
    reportingCategory: 'refund',
    sourceId: refund.id,
  }).id;
  if (outcome === 'refund-waits' || outcome === 'refund-fails') {
    const what = outcome === 'refund-waits' ? 'refund-succeeds' : 'refund-fails';
    bank.state.scheduled.push({ atS: bank.nowS() + refundSettlesS, what, id: refund.id });
  }
  bank.emit('refund.created', refund);
  bank.emit('charge.refunded', charge);
  return refund;
}

/**
 * Releases what was authorised and not taken. Stripe books it as a refund of the charge, without money moving
 * (the account's balance has no line for it). The caller says `charge.refunded` when its own news are out.
 */
export function releaseRest(bank: Bank, charge: ChargeDocument, amountMinor: number): void {
  delete charge.payment_method_details?.card?.capture_before;
  addRefund(bank, charge, { amountMinor, reason: null, metadata: {}, status: 'succeeded' });
}

function addRefund(bank: Bank, charge: ChargeDocument, given: NewRefund & { status: 'pending' | 'succeeded' }): RefundDocument {
  const refund = keep(bank, 'refund', {
    id: newId('re'),
    object: 'refund',
    amount: given.amountMinor,
    balance_transaction: null,
    charge: charge.id,
    created: bank.nowS(),
    currency: charge.currency,
    customer: charge.customer,
    customer_account: null,
    destination_details: { type: 'card', card: { reference_status: 'pending', reference_type: 'acquirer_reference_number', type: 'refund' } },
    metadata: given.metadata,
    payment_intent: charge.payment_intent,
    payment_method: charge.payment_method,
    reason: given.reason,
    receipt_number: null,
    source_transfer_reversal: null,
    status: given.status,
    transfer_reversal: null,
  });
  charge.amount_refunded += given.amountMinor;
  charge.refunded = charge.amount_refunded === charge.amount;
  return refund;
}

function refundableMinor(charge: ChargeDocument): number {
  return charge.captured ? charge.amount - charge.amount_refunded : 0;
}

export function succeedRefund(bank: Bank, refund: RefundDocument): void {
  if (refund.status !== 'pending') return;
  refund.status = 'succeeded';
  bank.emit('refund.updated', refund);
  bank.emit('charge.refund.updated', refund);
}

/** The bank sends the money back: it is on the account again and the charge counts as not refunded. */
export function failRefund(bank: Bank, refund: RefundDocument): void {
  if (refund.status === 'failed') return;
  if (refund.balance_transaction === null || refund.charge === null) {
    throw invalidRequest(`Refund ${refund.id} released a hold; no money moved that could come back.`);
  }
  const charge = find(bank, 'charge', refund.charge);
  refund.status = 'failed';
  charge.amount_refunded -= refund.amount;
  charge.refunded = false;
  move(bank, { amountMinor: refund.amount, currency: refund.currency, type: 'refund_failure', reportingCategory: 'refund_failure', sourceId: refund.id });
  bank.emit('refund.failed', refund);
  bank.emit('refund.updated', refund);
  bank.emit('charge.refund.updated', refund);
}
