import type { EntityManager } from 'typeorm';
import type { Database } from '@/server/database/data-source';
import { withAccount, withSchoolSystem } from '@/server/database/school';

/** Whose outbox row it is: a school's, or one account's own. */
export interface OutboxKey {
  readonly mailId: string;
  readonly schoolId: string | null;
  readonly accountId: string | null;
}

export interface QueuedMail {
  readonly template: string;
  readonly data: unknown;
  readonly to: string | null;
  readonly recipientName: string | null;
  readonly school: { readonly name: string; readonly timeZone: string } | null;
}

interface Row {
  template: string;
  data: unknown;
  to_email: string | null;
  account_email: string | null;
  account_name: string | null;
  school_name: string | null;
  time_zone: string | null;
}

/** The mail with its addressee as known now, or null when it is gone, sent or given up already. */
export async function readQueuedMail(db: Database, key: OutboxKey): Promise<QueuedMail | null> {
  const rows = await within<Row[]>(db, key, (tx) => tx.query(
    `SELECT m.template, m.data, m.to_email, a.email AS account_email, a.name AS account_name, s.name AS school_name, s.time_zone
       FROM mail m LEFT JOIN account a ON a.id = m.to_account_id LEFT JOIN school s ON s.id = m.school_id
      WHERE m.id = $1 AND m.state = 'queued'`,
    [key.mailId],
  ));
  const row = rows[0];
  if (!row) return null;
  return {
    template: row.template,
    data: row.data,
    to: row.account_email ?? row.to_email,
    recipientName: row.account_name,
    school: row.school_name === null || row.time_zone === null ? null : { name: row.school_name, timeZone: row.time_zone },
  };
}

// Once a mail is done with, the secret of its link must not lie in the database.
const withoutSecret = `data = data - 'token'`;

export async function markSent(db: Database, key: OutboxKey, now: Date): Promise<void> {
  await within(db, key, (tx) => tx.query(`UPDATE mail SET state = 'sent', sent_at = $2, ${withoutSecret} WHERE id = $1 AND state = 'queued'`, [key.mailId, now]));
}

/** @param failure why, in words without anything personal, at most 300 characters */
export async function markFailed(db: Database, key: OutboxKey, failure: string): Promise<void> {
  await within(db, key, (tx) => tx.query(`UPDATE mail SET state = 'failed', failure = $2, ${withoutSecret} WHERE id = $1 AND state = 'queued'`, [key.mailId, failure.slice(0, 300)]));
}

function within<T>(db: Database, key: OutboxKey, work: (tx: EntityManager) => Promise<T>): Promise<T> {
  if (key.schoolId !== null) return withSchoolSystem(db, key.schoolId, work);
  if (key.accountId !== null) return withAccount(db, key.accountId, work);
  throw new RangeError('a mail belongs to a school or to an account');
}
