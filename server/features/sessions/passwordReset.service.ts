import type { EntityManager } from 'typeorm';
import type { Database } from '@/server/database/data-source';
import { withAccount, withSystem } from '@/server/database/school';
import { invalid, notFound, TooMany } from '@/server/http/problem';
import type { Services } from '@/server/http/services';
import { queueMail } from '@/server/mail/queueMail';
import { hashPassword, passwordFault } from './passwords';
import { endAllFamilies } from './refreshTokens';
import { hashOfToken, newSecretToken } from './secretTokens';
import { findAccountId, readAccount } from './sessions.service';
import { admitTry, triesOf } from './throttle';

const resetLifetimeMs = 60 * 60_000;
/** Mails to one address in a quarter of an hour, and from one network address. */
const limits = { publicPerMinute: 0, failuresPerAccount: 3, failuresPerAddress: 30 };
/** Every answer takes at least this long, so that writing a mail does not tell that there is somebody to write to. */
const answerAfterMs = 150;

/** Mails a link with which the person can set a new password. Says nothing, in words or in time, about whether it did. */
export async function askForReset(db: Database, services: Services, email: string, about: { address: string; now: Date }): Promise<void> {
  const pause = new Promise((resolve) => setTimeout(resolve, answerAfterMs));
  await Promise.all([pause, mailReset(db, services, email, about)]);
}

async function mailReset(db: Database, services: Services, email: string, { address, now }: { address: string; now: Date }): Promise<void> {
  const tries = triesOf(services.config, 'reset', email, address);
  const accountId = await withSystem(db, async (tx) => {
    await admitTry(tx, tries, now, limits);
    return findAccountId(tx, email);
  }).catch((error: unknown) => {
    if (error instanceof TooMany) return undefined; // mailed enough; the answer stays the same
    throw error;
  });
  if (accountId === undefined) return;
  const { token, hash } = newSecretToken();
  const expiresAt = new Date(now.getTime() + resetLifetimeMs);
  await withAccount(db, accountId, async (tx) => {
    await tx.query('INSERT INTO password_reset (token_hash, account_id, created_at, expires_at) VALUES ($1, $2, $3, $4)', [hash, accountId, now, expiresAt]);
    await queueMail(tx, {
      toAccountId: accountId, template: 'password-reset', data: { token, expiresAt: expiresAt.toISOString() }, dedupeKey: `password-reset:${hash.toString('hex')}`,
    });
  });
}

/** Sets the password of a link's account, once, and signs it out everywhere. Throws 404 for a link that is not valid any more. */
export async function setPassword(db: Database, token: string, password: string, now: Date): Promise<void> {
  const hash = hashOfToken(token);
  if (!hash) throw linkNotValid();
  const rows: { id: string | null }[] = await withSystem(db, (tx) => tx.query('SELECT find_password_reset($1) AS id', [hash]));
  const accountId = rows[0]?.id;
  if (!accountId) throw linkNotValid();
  await withAccount(db, accountId, async (tx) => {
    await claimReset(tx, hash, now);
    const account = await readAccount(tx, accountId);
    if (!account) throw linkNotValid();
    const fault = passwordFault(password, account.email);
    if (fault !== undefined) throw invalid('password', fault);
    await tx.query('UPDATE account SET password_hash = $2 WHERE id = $1', [accountId, await hashPassword(password)]);
    await tx.query('UPDATE password_reset SET used_at = $2 WHERE account_id = $1 AND used_at IS NULL', [accountId, now]);
    await endAllFamilies(tx, accountId, now);
  });
}

/** Locks the link's row while it is still good: of two uses at once, the second finds it used. */
async function claimReset(tx: EntityManager, hash: Buffer, now: Date): Promise<void> {
  const good: unknown[] = await tx.query(
    'SELECT 1 FROM password_reset WHERE token_hash = $1 AND used_at IS NULL AND expires_at > $2 FOR UPDATE',
    [hash, now],
  );
  if (good.length === 0) throw linkNotValid();
}

function linkNotValid(): Error {
  return notFound('This link was used already or has run out. Ask for a new one.', 'reset_not_valid');
}
