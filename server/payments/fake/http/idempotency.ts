import { createHash } from 'node:crypto';

import type { Bank } from '../bank';
import { ApiError, invalidRequest } from '../errors';
import type { Params } from '../params';
import type { StoredAnswer } from '../state';

const longestKey = 255;

export function requestHash(path: string, params: Params): string {
  return createHash('sha256').update(JSON.stringify([path, sorted(params)])).digest('hex');
}

/** Fields may come in any order; the same fields are the same request. */
function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted);
  if (typeof value !== 'object' || value === null) return value;
  return Object.entries(value)
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([key, inner]) => [key, sorted(inner)]);
}

/** The stored answer to replay, or null when the key is new. Throws when the key belongs to another request. */
export function storedAnswer(bank: Bank, key: string, hash: string): StoredAnswer | null {
  if (key.length > longestKey) throw invalidRequest(`Idempotency keys may be at most ${longestKey} characters.`);
  const stored = Object.hasOwn(bank.state.idempotency, key) ? bank.state.idempotency[key] : undefined;
  if (stored === undefined) return null;
  if (stored.requestHash !== hash) {
    throw new ApiError(400, {
      type: 'idempotency_error',
      message: 'Keys for idempotent requests can only be used with the same parameters they were first used with. Try using a key other than the one given if you meant to execute a different request.',
    });
  }
  return stored;
}

/** Refusals of the request itself (400, 404) did no work and are not kept; a decline is (docs.stripe.com/api/idempotent_requests). */
export function storeAnswer(bank: Bank, key: string, hash: string, status: number, body: unknown): void {
  if (status === 400 || status === 404) return;
  bank.state.idempotency[key] = { requestHash: hash, status, body, storedAtS: bank.nowS() };
}
