import { fakeApiVersion, find, keep, newId } from '../bank';
import type { Bank } from '../bank';
import type { DisputeDocument } from '../documents';
import { invalidRequest } from '../errors';
import { listOf, pagingFields } from '../http/lists';
import type { Operation } from '../http/operation';
import { closeDispute, evidenceFields, submitEvidence } from '../objects/disputes';
import { flag, list, metadata, nested, oneOf, requiredText, text } from '../params';
import type { Params } from '../params';

/** The account's books, its disputes, its events and where they are sent. */
export const accountOperations: readonly Operation[] = [
  { method: 'get', path: '/balance_transactions/:id', fields: [], run: ({ bank, id }) => find(bank, 'balance_transaction', id) },
  {
    method: 'get',
    path: '/balance_transactions',
    fields: [...pagingFields, 'currency', 'source', 'type'],
    run({ bank, params }) {
      const wanted = { currency: text(params, 'currency'), source: text(params, 'source'), type: text(params, 'type') };
      return listOf(bank, {
        name: 'balance_transaction',
        url: '/v1/balance_transactions',
        params,
        matches: (line) =>
          (wanted.currency === undefined || line.currency === wanted.currency) &&
          (wanted.source === undefined || line.source === wanted.source) &&
          (wanted.type === undefined || line.type === wanted.type),
      });
    },
  },
  { method: 'get', path: '/disputes/:id', fields: [], run: ({ bank, id }) => find(bank, 'dispute', id) },
  { method: 'post', path: '/disputes/:id', fields: ['evidence', 'metadata', 'submit'], run: ({ bank, params, id }) => answerDispute(bank, id, params) },
  {
    method: 'post',
    path: '/disputes/:id/close',
    fields: [],
    run({ bank, id }) {
      const dispute = find(bank, 'dispute', id);
      closeDispute(bank, dispute, 'lost');
      return dispute;
    },
  },
  {
    method: 'get',
    path: '/disputes',
    fields: [...pagingFields, 'charge', 'payment_intent'],
    run({ bank, params }) {
      const charge = text(params, 'charge');
      const intent = text(params, 'payment_intent');
      return listOf(bank, {
        name: 'dispute',
        url: '/v1/disputes',
        params,
        matches: (dispute) => (charge === undefined || dispute.charge === charge) && (intent === undefined || dispute.payment_intent === intent),
      });
    },
  },
  { method: 'get', path: '/events/:id', fields: [], run: ({ bank, id }) => find(bank, 'event', id) },
  {
    method: 'get',
    path: '/events',
    fields: [...pagingFields, 'delivery_success', 'type', 'types'],
    run({ bank, params }) {
      const one = text(params, 'type');
      const types = one === undefined ? list(params, 'types') : [one];
      const delivered = flag(params, 'delivery_success');
      return listOf(bank, {
        name: 'event',
        url: '/v1/events',
        params,
        matches: (event) =>
          (types.length === 0 || types.includes(event.type)) && (delivered === undefined || (event.pending_webhooks === 0) === delivered),
      });
    },
  },
  { method: 'post', path: '/webhook_endpoints', fields: ['api_version', 'description', 'enabled_events', 'metadata', 'url'], run: ({ bank, params }) => newEndpoint(bank, params) },
  { method: 'get', path: '/webhook_endpoints/:id', fields: [], run: ({ bank, id }) => find(bank, 'webhook_endpoint', id) },
  {
    method: 'post',
    path: '/webhook_endpoints/:id',
    fields: ['disabled', 'enabled_events', 'url'],
    run({ bank, params, id }) {
      const endpoint = find(bank, 'webhook_endpoint', id);
      const disabled = flag(params, 'disabled');
      if (disabled !== undefined) endpoint.status = disabled ? 'disabled' : 'enabled';
      if (params.enabled_events !== undefined) endpoint.enabled_events = eventNames(params);
      endpoint.url = text(params, 'url') ?? endpoint.url;
      return endpoint;
    },
  },
  {
    method: 'delete',
    path: '/webhook_endpoints/:id',
    fields: [],
    run({ bank, id }) {
      find(bank, 'webhook_endpoint', id);
      Reflect.deleteProperty(bank.state.documents.webhook_endpoint, id);
      return { id, object: 'webhook_endpoint', deleted: true };
    },
  },
  {
    method: 'get',
    path: '/webhook_endpoints',
    fields: [...pagingFields],
    run: ({ bank, params }) => listOf(bank, { name: 'webhook_endpoint', url: '/v1/webhook_endpoints', params }),
  },
];

function answerDispute(bank: Bank, id: string, params: Params): DisputeDocument {
  const dispute = find(bank, 'dispute', id);
  const given = nested(params, 'evidence') ?? {};
  const evidence: Record<string, string> = {};
  for (const name of Object.keys(given)) {
    if (!evidenceFields.some((field) => field === name)) throw invalidRequest(`Received unknown parameter: evidence[${name}]`, { code: 'parameter_unknown', param: `evidence[${name}]` });
    evidence[name] = requiredText(given, name, `evidence[${name}]`);
  }
  dispute.metadata = metadata(params, dispute.metadata);
  submitEvidence(bank, dispute, evidence, flag(params, 'submit') ?? true);
  return dispute;
}

/** All endpoints are signed with the one secret this fake was started with; a new one has none of its own. */
function newEndpoint(bank: Bank, params: Params) {
  const version = oneOf(params, 'api_version', [fakeApiVersion]) ?? null;
  return keep(bank, 'webhook_endpoint', endpointDocument(bank, newId('we'), {
    url: requiredText(params, 'url'),
    enabledEvents: eventNames(params),
    description: text(params, 'description') ?? null,
    apiVersion: version,
    metadata: metadata(params),
  }));
}

interface NewEndpoint {
  url: string;
  enabledEvents: string[];
  description: string | null;
  apiVersion: string | null;
  metadata: Record<string, string>;
}

export function endpointDocument(bank: Bank, id: string, given: NewEndpoint) {
  return {
    id,
    object: 'webhook_endpoint' as const,
    api_version: given.apiVersion,
    application: null,
    created: bank.nowS(),
    description: given.description,
    enabled_events: given.enabledEvents,
    livemode: false,
    metadata: given.metadata,
    status: 'enabled',
    url: given.url,
  };
}

function eventNames(params: Params): string[] {
  const names = list(params, 'enabled_events').map(String);
  if (names.length === 0) throw invalidRequest('Missing required param: enabled_events.', { code: 'parameter_missing', param: 'enabled_events' });
  return names;
}
