import type { EntityManager } from 'typeorm';
import { notFound, refused } from '@/server/http/problem';
import { cursorValues, pageOf, rowsToAsk } from '@/server/http/paging';
import type { SchoolActor } from '@/server/http/route';
import type { Page } from '@shared/api/common';
import type { PersonView } from '@shared/api/people';
import { isRole, type Role } from '@shared/permissions';
import type { PeopleQuery } from './people.dto';

interface PersonRow {
  id: string;
  name: string;
  email: string;
  roles: string[];
  since: Date;
}

const person = `SELECT a.id, a.name, a.email, m.roles, m.created_at AS since
  FROM membership m JOIN account a ON a.id = m.account_id`;

/** The people of the current school by name. */
export async function listPeople(tx: EntityManager, { schoolId }: SchoolActor, query: PeopleQuery): Promise<Page<PersonView>> {
  const [afterName, afterId] = cursorValues(query, 2) ?? [null, null];
  const search = query.search === undefined ? null : `%${query.search.replaceAll(/[\\%_]/g, '\\$&')}%`;
  const rows: PersonRow[] = await tx.query(
    `${person}
      WHERE m.school_id = $1 AND m.ended_at IS NULL
        AND ($2::text IS NULL OR $2 = ANY (m.roles))
        AND ($3::text IS NULL OR a.name ILIKE $3 OR a.email ILIKE $3)
        AND ($4::text IS NULL OR (a.name, a.id::text) > ($4, $5::text))
      ORDER BY a.name, a.id::text LIMIT $6`,
    [schoolId, query.role ?? null, search, afterName, afterId, rowsToAsk(query)],
  );
  return pageOf(query, rows, (row) => [row.name, row.id], toPersonView);
}

/** Gives a member other roles. Refused when the school would be left without an admin. */
export async function changeRoles(tx: EntityManager, { schoolId }: SchoolActor, accountId: string, roles: readonly Role[]): Promise<PersonView> {
  if (!roles.includes('admin')) await refuseLosingLastAdmin(tx, schoolId, accountId);
  await tx.query('UPDATE membership SET roles = $3 WHERE school_id = $1 AND account_id = $2 AND ended_at IS NULL', [schoolId, accountId, roles]);
  return readPerson(tx, schoolId, accountId);
}

/** Ends a membership; what the person did stays on record. Refused for the last admin, and while a kit is with them. */
export async function endMembership(tx: EntityManager, { schoolId }: SchoolActor, accountId: string, now: Date): Promise<void> {
  await readPerson(tx, schoolId, accountId);
  await refuseLosingLastAdmin(tx, schoolId, accountId);
  const loans: unknown[] = await tx.query(
    "SELECT 1 FROM loan WHERE school_id = $1 AND borrower_id = $2 AND state NOT IN ('settled', 'cancelled') LIMIT 1",
    [schoolId, accountId],
  );
  if (loans.length > 0) throw refused('loan_open', 'This person has a loan that is not settled. Settle or cancel it first, then remove them.');
  await tx.query('UPDATE membership SET ended_at = $3 WHERE school_id = $1 AND account_id = $2 AND ended_at IS NULL', [schoolId, accountId, now]);
}

export async function readPerson(tx: EntityManager, schoolId: string, accountId: string): Promise<PersonView> {
  const rows: PersonRow[] = await tx.query(`${person} WHERE m.school_id = $1 AND m.account_id = $2 AND m.ended_at IS NULL`, [schoolId, accountId]);
  const [row] = rows;
  if (!row) throw notFound('Nobody of this school is meant by that. Reload the list and try again.');
  return toPersonView(row);
}

/** Locks the admins' rows, so that two admins who remove each other at once do not both succeed. */
async function refuseLosingLastAdmin(tx: EntityManager, schoolId: string, accountId: string): Promise<void> {
  const admins: { account_id: string }[] = await tx.query(
    "SELECT account_id FROM membership WHERE school_id = $1 AND 'admin' = ANY (roles) AND ended_at IS NULL ORDER BY account_id FOR UPDATE",
    [schoolId],
  );
  if (admins.length === 1 && admins[0]?.account_id === accountId) {
    throw refused('last_admin', 'This is the only admin of the school. Make somebody else an admin first.');
  }
}

function toPersonView({ id, name, email, roles, since }: PersonRow): PersonView {
  return { id, name, email, roles: roles.filter(isRole), since: since.toISOString() };
}
