import { readFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { openDatabase } from '@/server/database/data-source';
import { createSchool, type NewSchool } from './createSchool';

const usage = `Makes a school and its first admin. Needs DATABASE_OWNER_URL.

  node -r ./docker-free-scripts/register.cjs server/features/school/create-school.ts \\
    --name "School of Gemmology" --time-zone Europe/Dublin --currency EUR \\
    --admin-email admin@school.example --admin-name "Ada Admin" --terms terms.txt < password.txt

The admin's password is read from TRAYWARD_ADMIN_PASSWORD or, when that is not set, from the first line of standard
input; never from an argument, which other users of the machine could read. An admin who has an account keeps its password.
`;

function readOptions(): NewSchool {
  const { values } = parseArgs({
    options: {
      name: { type: 'string' }, 'time-zone': { type: 'string' }, currency: { type: 'string' },
      'admin-email': { type: 'string' }, 'admin-name': { type: 'string' }, terms: { type: 'string' },
    },
  });
  const needed = (option: 'name' | 'time-zone' | 'currency' | 'admin-email' | 'admin-name' | 'terms'): string => {
    const value = values[option];
    if (value === undefined) throw new Error(`--${option} is missing.\n\n${usage}`);
    return value;
  };
  return {
    name: needed('name'), timeZone: needed('time-zone'), currency: needed('currency'),
    adminEmail: needed('admin-email'), adminName: needed('admin-name'), terms: readFileSync(needed('terms'), 'utf8'),
    adminPassword: process.env['TRAYWARD_ADMIN_PASSWORD'] ?? readFileSync(0, 'utf8').split('\n', 1)[0]?.trimEnd() ?? '',
  };
}

async function main(): Promise<void> {
  const url = process.env['DATABASE_OWNER_URL'];
  if (!url) throw new Error(`DATABASE_OWNER_URL is not set.\n\n${usage}`);
  const options = readOptions();
  const db = await openDatabase({ url, poolSize: 1, applicationName: 'trayward-create-school' });
  try {
    const { schoolId } = await createSchool(db, options, new Date());
    process.stdout.write(`Made the school ${options.name} (${schoolId}). Its admin signs in as ${options.adminEmail.toLowerCase()}.\n`);
  } finally {
    await db.close();
  }
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});
