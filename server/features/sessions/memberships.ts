import type { EntityManager } from 'typeorm';
import { isRole } from '@shared/permissions';
import type { MembershipView } from '@shared/api/sessions';

interface MembershipRow {
  schoolId: string;
  schoolName: string;
  roles: string[];
}

/** The schools an account belongs to now, by name; `tx` is a unit of work of that account. */
export async function readMemberships(tx: EntityManager, accountId: string): Promise<MembershipView[]> {
  const rows: MembershipRow[] = await tx.query(
    `SELECT s.id AS "schoolId", s.name AS "schoolName", m.roles
       FROM membership m JOIN school s ON s.id = m.school_id
      WHERE m.account_id = $1 AND m.ended_at IS NULL ORDER BY s.name, s.id`,
    [accountId],
  );
  return rows.map((row) => ({ ...row, roles: row.roles.filter(isRole) }));
}
