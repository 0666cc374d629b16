import { find, keep, newId } from '../bank';
import type { Bank } from '../bank';
import type { ChargeDocument, IntentDocument, PaymentMethodDocument } from '../documents';
import { feeMinorOf } from '../money';
import { move } from './balance';

/** A card paid with by its owner online is held for 7 days (docs.stripe.com/payments/capture-later). */
export const holdS = 7 * 86_400;

interface Failure {
  code: string;
  declineCode: string | null;
  message: string;
}

/** A charge that is authorised but not captured, or one that failed. */
export function createCharge(bank: Bank, intent: IntentDocument, method: PaymentMethodDocument, failure: Failure | null = null): ChargeDocument {
  const id = newId('ch');
  return keep(bank, 'charge', {
    id,
    object: 'charge',
    amount: intent.amount,
    amount_captured: 0,
    amount_refunded: 0,
    application: null,
    application_fee: null,
    application_fee_amount: null,
    balance_transaction: null,
    billing_details: method.billing_details,
    calculated_statement_descriptor: 'TRAYWARD TEST',
    captured: false,
    created: bank.nowS(),
    currency: intent.currency,
    customer: intent.customer,
    description: intent.description,
    disputed: false,
    failure_balance_transaction: null,
    failure_code: failure?.code ?? null,
    failure_message: failure?.message ?? null,
    fraud_details: {},
    livemode: false,
    metadata: { ...intent.metadata },
    on_behalf_of: null,
    outcome: outcomeDocument(failure),
    paid: failure === null,
    payment_intent: intent.id,
    payment_method: method.id,
    payment_method_details: cardDetails(bank, intent, method, failure),
    receipt_email: intent.receipt_email,
    receipt_number: null,
    receipt_url: failure === null ? `${bank.pageBase}/receipt/${id}` : null,
    refunded: false,
    refunds: { object: 'list', data: [], has_more: false, url: `/v1/charges/${id}/refunds` },
    review: null,
    shipping: null,
    source: null,
    source_transfer: null,
    statement_descriptor: null,
    statement_descriptor_suffix: null,
    status: failure === null ? 'succeeded' : 'failed',
    transfer_data: null,
    transfer_group: null,
  });
}

/** Moves the money of an authorised charge; the hold ends. */
export function capturedNow(bank: Bank, charge: ChargeDocument, amountMinor: number): void {
  charge.captured = true;
  charge.amount_captured = amountMinor;
  delete charge.payment_method_details?.card?.capture_before;
  charge.balance_transaction = move(bank, {
    amountMinor,
    feeMinor: feeMinorOf(amountMinor),
    currency: charge.currency,
    type: 'charge',
    reportingCategory: 'charge',
    sourceId: charge.id,
    description: charge.description,
  }).id;
}

export function chargeOf(bank: Bank, intent: IntentDocument): ChargeDocument | null {
  return intent.latest_charge === null ? null : find(bank, 'charge', intent.latest_charge);
}

function outcomeDocument(failure: Failure | null): ChargeDocument['outcome'] {
  return {
    advice_code: null,
    network_advice_code: null,
    network_decline_code: null,
    network_status: failure === null ? 'approved_by_network' : 'declined_by_network',
    reason: failure === null ? null : (failure.declineCode ?? failure.code),
    risk_level: 'normal',
    risk_score: 20,
    seller_message: failure === null ? 'Payment complete.' : 'The bank declined the payment.',
    type: failure === null ? 'authorized' : 'issuer_declined',
  };
}

function cardDetails(bank: Bank, intent: IntentDocument, method: PaymentMethodDocument, failure: Failure | null): ChargeDocument['payment_method_details'] {
  const { card } = method;
  const held = intent.capture_method === 'manual' && failure === null;
  return {
    type: 'card',
    card: {
      amount_authorized: failure === null ? intent.amount : null,
      authorization_code: failure === null ? newId('a', 6).slice(2).toUpperCase() : null,
      brand: card.brand,
      ...(held ? { capture_before: bank.nowS() + holdS } : {}),
      checks: card.checks,
      country: card.country,
      electronic_commerce_indicator: null,
      exp_month: card.exp_month,
      exp_year: card.exp_year,
      extended_authorization: { status: 'disabled' },
      fingerprint: card.fingerprint ?? null,
      funding: card.funding,
      incremental_authorization: { status: 'unavailable' },
      installments: null,
      last4: card.last4,
      mandate: null,
      multicapture: { status: 'unavailable' },
      network: card.brand,
      network_token: { used: false },
      network_transaction_id: null,
      overcapture: { maximum_amount_capturable: intent.amount, status: 'unavailable' },
      regulated_status: card.regulated_status,
      three_d_secure: null,
      transaction_link_id: null,
      wallet: null,
    },
  };
}
