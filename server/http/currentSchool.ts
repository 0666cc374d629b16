import type { EntityManager } from 'typeorm';
import { type Database } from '@/server/database/data-source';
import { withAccount } from '@/server/database/school';
import { isRole } from '@shared/permissions';
import { BadRequest, forbidden } from './problem';
import type { SchoolActor } from './route';
import { isUuid } from './uuid';

interface MembershipRow {
  school_id: string;
  roles: string[];
}

/**
 * The school of this request: the one named by `X-School`, or the only one the account belongs to. Asked anew on every
 * request, so that a person who left a school or lost a role is out at once and not when a token runs out.
 */
export async function currentSchool(db: Database, accountId: string, wanted: string | undefined): Promise<SchoolActor> {
  if (wanted !== undefined && !isUuid(wanted)) throw new BadRequest('bad_school', 'X-School must hold the id of one of your schools.');
  const memberships = await withAccount(db, accountId, (tx) => readMemberships(tx, accountId));
  const found = wanted === undefined ? onlyOne(memberships) : memberships.find((row) => row.school_id === wanted.toLowerCase());
  if (!found) throw forbidden('You do not belong to that school. Choose one of yours.', 'not_a_member');
  return { accountId, schoolId: found.school_id, roles: found.roles.filter(isRole) };
}

function readMemberships(tx: EntityManager, accountId: string): Promise<MembershipRow[]> {
  return tx.query('SELECT school_id, roles FROM membership WHERE account_id = $1 AND ended_at IS NULL', [accountId]);
}

function onlyOne(memberships: readonly MembershipRow[]): MembershipRow {
  const [first, second] = memberships;
  if (!first) throw forbidden('You do not belong to a school yet. Ask an admin of your school to invite you.', 'no_school');
  if (second) throw new BadRequest('school_needed', 'You belong to several schools. Name one of them in X-School.');
  return first;
}
