import { createHash, randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { enqueue } from '@/server/jobs/enqueue';
import type { AccountMailTemplate, MailData, SchoolMailTemplate } from './mailData';

/** An account, or an address that has no account yet (an invitation). */
type Addressee = { readonly toAccountId: string } | { readonly toEmail: string };

/** Mail of a school; `tx` is a unit of work of that school. */
type SchoolMail = {
  [Template in SchoolMailTemplate]: { readonly schoolId: string; readonly template: Template; readonly data: MailData[Template] } & Addressee;
}[SchoolMailTemplate];

/** Mail of an account that belongs to no school; `tx` is a unit of work of that account. */
type AccountMail = {
  [Template in AccountMailTemplate]: { readonly schoolId?: never; readonly toAccountId: string; readonly template: Template; readonly data: MailData[Template] };
}[AccountMailTemplate];

export type MailRequest = (SchoolMail | AccountMail) & {
  /** Names the occasion, e.g. `loan-started:${loanId}`. One occasion is mailed once to each addressee. */
  readonly dedupeKey: string;
};

/**
 * Writes one mail to the outbox and enqueues its sending, both in the caller's transaction: it goes out if, and only
 * if, its cause is committed. Asking again for the same occasion and addressee does nothing.
 *
 * @returns whether the mail is new
 */
export async function queueMail(tx: EntityManager, mail: MailRequest): Promise<boolean> {
  const schoolId = mail.schoolId ?? null;
  const accountId = 'toAccountId' in mail ? mail.toAccountId : null;
  const email = 'toEmail' in mail ? mail.toEmail.toLowerCase() : null;
  const addressee = accountId ?? createHash('sha256').update(email ?? '').digest('base64url');
  const id = randomUUID();
  const made: unknown[] = await tx.query(
    `INSERT INTO mail (id, school_id, to_account_id, to_email, template, data, dedupe_key)
     VALUES ($1, $2, $3, $4, $5, $6::jsonb, $7) ON CONFLICT (dedupe_key) DO NOTHING RETURNING id`,
    [id, schoolId, accountId, email, mail.template, JSON.stringify(mail.data), `${schoolId ?? 'account'}:${mail.dedupeKey}:${addressee}`],
  );
  if (made.length === 0) return false;
  await enqueue(tx, 'send-mail', { mailId: id, schoolId, accountId: schoolId === null ? accountId : null }, { key: `mail:${id}` });
  return true;
}
