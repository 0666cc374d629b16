/** What went wrong at the payment service, by what the caller can do about it. */
export abstract class PaymentError extends Error {
  abstract readonly retryable: boolean;

  /**
   * @param code    machine word of the service (`card_declined`, `charge_already_refunded` …), or our own
   * @param message for logs; it carries no card or personal data
   */
  constructor(
    readonly code: string,
    message: string,
    options?: ErrorOptions,
  ) {
    super(message, options);
    this.name = new.target.name;
  }
}

/** The card was refused. The same key would replay the refusal: a new attempt takes a new key. */
export class PaymentDeclined extends PaymentError {
  readonly retryable = false;
}

/** No answer, or the service's own fault. The work may have been done: retry later with the SAME key. */
export class PaymentServiceUnavailable extends PaymentError {
  readonly retryable = true;
}

/** The service understood and refused (wrong amount, unknown object, key reused for another request, bad credentials). */
export class PaymentRefused extends PaymentError {
  readonly retryable = false;
}

/** The object has moved on (already captured, cancelled, lapsed, expired, paid): read it anew and decide again. */
export class PaymentConflict extends PaymentError {
  readonly retryable = false;
}

/** A webhook whose signature is missing, forged or stale, or whose body is no event. Answer 400 and do nothing. */
export class WebhookRefused extends PaymentError {
  readonly retryable = false;
}
