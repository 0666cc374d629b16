import type { EntityManager } from 'typeorm';
import { type JobName, type JobPayload, type SweepName, payloads, schoolJob } from './payloads';

export interface EnqueueOptions {
  /** Not before this moment; at once when left out. */
  readonly runAt?: Date;
  /** A waiting job with the same key is replaced, one that is already running is followed by a new one. */
  readonly key?: string;
  /** Tries before the job is given up, with exponential back-off between them (1 to 25). */
  readonly maxAttempts?: number;
}

const DEFAULT_ATTEMPTS = 16; // back-off is e^attempt seconds, capped by the queue: about a day and a half in all

/**
 * Puts a job into the queue in the caller's own transaction: it exists if, and only if, its cause is committed.
 *
 * @throws PoisonedPayload when the payload is not what `payloads.ts` says, before anything is written
 * @example await enqueue(tx, 'send-mail', { mailId, schoolId, accountId: null }, { key: `mail:${mailId}` })
 */
export function enqueue<N extends JobName>(
  tx: EntityManager,
  name: N,
  payload: JobPayload<N>,
  options: EnqueueOptions = {},
): Promise<void> {
  return put(tx, name, payloads[name](payload), options);
}

/** Enqueues one of the sweeps of `payloads.ts` for one school; while it waits, the same sweep again changes nothing. */
export function enqueueSweep(tx: EntityManager, name: SweepName, schoolId: string): Promise<void> {
  return put(tx, name, schoolJob({ schoolId }), { key: `${name}:${schoolId}`, maxAttempts: 3 });
}

/** Goes through a SECURITY DEFINER function (`install.ts`): the application role may not touch the queue's own tables. */
async function put(tx: EntityManager, name: string, payload: unknown, options: EnqueueOptions): Promise<void> {
  await tx.query('SELECT jobs.enqueue_job($1, $2::json, $3::timestamptz, $4, $5::integer)', [
    name,
    JSON.stringify(payload),
    options.runAt?.toISOString() ?? null,
    options.key ?? null,
    options.maxAttempts ?? DEFAULT_ATTEMPTS,
  ]);
}
