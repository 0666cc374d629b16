import { type PayloadOf, orNull, shape, text, uuid } from './shape';

/** What a job that works inside one school carries; the rest it reads anew, because the world may have moved on. */
export const schoolJob = shape({ schoolId: uuid });

/**
 * Jobs that every school gets every minute. A new sweep is one line here and one in `tasks.ts`; its handler finds for
 * itself what is due (`JobHandler<{ schoolId: string }>`) and does nothing when nothing is.
 */
const sweeps = {
  /** Give back kits whose reservation ran out before the deposit was paid. */
  'expire-reservations': schoolJob,
  /** Take up payments and steps at the payment service that were cut off. */
  'finish-payments': schoolJob,
  /** Take the whole of a hold that is about to end under an unsettled loan. */
  'watch-holds': schoolJob,
} as const;

/**
 * Every kind of background job and what it carries. A new job is one line here and one in `tasks.ts`.
 * Payloads hold ids, never names, addresses or anything a person would mind finding in a queue table.
 */
export const payloads = {
  ...sweeps,
  /** Every minute: enqueue each school's own sweeps. */
  'sweep-schools': shape({}),
  /** Work off one notice of the payment service's inbox. */
  'payment-event': shape({ eventId: text, paymentIntentId: orNull(text) }),
  /** Take the steps that a decision left intended at the payment service. */
  'payment-steps': shape({ schoolId: uuid, paymentId: uuid }),
  /** Render one row of the outbox and hand it to the mail service. `schoolId` or `accountId` says whose row it is. */
  'send-mail': shape({ mailId: uuid, schoolId: orNull(uuid), accountId: orNull(uuid) }),
};

export type JobName = keyof typeof payloads;
export type JobPayload<N extends JobName> = PayloadOf<(typeof payloads)[N]>;

export type SweepName = keyof typeof sweeps;
export const schoolSweeps = Object.keys(sweeps) as SweepName[];
