import { find } from '../bank';
import type { Bank } from '../bank';
import type { ChargeDocument } from '../documents';
import { invalidRequest, unexpectedState } from '../errors';
import { listOf, pagingFields } from '../http/lists';
import type { Operation } from '../http/operation';
import { chargeOf } from '../objects/charges';
import { createRefund } from '../objects/refunds';
import { metadata, oneOf, positive, text } from '../params';
import type { Params } from '../params';

export const chargeOperations: readonly Operation[] = [
  { method: 'get', path: '/charges/:id', fields: [], run: ({ bank, id }) => find(bank, 'charge', id) },
  {
    method: 'get',
    path: '/charges',
    fields: [...pagingFields, 'customer', 'payment_intent'],
    run({ bank, params }) {
      const customer = text(params, 'customer');
      const intent = text(params, 'payment_intent');
      return listOf(bank, {
        name: 'charge',
        url: '/v1/charges',
        params,
        matches: (charge) =>
          (customer === undefined || charge.customer === customer) && (intent === undefined || charge.payment_intent === intent),
      });
    },
  },
  {
    method: 'post',
    path: '/refunds',
    fields: ['amount', 'charge', 'metadata', 'payment_intent', 'reason'],
    run: ({ bank, params }) => refund(bank, params),
  },
  { method: 'get', path: '/refunds/:id', fields: [], run: ({ bank, id }) => find(bank, 'refund', id) },
  {
    method: 'post',
    path: '/refunds/:id',
    fields: ['metadata'],
    run({ bank, params, id }) {
      const found = find(bank, 'refund', id);
      found.metadata = metadata(params, found.metadata ?? {});
      return found;
    },
  },
  {
    method: 'get',
    path: '/refunds',
    fields: [...pagingFields, 'charge', 'payment_intent'],
    run({ bank, params }) {
      const charge = text(params, 'charge');
      const intent = text(params, 'payment_intent');
      return listOf(bank, {
        name: 'refund',
        url: '/v1/refunds',
        params,
        matches: (found) => (charge === undefined || found.charge === charge) && (intent === undefined || found.payment_intent === intent),
      });
    },
  },
];

function refund(bank: Bank, params: Params) {
  const charge = chargeToRefund(bank, params);
  const amountMinor = positive(params, 'amount') ?? charge.amount - charge.amount_refunded;
  const reason = oneOf(params, 'reason', ['duplicate', 'fraudulent', 'requested_by_customer']) ?? null;
  return createRefund(bank, charge, { amountMinor, reason, metadata: metadata(params) });
}

function chargeToRefund(bank: Bank, params: Params): ChargeDocument {
  const chargeId = text(params, 'charge');
  const intentId = text(params, 'payment_intent');
  if (chargeId !== undefined) return find(bank, 'charge', chargeId, 'charge');
  if (intentId === undefined) throw invalidRequest('One of the following params should be provided for this request: payment_intent or charge.');
  const intent = find(bank, 'payment_intent', intentId, 'payment_intent');
  const charge = chargeOf(bank, intent);
  if (charge === null || !charge.captured) {
    throw unexpectedState(intent, `This PaymentIntent (${intent.id}) does not have a successful charge to refund.`);
  }
  return charge;
}
