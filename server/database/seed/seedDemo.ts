import type { Database } from '@/server/database/data-source';
import { withSchool } from '@/server/database/school';
import { portElleryKits, saltpanKits } from './demoKits';
import { portEllery, saltpan, type DemoSchool } from './demoSchools';
import { seedCatalogue } from './seedCatalogue';
import { seedSchool, type SeededSchool } from './seedSchool';
import type { KitTruth } from './truth';

/**
 * Makes the demo's two schools with people, instruments, kits, records and labels. Whole steps that an earlier start has
 * done are passed over, so that it may run at every start. Schools need the owner role; all else runs as the application.
 */
export async function seedDemo(databases: { owner: Database; app: Database }, now: Date): Promise<void> {
  await seedOne(databases, portEllery, portElleryKits, now);
  await seedOne(databases, saltpan, saltpanKits, now);
}

async function seedOne(databases: { owner: Database; app: Database }, school: DemoSchool, kits: readonly KitTruth[], now: Date): Promise<void> {
  const seeded = await seedSchool(databases.owner, school, now);
  const admin = actorOf(seeded, school, 'admin');
  const reader = actorOf(seeded, school, 'instructor');
  await withSchool(databases.app, admin, (tx) => seedCatalogue(tx, { admin, reader }, kits));
}

function actorOf({ schoolId, accounts }: SeededSchool, school: DemoSchool, role: 'admin' | 'instructor') {
  const person = school.people.find(({ roles }) => roles.includes(role));
  const accountId = accounts.get(person?.email ?? '');
  if (accountId === undefined) throw new Error(`${school.name} has no ${role}.`);
  return { accountId, schoolId };
}
