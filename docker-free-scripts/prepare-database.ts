// Called by lib/database.mjs with its settings as JSON on standard input: makes roles and database, then migrates.
import { readFileSync } from 'node:fs';
import { bootstrap, type RolePasswords } from '@/server/database/bootstrap';
import { migrate } from '@/server/database/migrate';

interface Input {
  adminUrl: string;
  database: string;
  passwords: RolePasswords;
  ownerUrl: string;
  queueUrl: string;
}

async function prepare(): Promise<void> {
  const input = JSON.parse(readFileSync(0, 'utf8')) as Input;
  await bootstrap(input);
  await migrate(input);
}

prepare().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`);
  process.exitCode = 1;
});
