import type { EntityManager } from 'typeorm';
import type { Database } from '@/server/database/data-source';
import { withAccount, withSystem } from '@/server/database/school';
import { Problem, signInNeeded } from '@/server/http/problem';
import type { Services } from '@/server/http/services';
import type { SessionView } from '@shared/api/sessions';
import { readMemberships } from './memberships';
import { passwordMatches } from './passwords';
import { endFamilyOf, rotate, startFamily, type IssuedRefreshToken } from './refreshTokens';
import { hashOfToken } from './secretTokens';
import type { SignInBody } from './sessions.dto';
import { admitTry, succeeded, triesOf } from './throttle';

/** A session as answered, and the refresh token that goes into the cookie only. */
export interface OpenedSession {
  readonly view: SessionView;
  readonly refresh: IssuedRefreshToken;
}

interface AccountRow {
  id: string;
  name: string;
  email: string;
  password_hash: string;
}

/** Retries of a request that was answered are replayed for this long; see `idempotency`. */
const idempotencyKeptMs = 3 * 24 * 60 * 60_000;

/** Signs somebody in. The refusal is the same, and takes as long, for a wrong password and for an address nobody has. */
export async function signIn(db: Database, services: Services, body: SignInBody, about: { address: string; now: Date }): Promise<OpenedSession> {
  const { now } = about;
  const tries = triesOf(services.config, 'sign-in', body.email, about.address);
  const accountId = await withSystem(db, async (tx) => {
    await admitTry(tx, tries, now, services.config.limits);
    return findAccountId(tx, body.email);
  });
  const account = accountId === undefined ? undefined : await withAccount(db, accountId, (tx) => readAccount(tx, accountId));
  const right = await passwordMatches(account?.password_hash, body.password);
  if (!account || !right) throw wrongCredentials();
  return withAccount(db, account.id, async (tx) => {
    await succeeded(tx, tries, now);
    await tx.query('DELETE FROM idempotency WHERE account_id = $1 AND created_at < $2', [account.id, new Date(now.getTime() - idempotencyKeptMs)]);
    return { refresh: await startFamily(tx, account.id, now), view: await sessionView(tx, services, account, now) };
  });
}

/** Exchanges the cookie's refresh token for a new one and a new access token. Throws 401 when it is not taken. */
export async function refresh(db: Database, services: Services, token: string | undefined, now: Date): Promise<OpenedSession> {
  const found = await ownerOf(db, token);
  if (!found) throw signInNeeded();
  // Thrown outside: a token used twice revokes its family, and that must be committed.
  const opened = await withAccount(db, found.accountId, async (tx) => {
    const next = await rotate(tx, found.hash, now);
    const account = next && (await readAccount(tx, found.accountId));
    return next && account ? { refresh: next, view: await sessionView(tx, services, account, now) } : undefined;
  });
  if (!opened) throw signInNeeded();
  return opened;
}

/** Ends the session of the cookie's token; does nothing when there is none. */
export async function signOut(db: Database, token: string | undefined, now: Date): Promise<void> {
  const found = await ownerOf(db, token);
  if (found) await withAccount(db, found.accountId, (tx) => endFamilyOf(tx, found.hash, now));
}

/** The account with an address; undefined when nobody has it. Needs no unit of work of that account. */
export async function findAccountId(tx: EntityManager, email: string): Promise<string | undefined> {
  const rows: { id: string | null }[] = await tx.query('SELECT find_account_id($1) AS id', [email]);
  return rows[0]?.id ?? undefined;
}

export async function readAccount(tx: EntityManager, accountId: string): Promise<AccountRow | undefined> {
  const rows: AccountRow[] = await tx.query('SELECT id, name, email, password_hash FROM account WHERE id = $1', [accountId]);
  return rows[0];
}

async function ownerOf(db: Database, token: string | undefined): Promise<{ accountId: string; hash: Buffer } | undefined> {
  const hash = hashOfToken(token);
  if (!hash) return undefined;
  const rows: { account_id: string }[] = await withSystem(db, (tx) => tx.query('SELECT account_id FROM find_refresh_token($1)', [hash]));
  const [row] = rows;
  return row && { accountId: row.account_id, hash };
}

async function sessionView(tx: EntityManager, services: Services, account: AccountRow, now: Date): Promise<SessionView> {
  const { accessToken, expiresAt } = services.accessTokens.issue(account.id, now);
  return {
    accessToken,
    expiresAt: expiresAt.toISOString(),
    account: { id: account.id, name: account.name, email: account.email },
    memberships: await readMemberships(tx, account.id),
  };
}

function wrongCredentials(): Problem {
  return new Problem({
    status: 401, title: 'Not signed in', code: 'wrong_credentials', detail: 'That address and password do not go together. Check both, or reset the password.',
  });
}
