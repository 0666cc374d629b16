import Stripe from 'stripe';

import { PaymentConflict, PaymentDeclined, PaymentError, PaymentRefused, PaymentServiceUnavailable } from './payments.errors';

/** Refusals that mean "somebody was faster": the object is no longer in the state the caller believed. */
const movedOnCodes: ReadonlySet<string> = new Set([
  'payment_intent_unexpected_state',
  'charge_already_captured',
  'charge_expired_for_capture',
  'charge_not_refundable',
]);

/** Runs one call of the SDK and rethrows what fails in the port's own words. Our own errors pass unchanged. */
export async function inPortWords<T>(call: () => Promise<T>): Promise<T> {
  try {
    return await call();
  } catch (error) {
    throw toPaymentError(error);
  }
}

function toPaymentError(error: unknown): unknown {
  if (error instanceof PaymentError || !(error instanceof Stripe.errors.StripeError)) return error;
  const code = error.code ?? error.rawType ?? 'unknown';
  const described = describe(error, code);
  if (error instanceof Stripe.errors.StripeCardError) {
    return new PaymentDeclined(error.decline_code || code, described, { cause: error });
  }
  if (error instanceof Stripe.errors.StripeIdempotencyError) {
    return new PaymentRefused('idempotency_key_reused', described, { cause: error });
  }
  if (error instanceof Stripe.errors.StripeInvalidRequestError) {
    const Meaning = movedOnCodes.has(code) ? PaymentConflict : PaymentRefused;
    return new Meaning(code, described, { cause: error });
  }
  // Wrong credentials did no work either: once an operator has put the key right, the same call may be tried again.
  const isCredentials =
    error instanceof Stripe.errors.StripeAuthenticationError || error instanceof Stripe.errors.StripePermissionError;
  return new PaymentServiceUnavailable(isCredentials ? 'bad_credentials' : code, described, { cause: error });
}

/** The service's own sentence may quote what was sent, so the log gets codes and the request's id only. */
function describe(error: InstanceType<typeof Stripe.errors.StripeError>, code: string): string {
  const request = error.requestId ? `, request ${error.requestId}` : '';
  return `payment service: ${error.type} ${code}${error.param ? ` on ${error.param}` : ''}${request}`;
}
