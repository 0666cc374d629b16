import type { Logger } from 'pino';
import type { Database } from '@/server/database/data-source';
import type { MailPort } from '@/server/mail/mail.port';
import type { PaymentPort } from '@/server/payments/payments.port';

/** What job handlers work with. They run as the application role, through the unit of work, like any request. */
export interface JobDeps {
  readonly db: Database;
  readonly mail: MailPort;
  readonly payments: PaymentPort;
  /** Origin that links in mail lead back to. */
  readonly publicUrl: string;
  readonly now: () => Date;
  readonly log: Logger;
}

/** How far along its tries a job is. */
export interface Attempt {
  readonly number: number;
  readonly isLast: boolean;
}

export type JobHandler<Payload> = (deps: JobDeps, payload: Payload, attempt: Attempt) => Promise<void>;

/** Thrown by a handler when trying again cannot help: the job is given up at once and stays in the queue's table as failed. */
export class PermanentFailure extends Error {
  override readonly name = 'PermanentFailure';
}
