import { createHmac } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { Config } from '@/server/config';
import { tooMany } from '@/server/http/problem';

const windowMs = 15 * 60_000;
const keptMs = 24 * 60 * 60_000;

/** Whose tries are counted: the typed address, known or not, and the network address they come from. */
export interface Tries {
  readonly accountHash: Buffer;
  readonly addressHash: Buffer;
}

/** Keyed hashes, so that the table of tries does not tell who tried to sign in from where. */
export function triesOf(config: Config, purpose: 'sign-in' | 'reset', email: string, address: string): Tries {
  const keyed = (text: string): Buffer => createHmac('sha256', config.throttleKey).update(`${purpose} ${text}`).digest();
  return { accountHash: keyed(`account ${email}`), addressHash: keyed(`address ${address}`) };
}

/**
 * Counts one try before the password is looked at, or throws `TooMany`. A try stands as a failure until `succeeded` is
 * called, and tries of one account wait for each other here, so that guesses sent all at once do not slip past the count.
 */
export async function admitTry(tx: EntityManager, tries: Tries, now: Date, limits: Config['limits']): Promise<void> {
  await lock(tx, tries.accountHash); // always the account first, so that no two wait for each other
  await lock(tx, tries.addressHash);
  await refuseAbove(tx, 'account_hash', tries.accountHash, limits.failuresPerAccount, now);
  await refuseAbove(tx, 'address_hash', tries.addressHash, limits.failuresPerAddress, now);
  await record(tx, tries, false, now);
  await tx.query('DELETE FROM sign_in_attempt WHERE account_hash = $1 AND at < $2', [tries.accountHash, new Date(now.getTime() - keptMs)]);
}

/** Takes back the failure that `admitTry` put down. */
export function succeeded(tx: EntityManager, tries: Tries, now: Date): Promise<void> {
  return record(tx, tries, true, now);
}

async function record(tx: EntityManager, tries: Tries, success: boolean, now: Date): Promise<void> {
  await tx.query('INSERT INTO sign_in_attempt (account_hash, address_hash, succeeded, at) VALUES ($1, $2, $3, $4)', [
    tries.accountHash, tries.addressHash, success, now,
  ]);
}

async function refuseAbove(tx: EntityManager, column: 'account_hash' | 'address_hash', hash: Buffer, limit: number, now: Date): Promise<void> {
  const rows: { failures: number; first: Date | null }[] = await tx.query(
    `SELECT (count(*) FILTER (WHERE NOT succeeded) - count(*) FILTER (WHERE succeeded))::integer AS failures,
            min(at) FILTER (WHERE NOT succeeded) AS first
       FROM sign_in_attempt WHERE ${column} = $1 AND at > $2`,
    [hash, new Date(now.getTime() - windowMs)],
  );
  const [row] = rows;
  if (!row || row.failures < limit) return;
  const freeAt = (row.first ?? now).getTime() + windowMs;
  throw tooMany((freeAt - now.getTime()) / 1000, 'There were too many tries. Wait a few minutes and try again, or reset the password.', 'too_many_tries');
}

async function lock(tx: EntityManager, hash: Buffer): Promise<void> {
  await tx.query('SELECT pg_advisory_xact_lock($1)', [hash.readBigInt64BE(0).toString()]);
}
