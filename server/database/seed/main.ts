import { openDatabase } from '@/server/database/data-source';
import { seedDemo } from './seedDemo';

function required(name: string): string {
  const value = process.env[name];
  if (!value) throw new Error(`${name} is not set: it must hold a PostgreSQL address.`);
  return value;
}

async function main(): Promise<void> {
  const owner = await openDatabase({ url: required('DATABASE_OWNER_URL'), poolSize: 1, applicationName: 'trayward-seed-owner' });
  try {
    const app = await openDatabase({ url: required('DATABASE_URL'), poolSize: 1, applicationName: 'trayward-seed' });
    try {
      await seedDemo({ owner, app }, new Date());
    } finally {
      await app.close();
    }
  } finally {
    await owner.close();
  }
}

main().catch((error: unknown) => {
  process.stderr.write(`The demo could not be seeded: ${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});
