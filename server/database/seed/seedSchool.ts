import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { Database } from '@/server/database/data-source';
import { withSystem } from '@/server/database/school';
import { createSchool } from '@/server/features/school/createSchool';
import { hashPassword } from '@/server/features/sessions/passwords';
import type { DemoPerson } from './demoPeople';
import { demoPassword } from './demoPeople';
import type { DemoSchool } from './demoSchools';

export interface SeededSchool {
  readonly schoolId: string;
  /** Account ids by e-mail address. */
  readonly accounts: ReadonlyMap<string, string>;
}

/** Makes a demo school with its people as the owner role, or finds what an earlier, broken-off start has made of it. */
export async function seedSchool(ownerDb: Database, school: DemoSchool, now: Date): Promise<SeededSchool> {
  const [admin, ...others] = school.people;
  if (admin === undefined) throw new Error(`${school.name} has no people.`);
  const known = await withSystem(ownerDb, (tx) => tx.query<{ id: string }[]>('SELECT id FROM school WHERE name = $1', [school.name]));
  const schoolId = known[0]?.id ?? (await make(ownerDb, school, admin, now));
  return withSystem(ownerDb, async (tx) => {
    for (const person of others) await join(tx, schoolId, person);
    const rows = await tx.query<{ id: string; email: string }[]>('SELECT id, email FROM account WHERE email = ANY ($1)', [school.people.map(({ email }) => email)]);
    return { schoolId, accounts: new Map(rows.map(({ id, email }) => [email, id])) };
  });
}

async function make(ownerDb: Database, school: DemoSchool, admin: DemoPerson, now: Date): Promise<string> {
  const { name, timeZone, currency, terms } = school;
  const about = { name, timeZone, currency, terms, adminEmail: admin.email, adminName: admin.name, adminPassword: demoPassword };
  const { schoolId, accountId } = await createSchool(ownerDb, about, now);
  await withSystem(ownerDb, async (tx) => {
    await tx.query('UPDATE school SET closing_time = $2, loan_days = $3, deposit_rule = $4 WHERE id = $1',
      [schoolId, school.closingTime, school.loanDays, JSON.stringify(school.depositRule)]);
    await tx.query('UPDATE membership SET roles = $3 WHERE school_id = $1 AND account_id = $2', [schoolId, accountId, admin.roles]);
  });
  return schoolId;
}

async function join(tx: EntityManager, schoolId: string, person: DemoPerson): Promise<void> {
  const known = await tx.query<{ id: string }[]>('SELECT id FROM account WHERE email = $1', [person.email]);
  const accountId = known[0]?.id ?? randomUUID();
  if (known.length === 0) {
    await tx.query('INSERT INTO account (id, email, name, password_hash) VALUES ($1, $2, $3, $4)',
      [accountId, person.email, person.name, await hashPassword(demoPassword)]);
  }
  await tx.query('INSERT INTO membership (school_id, account_id, roles) VALUES ($1, $2, $3) ON CONFLICT DO NOTHING', [schoolId, accountId, person.roles]);
}
