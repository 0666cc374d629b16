import { all, find, keep, newId } from '../bank';
import type { Bank } from '../bank';
import type { ChargeDocument, DisputeDocument } from '../documents';
import { invalidRequest } from '../errors';
import { disputeFeeMinor } from '../money';
import { move } from './balance';

export type DisputeReason = 'duplicate' | 'fraudulent' | 'general' | 'product_not_received' | 'product_unacceptable';

const answerWithinDays = 9;

/** The cardholder objects at their bank: the money leaves at once, with the dispute's fee. */
export function openDispute(bank: Bank, charge: ChargeDocument, reason: DisputeReason): DisputeDocument {
  if (!charge.captured || charge.disputed || charge.amount_refunded === charge.amount) {
    throw invalidRequest(`Charge ${charge.id} cannot be disputed: it must be captured, not fully refunded and not disputed yet.`);
  }
  const id = newId('du');
  const amountMinor = charge.amount - charge.amount_refunded;
  move(bank, {
    amountMinor: -amountMinor,
    feeMinor: disputeFeeMinor,
    currency: charge.currency,
    type: 'adjustment',
    reportingCategory: 'dispute',
    sourceId: id,
  });
  charge.disputed = true;
  const dispute = keep(bank, 'dispute', {
    id,
    object: 'dispute',
    amount: amountMinor,
    balance_transactions: [],
    charge: charge.id,
    created: bank.nowS(),
    currency: charge.currency,
    enhanced_eligibility_types: [],
    evidence: emptyEvidence(),
    evidence_details: {
      due_by: bank.nowS() + answerWithinDays * 86_400,
      enhanced_eligibility: {},
      has_evidence: false,
      past_due: false,
      submission_count: 0,
      submission_method: 'not_submitted',
    },
    is_charge_refundable: false,
    livemode: false,
    metadata: {},
    payment_intent: charge.payment_intent,
    payment_method_details: {
      type: 'card',
      card: { brand: charge.payment_method_details?.card?.brand ?? 'visa', case_type: 'chargeback', network: 'visa', network_reason_code: '10.4' },
    },
    reason,
    status: 'needs_response',
  });
  bank.emit('charge.dispute.created', dispute);
  bank.emit('charge.dispute.funds_withdrawn', dispute);
  return dispute;
}

/** Ends a dispute. Won: the money comes back, the fee does not. */
export function closeDispute(bank: Bank, dispute: DisputeDocument, outcome: 'lost' | 'won'): void {
  if (dispute.status === 'won' || dispute.status === 'lost') {
    throw invalidRequest(`Dispute ${dispute.id} is already closed with status ${dispute.status}.`, { code: 'resource_already_closed' });
  }
  dispute.status = outcome;
  const charge = find(bank, 'charge', dispute.charge);
  if (outcome === 'won') {
    charge.disputed = false;
    move(bank, {
      amountMinor: dispute.amount,
      currency: dispute.currency,
      type: 'adjustment',
      reportingCategory: 'dispute_reversal',
      sourceId: dispute.id,
    });
    bank.emit('charge.dispute.funds_reinstated', dispute);
  }
  bank.emit('charge.dispute.closed', dispute);
}

/** Stripe's test mode decides by these words (docs.stripe.com/testing#evidence). */
const decidingWords = new Map<string, 'lost' | 'won'>([
  ['winning_evidence', 'won'],
  ['losing_evidence', 'lost'],
]);

export function submitEvidence(bank: Bank, dispute: DisputeDocument, evidence: Readonly<Record<string, string>>, submit: boolean): void {
  if (!dispute.status.endsWith('needs_response')) {
    throw invalidRequest(`This dispute has a status of ${dispute.status} and takes no more evidence.`);
  }
  Object.assign(dispute.evidence, evidence);
  dispute.evidence_details.has_evidence = Object.values(dispute.evidence).some((value) => typeof value === 'string');
  if (submit) {
    dispute.evidence_details.submission_count += 1;
    dispute.evidence_details.submission_method = 'manual';
    dispute.status = 'under_review';
  }
  bank.emit('charge.dispute.updated', dispute);
  const decided = submit ? decidingWords.get(dispute.evidence.uncategorized_text ?? '') : undefined;
  if (decided !== undefined) closeDispute(bank, dispute, decided);
}

export function disputesOf(bank: Bank, chargeId: string): DisputeDocument[] {
  return all(bank, 'dispute').filter((dispute) => dispute.charge === chargeId);
}

export const evidenceFields = [
  'access_activity_log', 'billing_address', 'cancellation_policy', 'cancellation_policy_disclosure', 'cancellation_rebuttal',
  'customer_communication', 'customer_email_address', 'customer_name', 'customer_purchase_ip', 'customer_signature',
  'duplicate_charge_documentation', 'duplicate_charge_explanation', 'duplicate_charge_id', 'product_description', 'receipt',
  'refund_policy', 'refund_policy_disclosure', 'refund_refusal_explanation', 'service_date', 'service_documentation',
  'shipping_address', 'shipping_carrier', 'shipping_date', 'shipping_documentation', 'shipping_tracking_number',
  'uncategorized_file', 'uncategorized_text',
] as const;

function emptyEvidence(): DisputeDocument['evidence'] {
  return {
    access_activity_log: null, billing_address: null, cancellation_policy: null, cancellation_policy_disclosure: null,
    cancellation_rebuttal: null, customer_communication: null, customer_email_address: null, customer_name: null,
    customer_purchase_ip: null, customer_signature: null, duplicate_charge_documentation: null,
    duplicate_charge_explanation: null, duplicate_charge_id: null, enhanced_evidence: {}, product_description: null,
    receipt: null, refund_policy: null, refund_policy_disclosure: null, refund_refusal_explanation: null,
    service_date: null, service_documentation: null, shipping_address: null, shipping_carrier: null, shipping_date: null,
    shipping_documentation: null, shipping_tracking_number: null, uncategorized_file: null, uncategorized_text: null,
  };
}
