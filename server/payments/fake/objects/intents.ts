import { find, keep, newId } from '../bank';
import type { Bank } from '../bank';
import { declineMessages } from '../cards';
import type { CardOutcome } from '../cards';
import type { ChargeDocument, IntentDocument, PaymentMethodDocument } from '../documents';
import { ApiError, invalidRequest, unexpectedState } from '../errors';
import { capturedNow, createCharge } from './charges';
import { openDispute } from './disputes';
import { outcomeOf } from './methods';
import { releaseRest } from './refunds';

interface NewIntent {
  amountMinor: number;
  currency: string;
  captureMethod: 'automatic' | 'manual';
  customerId?: string | null;
  description?: string | null;
  metadata?: Record<string, string>;
  receiptEmail?: string | null;
  setupFutureUsage?: 'off_session' | 'on_session' | null;
}

export function createIntent(bank: Bank, given: NewIntent): IntentDocument {
  const id = newId('pi');
  const intent = keep(bank, 'payment_intent', {
    id,
    object: 'payment_intent',
    amount: given.amountMinor,
    amount_capturable: 0,
    amount_details: { tip: {} },
    amount_received: 0,
    application: null,
    application_fee_amount: null,
    automatic_payment_methods: null,
    canceled_at: null,
    cancellation_reason: null,
    capture_method: given.captureMethod,
    client_secret: `${id}_${newId('secret')}`,
    confirmation_method: 'automatic',
    created: bank.nowS(),
    currency: given.currency,
    customer: given.customerId ?? null,
    customer_account: null,
    description: given.description ?? null,
    excluded_payment_method_types: null,
    last_payment_error: null,
    latest_charge: null,
    livemode: false,
    managed_payments: null,
    metadata: given.metadata ?? {},
    next_action: null,
    on_behalf_of: null,
    payment_method: null,
    payment_method_configuration_details: null,
    payment_method_options: { card: { installments: null, mandate_options: null, network: null, request_three_d_secure: 'automatic' } },
    payment_method_types: ['card'],
    processing: null,
    receipt_email: given.receiptEmail ?? null,
    review: null,
    setup_future_usage: given.setupFutureUsage ?? null,
    shipping: null,
    source: null,
    statement_descriptor: null,
    statement_descriptor_suffix: null,
    status: 'requires_payment_method',
    transfer_data: null,
    transfer_group: null,
  });
  bank.emit('payment_intent.created', intent);
  return intent;
}

export interface Attempt {
  method: PaymentMethodDocument;
  /** The student already approved (or refused) the payment in their bank's step. */
  authenticated?: boolean;
  /** Where "approve or refuse" is asked. */
  authenticateUrl: string;
}

/**
 * Tries to pay. Afterwards the intent is `succeeded`, `requires_capture`, `requires_action`, or back at
 * `requires_payment_method` with `last_payment_error` set; a decline is not thrown here (see `declineOf`).
 */
export function attemptPayment(bank: Bank, intent: IntentDocument, attempt: Attempt): void {
  assertConfirmable(intent);
  const { method } = attempt;
  const outcome = outcomeOf(bank, method);
  intent.last_payment_error = null;
  intent.next_action = null;
  intent.payment_method = method.id;
  const saved = method.customer !== null;
  if (outcome.kind === 'asks' && !(attempt.authenticated ?? false) && (outcome.when === 'always' || !saved)) {
    intent.status = 'requires_action';
    intent.next_action = { type: 'redirect_to_url', redirect_to_url: { return_url: null, url: attempt.authenticateUrl } };
    bank.emit('payment_intent.requires_action', intent);
    return;
  }
  if (outcome.kind === 'declined') decline(bank, intent, method, outcome);
  else authorise(bank, intent, method, outcome);
}

function assertConfirmable(intent: IntentDocument): void {
  if (!['requires_payment_method', 'requires_confirmation', 'requires_action'].includes(intent.status)) {
    throw unexpectedState(intent, `You cannot confirm this PaymentIntent because it has a status of ${intent.status}.`);
  }
}

