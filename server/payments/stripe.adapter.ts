import Stripe from 'stripe';

import { PaymentConflict, PaymentServiceUnavailable } from './payments.errors';
import type { DepositPage, OpenDepositPage, Payment, PaymentPort, PaymentSession, Refund, RefundRequest } from './payments.port';
import { inPortWords } from './stripe.errors';
import { toPayment, toPaymentSession, toRefund, toSessionParams } from './stripe.mapping';
import { readNotice } from './stripe.webhook';

/** Pinned beside the SDK, so that upgrading the package without reading what changed fails the type check. */
const apiVersion = '2026-10-28.endive';

export interface PaymentPortConfig {
  secretKey: string;
  /** Signs the webhooks; starts with `whsec_`. */
  webhookSecret: string;
  /** Another server than the service's own: the local fake. Refused together with a live key. */
  apiBase?: { host: string; port: number; protocol: 'http' | 'https' };
  /** How long one call may take before it counts as unanswered, in ms. */
  timeoutMs?: number;
  /** The clock that webhook signatures are measured against. */
  now?: () => Date;
}

/** The payment port over the official SDK. Throws when a live key would be sent anywhere but to the service itself. */
export function createPaymentPort(config: PaymentPortConfig): PaymentPort {
  if (config.apiBase !== undefined && /^[sr]k_live/.test(config.secretKey)) {
    throw new Error('A live payment key must not be sent to another server: unset the payment API address, or use a test key.');
  }
  const stripe = new Stripe(config.secretKey, {
    apiVersion,
    // Retries are the job queue's business. The SDK still repeats a dropped connection once by itself,
    // which is harmless because every write below carries our own key.
    maxNetworkRetries: 0,
    timeout: config.timeoutMs ?? 20_000,
    telemetry: false,
    ...config.apiBase,
  });
  const now = config.now ?? (() => new Date());
  return {
    openDepositPage: (request) => inPortWords(() => openDepositPage(stripe, request)),
    readSession: (sessionId) => inPortWords(async () => toPaymentSession(await stripe.checkout.sessions.retrieve(sessionId))),
    expireSession: (sessionId, key) => inPortWords(() => expireSession(stripe, sessionId, key)),
    readPayment: (paymentIntentId) => inPortWords(() => readPayment(stripe, paymentIntentId)),
    capture: (paymentIntentId, amountMinor, key) => inPortWords(() => capture(stripe, paymentIntentId, amountMinor, key)),
    cancelHold: (paymentIntentId, key) => inPortWords(() => cancelHold(stripe, paymentIntentId, key)),
    refund: (request) => inPortWords(() => refund(stripe, request)),
    readRefund: (refundId) => inPortWords(async () => toRefund(await stripe.refunds.retrieve(refundId))),
    parseWebhook: (rawBody, signatureHeader) =>
      readNotice(stripe, { rawBody, signatureHeader, webhookSecret: config.webhookSecret, now: now() }),
  };
}

const withCharge = { expand: ['latest_charge'] };

async function openDepositPage(stripe: Stripe, request: OpenDepositPage): Promise<DepositPage> {
  const created = await stripe.checkout.sessions.create(toSessionParams(request), { idempotencyKey: request.idempotencyKey });
  const session = toPaymentSession(created);
  if (session.url === null) {
    // Only a replayed answer of an embedded page could lack its address; nothing can be shown to the student then.
    throw new PaymentServiceUnavailable('no_page', `payment service gave no page for ${session.sessionId}`);
  }
  return { sessionId: session.sessionId, url: session.url, expiresAt: session.expiresAt };
}

async function expireSession(stripe: Stripe, sessionId: string, key: string): Promise<PaymentSession> {
  try {
    return toPaymentSession(await stripe.checkout.sessions.expire(sessionId, {}, { idempotencyKey: key }));
  } catch (error) {
    if (!(error instanceof Stripe.errors.StripeInvalidRequestError)) throw error;
    // The service has no code of its own for "no longer open", so ask what became of the page.
    const session = await stripe.checkout.sessions.retrieve(sessionId);
    if (session.status === 'open') throw error;
    throw new PaymentConflict(`session_${session.status}`, `session ${sessionId} is ${session.status}`, { cause: error });
  }
}

async function readPayment(stripe: Stripe, paymentIntentId: string): Promise<Payment> {
  return toPayment(await stripe.paymentIntents.retrieve(paymentIntentId, withCharge));
}

async function capture(stripe: Stripe, paymentIntentId: string, amountMinor: number, key: string): Promise<Payment> {
  const params = { amount_to_capture: amountMinor, ...withCharge };
  return toPayment(await stripe.paymentIntents.capture(paymentIntentId, params, { idempotencyKey: key }));
}

async function cancelHold(stripe: Stripe, paymentIntentId: string, key: string): Promise<Payment> {
  return toPayment(await stripe.paymentIntents.cancel(paymentIntentId, withCharge, { idempotencyKey: key }));
}

async function refund(stripe: Stripe, request: RefundRequest): Promise<Refund> {
  const params: Stripe.RefundCreateParams = { payment_intent: request.paymentIntentId, amount: request.amountMinor };
  if (request.metadata !== undefined) params.metadata = { ...request.metadata };
  return toRefund(await stripe.refunds.create(params, { idempotencyKey: request.key }));
}
