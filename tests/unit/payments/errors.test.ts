import Stripe from 'stripe';

import { PaymentConflict, PaymentDeclined, PaymentError, PaymentRefused, PaymentServiceUnavailable } from '@/server/payments/payments.errors';
import { inPortWords } from '@/server/payments/stripe.errors';

const { errors } = Stripe;

async function meaningOf(error: Error): Promise<unknown> {
  return inPortWords(() => Promise.reject(error)).then(
    () => 'nothing was thrown',
    (thrown: unknown) => thrown,
  );
}

describe('failures of the payment service in the port’s words', () => {
  it.each([
    ['a declined card', new errors.StripeCardError({ type: 'card_error', code: 'card_declined', decline_code: 'insufficient_funds' }), PaymentDeclined, 'insufficient_funds', false],
    ['a decline without a bank’s code', new errors.StripeCardError({ type: 'card_error', code: 'incorrect_cvc' }), PaymentDeclined, 'incorrect_cvc', false],
    ['a key used for another request', new errors.StripeIdempotencyError({ type: 'idempotency_error' }), PaymentRefused, 'idempotency_key_reused', false],
    ['an object that moved on', new errors.StripeInvalidRequestError({ type: 'invalid_request_error', code: 'payment_intent_unexpected_state' }), PaymentConflict, 'payment_intent_unexpected_state', false],
    ['a charge captured before', new errors.StripeInvalidRequestError({ type: 'invalid_request_error', code: 'charge_already_captured' }), PaymentConflict, 'charge_already_captured', false],
    ['an unknown object', new errors.StripeInvalidRequestError({ type: 'invalid_request_error', code: 'resource_missing' }), PaymentRefused, 'resource_missing', false],
    ['an error of the service', new errors.StripeAPIError({ type: 'api_error' }), PaymentServiceUnavailable, 'api_error', true],
    ['too many calls', new errors.StripeRateLimitError({ type: 'rate_limit_error', code: 'rate_limit' }), PaymentServiceUnavailable, 'rate_limit', true],
    ['a dropped line', new errors.StripeConnectionError({ type: 'api_error', message: 'closed' }), PaymentServiceUnavailable, 'api_error', true],
    ['wrong credentials', new errors.StripeAuthenticationError({ type: 'invalid_request_error' }), PaymentServiceUnavailable, 'bad_credentials', true],
  ] as const)('%s', async (_what, error, meaning, code, retryable) => {
    const thrown = await meaningOf(error);
    expect(thrown).toBeInstanceOf(meaning);
    expect(thrown).toMatchObject({ code, retryable, cause: error });
  });

  it('keeps the service’s own sentence out of the message, for it may quote what was sent', async () => {
    const secret = 'student@portellery.example';
    const thrown = await meaningOf(new errors.StripeInvalidRequestError({ type: 'invalid_request_error', code: 'email_invalid', param: 'customer_email', message: `Invalid: ${secret}` }));
    expect(thrown).toBeInstanceOf(PaymentError);
    expect((thrown as PaymentError).message).not.toContain(secret);
    expect((thrown as PaymentError).message).toContain('email_invalid on customer_email');
  });

  it('leaves our own errors and broken code as they are', async () => {
    const own = new PaymentConflict('session_expired', 'gone');
    expect(await meaningOf(own)).toBe(own);
    const bug = new TypeError('undefined is not a function');
    expect(await meaningOf(bug)).toBe(bug);
  });
});
