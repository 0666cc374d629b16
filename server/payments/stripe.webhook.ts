import type Stripe from 'stripe';

import { WebhookRefused } from './payments.errors';
import type { NoticeObjectKind, PaymentNotice } from './payments.port';
import { toDate } from './stripe.mapping';

/**
 * Oldest signature taken, in seconds (the SDK's own default). It is measured on the signature's timestamp, not on
 * `event.created`; a signature from the future is taken, since it can only mean that our clock is slow.
 */
const toleranceS = 300;

const objectKinds: ReadonlyMap<string, NoticeObjectKind> = new Map([
  ['checkout.session', 'session'],
  ['payment_intent', 'payment'],
  ['charge', 'charge'],
  ['refund', 'refund'],
  ['dispute', 'dispute'],
]);

interface Received {
  rawBody: Buffer | string;
  signatureHeader: string | undefined;
  webhookSecret: string;
  now: Date;
}

/** Verifies first and parses after; see `PaymentPort.parseWebhook`. */
export function readNotice(stripe: Stripe, received: Received): PaymentNotice {
  const event = verified(stripe, received);
  // Signed bytes come from the service, but their shape is still only a promise: check what is used.
  const object: unknown = isRecord(event.data) ? event.data.object : undefined;
  if (!isText(event.id) || !isText(event.type) || typeof event.created !== 'number' || !isRecord(object) || !isText(object.id)) {
    throw new WebhookRefused('not_an_event', 'webhook body is not an event');
  }
  const objectKind = objectKinds.get(String(object.object)) ?? 'other';
  return {
    id: event.id,
    type: event.type,
    objectKind,
    objectId: object.id,
    paymentIntentId: objectKind === 'payment' ? object.id : linkedIntent(object.payment_intent),
    createdAt: toDate(event.created),
  };
}

function verified(stripe: Stripe, { rawBody, signatureHeader, webhookSecret, now }: Received): Record<string, unknown> {
  let event: unknown;
  try {
    event = stripe.webhooks.constructEvent(rawBody, signatureHeader ?? '', webhookSecret, toleranceS, undefined, now.getTime());
  } catch (error) {
    // A signature error and a body that is no JSON both end here; the body is not quoted, it may be anything.
    const code = error instanceof SyntaxError ? 'not_an_event' : 'signature_refused';
    throw new WebhookRefused(code, `webhook refused: ${code}`, { cause: error });
  }
  if (!isRecord(event)) throw new WebhookRefused('not_an_event', 'webhook body is not an event');
  return event;
}

function linkedIntent(linked: unknown): string | null {
  if (isText(linked)) return linked;
  return isRecord(linked) && isText(linked.id) ? linked.id : null;
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function isText(value: unknown): value is string {
  return typeof value === 'string' && value !== '';
}
