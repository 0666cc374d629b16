import { find } from '../bank';
import type { Bank } from '../bank';
import type { SetupIntentDocument } from '../documents';
import { invalidRequest } from '../errors';
import { listOf, pagingFields } from '../http/lists';
import type { Operation } from '../http/operation';
import { attachMethod, createCustomer } from '../objects/customers';
import { createMethod, findMethod } from '../objects/methods';
import { attemptSetup, cancelSetup, createSetup, setupDeclineOf } from '../objects/setups';
import { flag, integer, metadata, nested, oneOf, requiredText, text } from '../params';
import type { Params } from '../params';

/** Customers, their kept cards, and the wish to keep one. */
export const peopleOperations: readonly Operation[] = [
  {
    method: 'post',
    path: '/customers',
    fields: ['description', 'email', 'metadata', 'name', 'phone'],
    run: ({ bank, params }) =>
      createCustomer(bank, {
        email: text(params, 'email') ?? null,
        name: text(params, 'name') ?? null,
        description: text(params, 'description') ?? null,
        phone: text(params, 'phone') ?? null,
        metadata: metadata(params),
      }),
  },
  { method: 'get', path: '/customers/:id', fields: [], run: ({ bank, id }) => find(bank, 'customer', id) },
  {
    method: 'get',
    path: '/customers',
    fields: [...pagingFields, 'email'],
    run({ bank, params }) {
      const email = text(params, 'email');
      return listOf(bank, { name: 'customer', url: '/v1/customers', params, matches: (customer) => email === undefined || customer.email === email });
    },
  },
  { method: 'post', path: '/payment_methods', fields: ['billing_details', 'card', 'type'], run: ({ bank, params }) => newMethod(bank, params) },
  { method: 'get', path: '/payment_methods/:id', fields: [], run: ({ bank, id }) => find(bank, 'payment_method', id) },
  {
    method: 'post',
    path: '/payment_methods/:id/attach',
    fields: ['customer'],
    run: ({ bank, params, id }) => attachMethod(bank, findMethod(bank, id), requiredText(params, 'customer')),
  },
  {
    method: 'post',
    path: '/payment_methods/:id/detach',
    fields: [],
    run({ bank, id }) {
      const method = find(bank, 'payment_method', id);
      method.customer = null;
      return method;
    },
  },
  {
    method: 'get',
    path: '/payment_methods',
    fields: [...pagingFields, 'customer', 'type'],
    run({ bank, params }) {
      const customer = text(params, 'customer');
      return listOf(bank, { name: 'payment_method', url: '/v1/payment_methods', params, matches: (method) => customer === undefined || method.customer === customer });
    },
  },
  {
    method: 'post',
    path: '/setup_intents',
    fields: ['allowed_payment_method_types', 'confirm', 'customer', 'description', 'metadata', 'payment_method', 'payment_method_types', 'return_url', 'usage'],
    run: ({ bank, params }) => newSetup(bank, params),
  },
  { method: 'get', path: '/setup_intents/:id', fields: [], run: ({ bank, id }) => find(bank, 'setup_intent', id) },
  {
    method: 'post',
    path: '/setup_intents/:id/confirm',
    fields: ['payment_method', 'return_url'],
    run: ({ bank, params, id }) => confirmSetup(bank, find(bank, 'setup_intent', id), params),
  },
  {
    method: 'post',
    path: '/setup_intents/:id/cancel',
    fields: ['cancellation_reason'],
    run({ bank, params, id }) {
      const setup = find(bank, 'setup_intent', id);
      cancelSetup(bank, setup, oneOf(params, 'cancellation_reason', ['abandoned', 'duplicate', 'requested_by_customer']) ?? null);
      return setup;
    },
  },
  {
    method: 'get',
    path: '/setup_intents',
    fields: [...pagingFields, 'customer'],
    run({ bank, params }) {
      const customer = text(params, 'customer');
      return listOf(bank, { name: 'setup_intent', url: '/v1/setup_intents', params, matches: (setup) => customer === undefined || setup.customer === customer });
    },
  },
];

function newMethod(bank: Bank, params: Params) {
  if (requiredText(params, 'type') !== 'card') throw invalidRequest('Only cards can be used here.', { param: 'type' });
  const card = nested(params, 'card') ?? {};
  const billing = nested(params, 'billing_details') ?? {};
  return createMethod(bank, {
    number: requiredText(card, 'number', 'card[number]'),
    expMonth: integer(card, 'exp_month', 'card[exp_month]') ?? 0,
    expYear: integer(card, 'exp_year', 'card[exp_year]') ?? 0,
    email: text(billing, 'email') ?? null,
    name: text(billing, 'name') ?? null,
  });
}

function newSetup(bank: Bank, params: Params): SetupIntentDocument {
  const customerId = text(params, 'customer') ?? null;
  if (customerId !== null) find(bank, 'customer', customerId, 'customer');
  const setup = createSetup(bank, {
    customerId,
    description: text(params, 'description') ?? null,
    metadata: metadata(params),
    usage: oneOf(params, 'usage', ['off_session', 'on_session']) ?? 'off_session',
  });
  return flag(params, 'confirm') === true ? confirmSetup(bank, setup, params) : setup;
}

function confirmSetup(bank: Bank, setup: SetupIntentDocument, params: Params): SetupIntentDocument {
  const method = findMethod(bank, requiredText(params, 'payment_method'));
  attemptSetup(bank, setup, { method, authenticateUrl: `${bank.pageBase}/authenticate/${setup.id}` });
  const refusal = setupDeclineOf(setup);
  if (refusal !== null) throw refusal;
  return setup;
}
