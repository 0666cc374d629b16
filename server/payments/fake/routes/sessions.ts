import { find } from '../bank';
import type { Bank } from '../bank';
import { invalidRequest } from '../errors';
import { listOf, pagingFields } from '../http/lists';
import type { Operation } from '../http/operation';
import { assertChargeable } from '../money';
import { createSession, expireSession } from '../objects/sessions';
import { currency, integer, isParams, list, metadata, nested, oneOf, positive, requiredText, text } from '../params';
import type { Params } from '../params';

const soonestS = 30 * 60;
const latestS = 24 * 3600;

const createFields = [
  'allowed_payment_method_types', 'cancel_url', 'client_reference_id', 'currency', 'custom_text', 'customer', 'customer_creation',
  'customer_email', 'expires_at', 'line_items', 'locale', 'metadata', 'mode', 'payment_intent_data', 'payment_method_types',
  'setup_intent_data', 'submit_type', 'success_url', 'ui_mode',
];

export const sessionOperations: readonly Operation[] = [
  { method: 'post', path: '/checkout/sessions', fields: createFields, run: ({ bank, params }) => create(bank, params) },
  { method: 'get', path: '/checkout/sessions/:id', fields: [], run: ({ bank, id }) => find(bank, 'checkout.session', id) },
  {
    method: 'post',
    path: '/checkout/sessions/:id/expire',
    fields: [],
    run({ bank, id }) {
      const session = find(bank, 'checkout.session', id);
      expireSession(bank, session);
      return session;
    },
  },
  {
    method: 'get',
    path: '/checkout/sessions',
    fields: [...pagingFields, 'customer', 'payment_intent', 'status'],
    run({ bank, params }) {
      const customer = text(params, 'customer');
      const intent = text(params, 'payment_intent');
      const status = text(params, 'status');
      return listOf(bank, {
        name: 'checkout.session',
        url: '/v1/checkout/sessions',
        params,
        matches: (session) =>
          (customer === undefined || session.customer === customer) &&
          (intent === undefined || session.payment_intent === intent) &&
          (status === undefined || session.status === status),
      });
    },
  },
];

function create(bank: Bank, params: Params) {
  const mode = oneOf(params, 'mode', ['payment', 'setup']);
  if (mode === undefined) throw invalidRequest('Missing required param: mode.', { code: 'parameter_missing', param: 'mode' });
  assertCards(params);
  oneOf(params, 'ui_mode', ['hosted', 'hosted_page']);
  const item = mode === 'payment' ? lineItem(params) : null;
  const dataName = mode === 'payment' ? 'payment_intent_data' : 'setup_intent_data';
  const data = nested(params, dataName) ?? {};
  const customerId = text(params, 'customer') ?? null;
  if (customerId !== null) find(bank, 'customer', customerId, 'customer');
  return createSession(bank, {
    mode,
    amountMinor: item === null ? null : item.unitMinor * item.quantity,
    currency: item === null ? (text(params, 'currency')?.toLowerCase() ?? null) : item.currency,
    successUrl: address(requiredText(params, 'success_url'), 'success_url'),
    cancelUrl: optionalAddress(params, 'cancel_url'),
    expiresAtS: expiresAt(bank, params),
    customerId,
    customerEmail: text(params, 'customer_email') ?? null,
    customerCreation: oneOf(params, 'customer_creation', ['always', 'if_required']) ?? (mode === 'payment' ? 'if_required' : null),
    clientReferenceId: text(params, 'client_reference_id') ?? null,
    submitMessage: submitMessage(params),
    metadata: metadata(params),
    note: {
      item: { name: item?.name ?? 'Keep this card', description: item?.description ?? null, quantity: item?.quantity ?? 1 },
      captureMethod: oneOf(data, 'capture_method', ['automatic', 'automatic_async', 'manual'], `${dataName}[capture_method]`) === 'manual' ? 'manual' : 'automatic',
      description: text(data, 'description', `${dataName}[description]`) ?? null,
      intentMetadata: metadata(data),
      setupFutureUsage: oneOf(data, 'setup_future_usage', ['off_session', 'on_session'], `${dataName}[setup_future_usage]`) ?? null,
      receiptEmail: text(data, 'receipt_email', `${dataName}[receipt_email]`) ?? null,
      notice: null,
      awaiting: null,
    },
  });
}

function assertCards(params: Params): void {
  for (const name of ['allowed_payment_method_types', 'payment_method_types']) {
    const types = list(params, name);
    if (types.length > 0 && !types.includes('card')) throw invalidRequest('Only cards can be used here.', { param: name });
  }
}

function lineItem(params: Params) {
  const [item, ...more] = list(params, 'line_items');
  if (!isParams(item)) throw invalidRequest('Missing required param: line_items.', { code: 'parameter_missing', param: 'line_items' });
  if (more.length > 0) throw invalidRequest('One line item is enough here.', { param: 'line_items' });
  const price = nested(item, 'price_data', 'line_items[0][price_data]');
  if (price === undefined) throw invalidRequest('Only price_data is known here, not stored prices.', { param: 'line_items[0][price]' });
  const product = nested(price, 'product_data', 'line_items[0][price_data][product_data]') ?? {};
  const unitMinor = positive(price, 'unit_amount', 'line_items[0][price_data][unit_amount]');
  if (unitMinor === undefined) {
    throw invalidRequest('Missing required param: line_items[0][price_data][unit_amount].', { code: 'parameter_missing', param: 'line_items[0][price_data][unit_amount]' });
  }
  const quantity = positive(item, 'quantity', 'line_items[0][quantity]') ?? 1;
  const itemCurrency = currency(price, 'currency', 'line_items[0][price_data][currency]');
  assertChargeable(unitMinor * quantity, itemCurrency, 'line_items[0][price_data][unit_amount]');
  return {
    unitMinor,
    quantity,
    currency: itemCurrency,
    name: requiredText(product, 'name', 'line_items[0][price_data][product_data][name]'),
    description: text(product, 'description', 'line_items[0][price_data][product_data][description]') ?? null,
  };
}

function expiresAt(bank: Bank, params: Params): number {
  const nowS = bank.nowS();
  const at = integer(params, 'expires_at') ?? nowS + latestS;
  if (at < nowS + soonestS || at > nowS + latestS) {
    throw invalidRequest('The `expires_at` timestamp must be at least 30 minutes and at most 24 hours from Checkout Session creation.', { param: 'expires_at' });
  }
  return at;
}

function optionalAddress(params: Params, name: string): string | null {
  const value = text(params, name);
  return value === undefined ? null : address(value, name);
}

function address(value: string, param: string): string {
  const isWebAddress = URL.canParse(value) && /^https?:$/.test(new URL(value).protocol);
  if (!isWebAddress) throw invalidRequest('Not a valid URL', { code: 'url_invalid', param });
  return value;
}

function submitMessage(params: Params): string | null {
  const submit = nested(nested(params, 'custom_text') ?? {}, 'submit', 'custom_text[submit]');
  return submit === undefined ? null : requiredText(submit, 'message', 'custom_text[submit][message]');
}
