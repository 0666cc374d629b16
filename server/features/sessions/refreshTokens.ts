import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { newSecretToken } from './secretTokens';

/** How long somebody who does nothing stays signed in. */
export const refreshLifetimeMs = 30 * 24 * 60 * 60_000;
/** How long the token before is still taken, while its successor is unused: two tabs, or an answer lost on the way. */
const graceMs = 30_000;

export interface IssuedRefreshToken {
  readonly token: string;
  readonly expiresAt: Date;
}

interface TokenRow {
  id: string;
  family_id: string;
  account_id: string;
  expires_at: Date;
  replaced_at: Date | null;
  revoked_at: Date | null;
}

/** Starts a family: one sign-in on one device, whose tokens follow each other. */
export function startFamily(tx: EntityManager, accountId: string, now: Date): Promise<IssuedRefreshToken> {
  return issue(tx, { familyId: randomUUID(), accountId, predecessorId: null, now });
}

/**
 * Exchanges a refresh token for its successor, in a unit of work of its account. Returns undefined when it is not taken;
 * if that is because it was used before, somebody else may hold a copy, so the whole family is revoked and both must
 * sign in again. The caller must commit in either case.
 */
export async function rotate(tx: EntityManager, tokenHash: Buffer, now: Date): Promise<IssuedRefreshToken | undefined> {
  const row = await lockedToken(tx, tokenHash);
  if (!row || row.expires_at <= now) return undefined;
  if (row.revoked_at !== null || (row.replaced_at !== null && !(await isWithinGrace(tx, row, now)))) {
    await revokeFamily(tx, row.family_id, now);
    return undefined;
  }
  // Once this token is used, others that followed the same predecessor are no longer anybody's: they were the lost answers.
  await tx.query(
    `UPDATE refresh_token SET revoked_at = $2 WHERE id <> $1 AND revoked_at IS NULL
       AND predecessor_id = (SELECT predecessor_id FROM refresh_token WHERE id = $1)`,
    [row.id, now],
  );
  await tx.query('UPDATE refresh_token SET replaced_at = $2 WHERE id = $1 AND replaced_at IS NULL', [row.id, now]);
  return issue(tx, { familyId: row.family_id, accountId: row.account_id, predecessorId: row.id, now });
}

/** Ends the family of a token: signing out on one device. */
export async function endFamilyOf(tx: EntityManager, tokenHash: Buffer, now: Date): Promise<void> {
  const row = await lockedToken(tx, tokenHash);
  if (row) await revokeFamily(tx, row.family_id, now);
}

/** Ends every family of the unit of work's account: after a new password, all devices sign in again. */
export async function endAllFamilies(tx: EntityManager, accountId: string, now: Date): Promise<void> {
  await tx.query('UPDATE refresh_token SET revoked_at = $2 WHERE account_id = $1 AND revoked_at IS NULL', [accountId, now]);
}

async function isWithinGrace(tx: EntityManager, row: TokenRow, now: Date): Promise<boolean> {
  if (row.replaced_at === null || now.getTime() - row.replaced_at.getTime() > graceMs) return false;
  const used: unknown[] = await tx.query('SELECT 1 FROM refresh_token WHERE predecessor_id = $1 AND replaced_at IS NOT NULL LIMIT 1', [row.id]);
  return used.length === 0;
}

/** Tokens of one family are handled one after the other, else two uses at once could both look like the first. */
async function lockedToken(tx: EntityManager, tokenHash: Buffer): Promise<TokenRow | undefined> {
  await tx.query('SELECT pg_advisory_xact_lock(hashtextextended(family_id::text, 0)) FROM refresh_token WHERE token_hash = $1', [tokenHash]);
  const rows: TokenRow[] = await tx.query(
    'SELECT id, family_id, account_id, expires_at, replaced_at, revoked_at FROM refresh_token WHERE token_hash = $1',
    [tokenHash],
  );
  return rows[0];
}

async function revokeFamily(tx: EntityManager, familyId: string, now: Date): Promise<void> {
  await tx.query('UPDATE refresh_token SET revoked_at = $2 WHERE family_id = $1 AND revoked_at IS NULL', [familyId, now]);
}

interface Issue {
  familyId: string;
  accountId: string;
  predecessorId: string | null;
  now: Date;
}

async function issue(tx: EntityManager, { familyId, accountId, predecessorId, now }: Issue): Promise<IssuedRefreshToken> {
  const { token, hash } = newSecretToken();
  const expiresAt = new Date(now.getTime() + refreshLifetimeMs);
  await tx.query(
    `INSERT INTO refresh_token (family_id, account_id, token_hash, predecessor_id, created_at, expires_at)
     VALUES ($1, $2, $3, $4, $5, $6)`,
    [familyId, accountId, hash, predecessorId, now, expiresAt],
  );
  return { token, expiresAt };
}
