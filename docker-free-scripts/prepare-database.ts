// Called by lib/database.mjs with its settings as JSON on standard input: makes roles and database, migrates, and seeds the
// demo where asked. One process for all three, because each start of one costs more than the work of a second start.
import { readFileSync } from 'node:fs';
import { bootstrap, type RolePasswords } from '@/server/database/bootstrap';
import { openDatabase } from '@/server/database/data-source';
import { migrate } from '@/server/database/migrate';

interface Input {
  adminUrl: string;
  database: string;
  passwords: RolePasswords;
  ownerUrl: string;
  appUrl: string;
  queueUrl: string;
  seed: boolean;
}

async function prepare(): Promise<void> {
  const input = JSON.parse(readFileSync(0, 'utf8')) as Input;
  await bootstrap(input);
  await migrate(input);
  if (input.seed) await seed(input);
}

async function seed({ ownerUrl, appUrl }: Input): Promise<void> {
  const { seedDemo } = await import('@/server/database/seed/seedDemo');
  const owner = await openDatabase({ url: ownerUrl, poolSize: 1, applicationName: 'trayward-seed-owner' });
  const app = await openDatabase({ url: appUrl, poolSize: 1, applicationName: 'trayward-seed' });
  try {
    await seedDemo({ owner, app }, new Date());
  } finally {
    await Promise.all([owner.close(), app.close()]);
  }
}

prepare().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`);
  process.exitCode = 1;
});
