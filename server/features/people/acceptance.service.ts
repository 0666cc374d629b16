import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { Database } from '@/server/database/data-source';
import { withAccount, withSchool, withSchoolSystem, withSystem } from '@/server/database/school';
import { invalid, notFound } from '@/server/http/problem';
import type { Services } from '@/server/http/services';
import { hashPassword, passwordFault, passwordMatches } from '@/server/features/sessions/passwords';
import { hashOfToken } from '@/server/features/sessions/secretTokens';
import { findAccountId, readAccount } from '@/server/features/sessions/sessions.service';
import { admitTry, succeeded, triesOf } from '@/server/features/sessions/throttle';
import type { InvitationOffer } from '@shared/api/people';
import { isRole, roles as allRoles } from '@shared/permissions';
import type { AcceptInvitationBody } from './people.dto';

interface OpenInvitation {
  id: string;
  schoolId: string;
  email: string;
  name: string;
  roles: string[];
}

/** What the link offers. Says nothing of whether the address has an account. */
export async function readOffer(db: Database, token: string, now: Date): Promise<InvitationOffer> {
  const found = await findInvitation(db, token);
  return withSchoolSystem(db, found.schoolId, async (tx) => {
    const { email, name, roles } = await readOpen(tx, found, now);
    const schools: { name: string }[] = await tx.query('SELECT name FROM school WHERE id = $1', [found.schoolId]);
    return { schoolName: schools[0]?.name ?? '', email, name, roles: roles.filter(isRole) };
  });
}

/**
 * Joins the school. Somebody without an account gets one; somebody who has one proves it with its password, and its name
 * stays. Counted like a sign-in, so that a link is no way around the limit on guesses.
 */
export async function accept(db: Database, services: Services, token: string, body: AcceptInvitationBody, about: { address: string; now: Date }): Promise<void> {
  const { now } = about;
  const found = await findInvitation(db, token);
  const invitation = await withSchoolSystem(db, found.schoolId, (tx) => readOpen(tx, found, now));
  const tries = triesOf(services.config, 'sign-in', invitation.email, about.address);
  const known = await withSystem(db, async (tx) => {
    await admitTry(tx, tries, now, services.config.limits);
    return findAccountId(tx, invitation.email);
  });
  const passwordHash = known === undefined ? await newPasswordHash(invitation, body) : undefined;
  if (known !== undefined) await requirePassword(db, known, body.password);
  const accountId = known ?? randomUUID();
  await withSchool(db, { accountId, schoolId: invitation.schoolId }, async (tx) => {
    await claim(tx, invitation, now);
    if (passwordHash !== undefined) {
      await tx.query('INSERT INTO account (id, email, name, password_hash, created_at) VALUES ($1, $2, $3, $4, $5)', [accountId, invitation.email, body.name, passwordHash, now]);
    }
    await join(tx, invitation, accountId, now);
    await succeeded(tx, tries, now);
  });
}

async function findInvitation(db: Database, token: string): Promise<{ id: string; schoolId: string }> {
  const hash = hashOfToken(token);
  if (!hash) throw linkNotValid();
  const rows: { id: string; schoolId: string }[] = await withSystem(db, (tx) => tx.query('SELECT id, school_id AS "schoolId" FROM find_invitation($1)', [hash]));
  const [row] = rows;
  if (!row) throw linkNotValid();
  return row;
}

async function readOpen(tx: EntityManager, { id, schoolId }: { id: string; schoolId: string }, now: Date): Promise<OpenInvitation> {
  const rows: OpenInvitation[] = await tx.query(
    `SELECT id, school_id AS "schoolId", email, name, roles FROM invitation
      WHERE id = $1 AND school_id = $2 AND accepted_at IS NULL AND withdrawn_at IS NULL AND expires_at > $3`,
    [id, schoolId, now],
  );
  const [row] = rows;
  if (!row) throw linkNotValid();
  return row;
}

/** Of two acceptances at once, the second waits here and then finds the invitation used. */
async function claim(tx: EntityManager, { id }: OpenInvitation, now: Date): Promise<void> {
  const [, count]: [unknown, number] = await tx.query(
    'UPDATE invitation SET accepted_at = $2 WHERE id = $1 AND accepted_at IS NULL AND withdrawn_at IS NULL AND expires_at > $2', [id, now],
  );
  if (count === 0) throw linkNotValid();
}

/** Somebody who belonged to the school before comes back with the invitation's roles; a present member keeps theirs as well. */
async function join(tx: EntityManager, { schoolId, roles }: OpenInvitation, accountId: string, now: Date): Promise<void> {
  const present: { roles: string[] }[] = await tx.query(
    'SELECT roles FROM membership WHERE school_id = $1 AND account_id = $2 AND ended_at IS NULL', [schoolId, accountId]);
  const held = new Set([...roles, ...(present[0]?.roles ?? [])]);
  await tx.query(
    `INSERT INTO membership (school_id, account_id, roles, created_at) VALUES ($1, $2, $3, $4)
     ON CONFLICT (school_id, account_id) DO UPDATE SET roles = EXCLUDED.roles, ended_at = NULL`,
    [schoolId, accountId, allRoles.filter((role) => held.has(role)), now],
  );
}

async function newPasswordHash({ email }: OpenInvitation, { password }: AcceptInvitationBody): Promise<string> {
  const fault = passwordFault(password, email);
  if (fault !== undefined) throw invalid('password', fault);
  return hashPassword(password);
}

async function requirePassword(db: Database, accountId: string, password: string): Promise<void> {
  const account = await withAccount(db, accountId, (tx) => readAccount(tx, accountId));
  if (await passwordMatches(account?.password_hash, password)) return;
  throw invalid('password', 'You have an account with this address already. Enter its password, or reset it first.', 'account_password');
}

function linkNotValid(): Error {
  return notFound('This invitation was used already, withdrawn or has run out. Ask the school for a new one.', 'invitation_not_valid');
}
