import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { BadRequest, Invalid, Refused } from './problem';
import type { IdempotentCall } from './route';

/** Kept after the call, to be given again word for word when the same key comes back. */
export interface StoredAnswer {
  readonly status: number;
  readonly body: unknown;
}

interface StoredRow {
  request_hash: Buffer;
  status: number | null;
  answer: unknown;
}

const printable = /^[\x21-\x7e]{1,255}$/;

/** Reads the `Idempotency-Key`; throws 400 when it is missing or unfit. */
export function readKey(header: string | undefined): string {
  if (header === undefined) throw new BadRequest('idempotency_key_missing', 'Send an Idempotency-Key: a new one for each thing done, the same one for each retry.');
  if (!printable.test(header)) throw new BadRequest('idempotency_key_unfit', 'Idempotency-Key must be 1 to 255 printable characters without spaces.');
  return header;
}

/** The hash by which a retry is told from another request under the same key. Field order does not matter. */
export function hashRequest(parts: { schoolId: string | undefined; params: object; query: unknown; body: unknown; files: readonly Buffer[] }): Buffer {
  const hash = createHash('sha256');
  hash.update(JSON.stringify([parts.schoolId ?? null, sorted(parts.params), sorted(parts.query), sorted(parts.body)]));
  for (const bytes of parts.files) hash.update(createHash('sha256').update(bytes).digest());
  return hash.digest();
}

function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted);
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1));
  return entries.map(([key, item]: [string, unknown]) => [key, sorted(item)]);
}

/**
 * Claims the key inside the caller's transaction. Returns undefined when the work is the caller's to do, or the stored
 * answer to repeat. A rival with the same key waits in the INSERT until the first commits or rolls back.
 *
 * The three-step form, for routes that call the payment service between two transactions:
 *   1. `const before = await claimKey(tx, call)` and the intent; `before` is `'unfinished'` when an earlier try with this
 *      key committed step 1 but not step 3: go on from its intent instead of making another.
 *   2. the call to the payment service, outside any transaction
 *   3. the outcome and `await storeAnswer(tx, call, { status, body })`
 */
export async function claimKey(tx: EntityManager, call: IdempotentCall): Promise<StoredAnswer | 'unfinished' | undefined> {
  const claimed: unknown[] = await tx.query(
    `INSERT INTO idempotency (account_id, operation, key, request_hash) VALUES ($1, $2, $3, $4)
     ON CONFLICT DO NOTHING RETURNING key`,
    [call.accountId, call.operation, call.key, call.requestHash],
  );
  if (claimed.length === 1) return undefined;
  const rows: StoredRow[] = await tx.query(
    'SELECT request_hash, status, answer FROM idempotency WHERE account_id = $1 AND operation = $2 AND key = $3',
    [call.accountId, call.operation, call.key],
  );
  const row = rows[0];
  if (!row) throw new Refused('idempotency_key_busy', 'The same request is being worked on. Try again in a moment.');
  if (!row.request_hash.equals(call.requestHash)) throw keyReused();
  return row.status === null ? 'unfinished' : { status: row.status, body: row.answer ?? undefined };
}

/** Keeps the answer under the claimed key, in the transaction that holds the outcome. */
export async function storeAnswer(tx: EntityManager, call: IdempotentCall, answer: StoredAnswer): Promise<void> {
  await tx.query(
    'UPDATE idempotency SET status = $4, answer = $5::jsonb WHERE account_id = $1 AND operation = $2 AND key = $3',
    [call.accountId, call.operation, call.key, answer.status, answer.body === undefined ? null : JSON.stringify(answer.body)],
  );
}

function keyReused(): Invalid {
  return new Invalid(
    [{ field: 'Idempotency-Key', message: 'This key was used for another request.' }],
    'idempotency_key_reused',
    'Use a new Idempotency-Key for a new request.',
  );
}
