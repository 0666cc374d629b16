import type Stripe from 'stripe';

import type { OpenDepositPage, Payment, PaymentMetadata, PaymentSession, PaymentStatus, Refund } from './payments.port';

/** Shown by the page beside its button; `hold` must not read like a purchase. */
const submitMessages = {
  hold: 'This amount is held on your card, not charged.',
  charge: 'This deposit is charged now. It is paid back, in full or in part, when your loan is settled.',
} as const;

export function toSessionParams(request: OpenDepositPage): Stripe.Checkout.SessionCreateParams {
  const metadata = {
    school_id: request.schoolId,
    loan_id: request.loanId,
    payment_id: request.paymentId,
  };
  return {
    mode: 'payment',
    // Cards only: other methods either cannot be held or settle days later.
    allowed_payment_method_types: ['card'],
    line_items: [
      {
        quantity: 1,
        price_data: {
          currency: request.currency.toLowerCase(),
          unit_amount: request.amountMinor,
          product_data: { name: request.description },
        },
      },
    ],
    client_reference_id: request.paymentId,
    metadata,
    payment_intent_data: {
      capture_method: request.capture === 'hold' ? 'manual' : 'automatic',
      description: request.description,
      metadata,
    },
    custom_text: { submit: { message: submitMessages[request.capture] } },
    ...(request.customerEmail === undefined ? {} : { customer_email: request.customerEmail }),
    success_url: request.returnUrl,
    cancel_url: request.cancelUrl,
    expires_at: toSeconds(request.expiresAt),
  };
}

export function toPaymentSession(session: Stripe.Checkout.Session): PaymentSession {
  return {
    sessionId: session.id,
    status: toSessionStatus(session.status),
    paymentIntentId: idOf(session.payment_intent),
    url: session.url,
    amountMinor: session.amount_total ?? 0,
    currency: session.currency ?? '',
    expiresAt: toDate(session.expires_at),
    metadata: toMetadata(session.metadata),
  };
}

function toSessionStatus(status: string | null): PaymentSession['status'] {
  return status === 'complete' || status === 'expired' ? status : 'open';
}

/** @param intent read with `expand: ['latest_charge']` */
export function toPayment(intent: Stripe.PaymentIntent): Payment {
  const charge = intent.latest_charge !== null && typeof intent.latest_charge === 'object' ? intent.latest_charge : null;
  const status = toStatus(intent);
  const captureBefore = charge?.payment_method_details?.card?.capture_before;
  return {
    id: intent.id,
    status,
    amountMinor: intent.amount,
    currency: intent.currency,
    capturableMinor: intent.amount_capturable,
    receivedMinor: intent.amount_received,
    refundedMinor: charge === null ? 0 : refundedMinorOf(charge),
    chargeId: charge !== null && charge.paid ? charge.id : null,
    captureBefore: status === 'held' && captureBefore !== undefined ? toDate(captureBefore) : null,
    metadata: toMetadata(intent.metadata),
  };
}

function toStatus(intent: Stripe.PaymentIntent): PaymentStatus {
  switch (intent.status) {
    case 'requires_capture':
      return 'held';
    case 'succeeded':
      return 'charged';
    case 'canceled':
      return 'cancelled';
    case 'requires_payment_method':
      return intent.last_payment_error === null ? 'pending' : 'failed';
    default:
      return 'pending';
  }
}

/**
 * What went back of the money that was really taken. The service also counts the released rest of a partly
 * captured hold, and the whole of a released hold, in `amount_refunded`
 * (seen in github.com/woocommerce/woocommerce-gateway-stripe/issues/1073: 20675 held, 20300 taken, 375 "refunded").
 */
function refundedMinorOf(charge: Stripe.Charge): number {
  if (!charge.captured) return 0;
  const releasedMinor = charge.amount - charge.amount_captured;
  return Math.max(0, charge.amount_refunded - releasedMinor);
}

export function toRefund(refund: Stripe.Refund): Refund {
  return {
    refundId: refund.id,
    status: toRefundStatus(refund.status),
    amountMinor: refund.amount,
    currency: refund.currency,
    paymentIntentId: idOf(refund.payment_intent),
  };
}

function toRefundStatus(status: string | null): Refund['status'] {
  if (status === 'succeeded') return 'done';
  return status === 'failed' || status === 'canceled' ? 'failed' : 'pending';
}

function toMetadata(metadata: Stripe.Metadata | null): PaymentMetadata {
  return {
    schoolId: metadata?.school_id ?? null,
    loanId: metadata?.loan_id ?? null,
    paymentId: metadata?.payment_id ?? null,
  };
}

function idOf(linked: string | { id: string } | null): string | null {
  return linked === null || typeof linked === 'string' ? linked : linked.id;
}

export function toDate(seconds: number): Date {
  return new Date(seconds * 1000);
}

function toSeconds(date: Date): number {
  return Math.floor(date.getTime() / 1000);
}
