import { installQueue } from '@/server/jobs/install';
import { makeDataSource } from './data-source';

export interface MigrateOptions {
  readonly ownerUrl: string;
  readonly queueUrl: string;
}

/** Brings the database to the newest schema: our migrations as the owner, the queue's own as the queue role. Safe to repeat. */
export async function migrate(options: MigrateOptions): Promise<void> {
  const dataSource = makeDataSource({ url: options.ownerUrl, poolSize: 2, applicationName: 'trayward-migrate' });
  await dataSource.initialize();
  try {
    await dataSource.runMigrations({ transaction: 'each' });
  } finally {
    await dataSource.destroy();
  }
  await installQueue(options.queueUrl);
}

function required(name: string): string {
  const value = process.env[name];
  if (!value) throw new Error(`${name} is not set: it must hold the PostgreSQL address for migrations.`);
  return value;
}

if (require.main === module) {
  migrate({ ownerUrl: required('DATABASE_OWNER_URL'), queueUrl: required('DATABASE_QUEUE_URL') }).catch((error: unknown) => {
    process.stderr.write(`Migration failed: ${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = 1;
  });
}
