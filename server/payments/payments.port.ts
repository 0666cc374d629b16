/**
 * What the deposits feature may ask of a payment service, in the words of lending.
 *
 * Amounts are whole minor units (ISO 4217) beside a lower-case currency code. Times are `Date`s in UTC.
 * Every call that moves money takes a key: the same key with the same request has one effect however often
 * it is tried, and the first answer is replayed, a decline included, so a new attempt needs a new key.
 * Every call may throw an error of `payments.errors.ts`; `PaymentServiceUnavailable` alone is worth retrying,
 * with the same key, because the work may have been done although the answer was lost.
 */
export interface PaymentPort {
  /** Opens a hosted page on which one deposit is held (secured on the card) or charged. */
  openDepositPage(request: OpenDepositPage): Promise<DepositPage>;
  readSession(sessionId: string): Promise<PaymentSession>;
  /** Closes an open page at once. Throws `PaymentConflict` when it was already paid or had already expired. */
  expireSession(sessionId: string, key: string): Promise<PaymentSession>;
  readPayment(paymentIntentId: string): Promise<Payment>;
  /**
   * Takes `amountMinor` (1 … capturable) from a hold; the rest is released and cannot be taken later.
   * Throws `PaymentConflict` when the hold was already captured, cancelled or has lapsed.
   */
  capture(paymentIntentId: string, amountMinor: number, key: string): Promise<Payment>;
  /**
   * Releases a hold. Throws `PaymentConflict` when it was already captured, cancelled or has lapsed, and when the
   * student has not finished paying yet: then expire the session instead.
   */
  cancelHold(paymentIntentId: string, key: string): Promise<Payment>;
  /** Pays back part or all of what was charged. Throws `PaymentRefused` when more than is left would go back. */
  refund(request: RefundRequest): Promise<Refund>;
  readRefund(refundId: string): Promise<Refund>;
  /**
   * Verifies the signature over the raw bytes, then reads the notice. The notice says only *that* something
   * changed: read the object anew before acting, since notices repeat and arrive in any order.
   * Throws `WebhookRefused` for a missing, forged or more than 300 s old signature, or a body that is no event.
   */
  parseWebhook(rawBody: Buffer | string, signatureHeader: string | undefined): PaymentNotice;
}

/** `hold` secures the amount on the card for about a week; `charge` takes it and pays it back later. */
export type CaptureMode = 'hold' | 'charge';

export interface OpenDepositPage {
  /** Our own id of this payment; travels in metadata with the school's and the loan's. */
  paymentId: string;
  schoolId: string;
  loanId: string;
  amountMinor: number;
  /** ISO 4217, any case. */
  currency: string;
  capture: CaptureMode;
  /** Neutral text: the page, the receipt and the bank statement may show it to a student who must stay blind. */
  description: string;
  customerEmail?: string;
  /** May contain `{CHECKOUT_SESSION_ID}`, which the payment page replaces by the session's id. */
  returnUrl: string;
  cancelUrl: string;
  /**
   * Between 30 minutes and 24 hours from now (the service's own limits, else `PaymentRefused`). Leave a few
   * minutes of margin, so that a retry with the same key is still inside them.
   */
  expiresAt: Date;
  idempotencyKey: string;
}

export interface DepositPage {
  sessionId: string;
  url: string;
  expiresAt: Date;
}

export interface PaymentSession {
  sessionId: string;
  /** `complete`: the student finished the page; whether money is held or charged is the payment's to say. */
  status: 'open' | 'complete' | 'expired';
  /** Null until the student first tries to pay; a declined try leaves the page open with an id. */
  paymentIntentId: string | null;
  /** Null unless open. */
  url: string | null;
  amountMinor: number;
  currency: string;
  expiresAt: Date;
  metadata: PaymentMetadata;
}

/** `pending`: not paid yet; `failed`: the last attempt was declined and nothing is held. */
export type PaymentStatus = 'held' | 'charged' | 'cancelled' | 'failed' | 'pending';

export interface Payment {
  id: string;
  status: PaymentStatus;
  amountMinor: number;
  currency: string;
  /** What can still be captured; 0 unless `held`. */
  capturableMinor: number;
  /** What was taken from the card, before refunds. */
  receivedMinor: number;
  /** What went back, failed refunds not counted. */
  refundedMinor: number;
  chargeId: string | null;
  /** When the card's hold lapses by itself; null unless `held`. */
  captureBefore: Date | null;
  metadata: PaymentMetadata;
}

/** Our own ids as the payment object carries them; check them against our own row before believing them. */
export interface PaymentMetadata {
  schoolId: string | null;
  loanId: string | null;
  paymentId: string | null;
}

export interface RefundRequest {
  paymentIntentId: string;
  amountMinor: number;
  key: string;
  /** Short machine words that travel with the refund, e.g. `{ reason: 'kit-returned' }`. Nothing personal. */
  metadata?: Readonly<Record<string, string>>;
}

export interface Refund {
  refundId: string;
  status: 'pending' | 'done' | 'failed';
  amountMinor: number;
  currency: string;
  paymentIntentId: string | null;
}

export type NoticeObjectKind = 'session' | 'payment' | 'charge' | 'refund' | 'dispute' | 'other';

export interface PaymentNotice {
  /** The event's unique id: handle each once. */
  id: string;
  /** The service's own event type, e.g. `checkout.session.completed`. */
  type: string;
  objectKind: NoticeObjectKind;
  objectId: string;
  /** The payment the object belongs to, where it names one. */
  paymentIntentId: string | null;
  createdAt: Date;
}