function authorise(bank: Bank, intent: IntentDocument, method: PaymentMethodDocument, outcome: CardOutcome): void {
  const charge = createCharge(bank, intent, method);
  intent.latest_charge = charge.id;
  if (intent.capture_method === 'manual') {
    intent.status = 'requires_capture';
    intent.amount_capturable = intent.amount;
    bank.emit('charge.succeeded', charge);
    bank.emit('payment_intent.amount_capturable_updated', intent);
    return;
  }
  capturedNow(bank, charge, intent.amount);
  intent.status = 'succeeded';
  intent.amount_received = intent.amount;
  bank.emit('charge.succeeded', charge);
  bank.emit('payment_intent.succeeded', intent);
  if (outcome.kind === 'disputed') openDispute(bank, charge, outcome.reason);
}

function decline(bank: Bank, intent: IntentDocument, method: PaymentMethodDocument, outcome: CardOutcome & { kind: 'declined' }): void {
  const message = declineMessages[outcome.declineCode ?? outcome.code] ?? 'Your card was declined.';
  const charge = createCharge(bank, intent, method, { code: outcome.code, declineCode: outcome.declineCode ?? null, message });
  intent.latest_charge = charge.id;
  bank.emit('charge.failed', charge);
  failAttempt(bank, intent, {
    type: 'card_error',
    code: outcome.code,
    message,
    charge: charge.id,
    payment_method: method,
    ...(outcome.declineCode === undefined ? {} : { decline_code: outcome.declineCode }),
  });
}

/** Back to the start: another card may be tried. */
export function failAttempt(bank: Bank, intent: IntentDocument, error: NonNullable<IntentDocument['last_payment_error']>): void {
  intent.status = 'requires_payment_method';
  intent.payment_method = null;
  intent.next_action = null;
  intent.last_payment_error = error;
  bank.emit('payment_intent.payment_failed', intent);
}

/** The 402 that an API caller gets for the intent's last failed attempt, or null when it did not fail. */
export function declineOf(intent: IntentDocument): ApiError | null {
  const last = intent.last_payment_error;
  if (last === null) return null;
  return new ApiError(402, {
    type: 'card_error',
    message: last.message ?? 'Your card was declined.',
    code: last.code ?? 'card_declined',
    ...(last.decline_code === undefined ? {} : { decline_code: last.decline_code }),
    ...(last.charge === undefined ? {} : { charge: last.charge }),
    payment_intent: intent,
  });
}

/** Takes part or all of a hold, once; the rest is released. */
export function captureIntent(bank: Bank, intent: IntentDocument, charge: ChargeDocument, amountMinor: number): void {
  if (intent.status !== 'requires_capture') {
    throw unexpectedState(
      intent,
      `This PaymentIntent could not be captured because it has a status of ${intent.status}. Only a PaymentIntent with one of the following statuses may be captured: requires_capture.`,
    );
  }
  if (amountMinor > intent.amount_capturable) {
    throw invalidRequest('The capture amount is greater than what can be captured.', { code: 'amount_too_large', param: 'amount_to_capture' });
  }
  const isPartial = amountMinor < charge.amount;
  capturedNow(bank, charge, amountMinor);
  if (isPartial) releaseRest(bank, charge, charge.amount - amountMinor);
  intent.status = 'succeeded';
  intent.amount_received = amountMinor;
  intent.amount_capturable = 0;
  bank.emit('charge.captured', charge);
  bank.emit('payment_intent.succeeded', intent);
  if (isPartial) bank.emit('charge.refunded', charge);
  const outcome = outcomeOf(bank, find(bank, 'payment_method', charge.payment_method ?? ''));
  if (outcome.kind === 'disputed') openDispute(bank, charge, outcome.reason);
}

export type CancelReason = 'abandoned' | 'duplicate' | 'expired' | 'fraudulent' | 'requested_by_customer' | null;

/** Ends an unfinished payment and releases its hold, if any. */
export function cancelIntent(bank: Bank, intent: IntentDocument, charge: ChargeDocument | null, reason: CancelReason): void {
  if (intent.status === 'succeeded' || intent.status === 'canceled') {
    throw unexpectedState(intent, `You cannot cancel this PaymentIntent because it has a status of ${intent.status}.`);
  }
  const wasHeld = intent.status === 'requires_capture';
  intent.status = 'canceled';
  intent.canceled_at = bank.nowS();
  intent.cancellation_reason = reason;
  intent.amount_capturable = 0;
  intent.next_action = null;
  if (wasHeld && charge !== null) {
    releaseRest(bank, charge, charge.amount);
    if (reason === 'expired') bank.emit('charge.expired', charge);
    bank.emit('charge.refunded', charge);
  }
  bank.emit('payment_intent.canceled', intent);
}
