import { all, find } from '../bank';
import type { Bank } from '../bank';
import type { IntentDocument } from '../documents';
import { invalidRequest, unexpectedState } from '../errors';
import { listOf, pagingFields } from '../http/lists';
import type { Operation } from '../http/operation';
import { assertChargeable } from '../money';
import { chargeOf } from '../objects/charges';
import { attachMethod } from '../objects/customers';
import { attemptPayment, cancelIntent, captureIntent, createIntent, declineOf } from '../objects/intents';
import { findMethod } from '../objects/methods';
import { currency, flag, metadata, oneOf, positive, text } from '../params';
import type { Params } from '../params';

const confirmFields = ['off_session', 'payment_method', 'receipt_email', 'return_url', 'setup_future_usage'];
const createFields = [
  ...confirmFields, 'allowed_payment_method_types', 'amount', 'automatic_payment_methods', 'capture_method', 'confirm', 'currency',
  'customer', 'description', 'error_on_requires_action', 'metadata', 'payment_method_types',
];

export const intentOperations: readonly Operation[] = [
  { method: 'post', path: '/payment_intents', fields: createFields, run: ({ bank, params }) => create(bank, params) },
  { method: 'get', path: '/payment_intents/:id', fields: [], run: ({ bank, id }) => find(bank, 'payment_intent', id) },
  {
    method: 'post',
    path: '/payment_intents/:id',
    fields: ['description', 'metadata'],
    run({ bank, params, id }) {
      const intent = find(bank, 'payment_intent', id);
      intent.metadata = metadata(params, intent.metadata);
      intent.description = text(params, 'description') ?? intent.description;
      return intent;
    },
  },
  {
    method: 'post',
    path: '/payment_intents/:id/confirm',
    fields: confirmFields,
    run: ({ bank, params, id }) => confirm(bank, find(bank, 'payment_intent', id), params),
  },
  {
    method: 'post',
    path: '/payment_intents/:id/capture',
    fields: ['amount_to_capture', 'metadata'],
    run: ({ bank, params, id }) => capture(bank, find(bank, 'payment_intent', id), params),
  },
  {
    method: 'post',
    path: '/payment_intents/:id/cancel',
    fields: ['cancellation_reason'],
    run: ({ bank, params, id }) => cancel(bank, find(bank, 'payment_intent', id), params),
  },
  {
    method: 'get',
    path: '/payment_intents',
    fields: [...pagingFields, 'customer'],
    run({ bank, params }) {
      const customer = text(params, 'customer');
      return listOf(bank, {
        name: 'payment_intent',
        url: '/v1/payment_intents',
        params,
        matches: (intent) => customer === undefined || intent.customer === customer,
      });
    },
  },
];

function create(bank: Bank, params: Params): IntentDocument {
  const amountMinor = positive(params, 'amount');
  if (amountMinor === undefined) throw invalidRequest('Missing required param: amount.', { code: 'parameter_missing', param: 'amount' });
  const intentCurrency = currency(params);
  assertChargeable(amountMinor, intentCurrency, 'amount');
  const customerId = text(params, 'customer') ?? null;
  if (customerId !== null) find(bank, 'customer', customerId, 'customer');
  // Looked up first: a wrong method must not leave an intent behind.
  const methodId = text(params, 'payment_method');
  const method = methodId === undefined ? undefined : findMethod(bank, methodId);
  const intent = createIntent(bank, {
    amountMinor,
    currency: intentCurrency,
    captureMethod: oneOf(params, 'capture_method', ['automatic', 'automatic_async', 'manual']) === 'manual' ? 'manual' : 'automatic',
    customerId,
    description: text(params, 'description') ?? null,
    metadata: metadata(params),
    receiptEmail: text(params, 'receipt_email') ?? null,
    setupFutureUsage: oneOf(params, 'setup_future_usage', ['off_session', 'on_session']) ?? null,
  });
  if (method !== undefined) {
    intent.payment_method = method.id;
    intent.status = 'requires_confirmation';
  }
  return flag(params, 'confirm') === true ? confirm(bank, intent, params) : intent;
}

function confirm(bank: Bank, intent: IntentDocument, params: Params): IntentDocument {
  const methodId = text(params, 'payment_method') ?? intent.payment_method;
  if (methodId === null) throw unexpectedState(intent, 'You cannot confirm this PaymentIntent because it is missing a payment method.');
  const method = findMethod(bank, methodId);
  attemptPayment(bank, intent, { method, authenticateUrl: `${bank.pageBase}/authenticate/${intent.id}` });
  const refusal = declineOf(intent);
  if (refusal !== null) throw refusal;
  if (intent.setup_future_usage !== null && intent.customer !== null && intent.status !== 'requires_action') {
    attachMethod(bank, method, intent.customer);
  }
  return intent;
}

function capture(bank: Bank, intent: IntentDocument, params: Params): IntentDocument {
  const charge = chargeOf(bank, intent);
  const amountMinor = positive(params, 'amount_to_capture') ?? intent.amount_capturable;
  if (charge === null) throw unexpectedState(intent, 'This PaymentIntent could not be captured because nothing is held.');
  captureIntent(bank, intent, charge, amountMinor);
  intent.metadata = metadata(params, intent.metadata);
  return intent;
}

function cancel(bank: Bank, intent: IntentDocument, params: Params): IntentDocument {
  const reason = oneOf(params, 'cancellation_reason', ['abandoned', 'duplicate', 'fraudulent', 'requested_by_customer']) ?? null;
  const isOnOpenPage = all(bank, 'checkout.session').some((session) => session.payment_intent === intent.id && session.status === 'open');
  if (isOnOpenPage) throw unexpectedState(intent, 'This PaymentIntent belongs to an open Checkout Session: expire the session instead.');
  cancelIntent(bank, intent, chargeOf(bank, intent), reason);
  return intent;
}
