import { Client } from 'pg';
import { createTestDatabase, type TestDatabase } from '../../support/database';

const databases: TestDatabase[] = [];

async function ask(connectionString: string, sql: string): Promise<unknown[]> {
  const client = new Client({ connectionString });
  await client.connect();
  try {
    return (await client.query<Record<string, unknown>>(sql)).rows;
  } finally {
    await client.end();
  }
}

async function fresh(): Promise<TestDatabase> {
  const database = await createTestDatabase();
  databases.push(database);
  return database;
}

afterAll(() => Promise.all(databases.map((database) => database.drop())));

it('gives each test file a database of its own with the newest schema', async () => {
  const [first, second] = [await fresh(), await fresh()];
  await ask(first.ownerUrl, 'CREATE TABLE mark (id int)');
  expect(await ask(second.ownerUrl, `SELECT to_regclass('mark') AS mark`)).toEqual([{ mark: null }]);
  expect(await ask(first.ownerUrl, 'SELECT count(*) > 0 AS migrated FROM schema_migration')).toEqual([{ migrated: true }]);
});

it('connects each role under its own name, none of them able to pass row-level security', async () => {
  const { appUrl, ownerUrl, queueUrl, readonlyUrl } = await fresh();
  for (const [url, name] of [[appUrl, 'app'], [ownerUrl, 'owner'], [queueUrl, 'queue'], [readonlyUrl, 'readonly']] as const) {
    const [row] = await ask(url, 'SELECT rolname, rolsuper, rolbypassrls FROM pg_roles WHERE rolname = current_user');
    expect(row).toEqual({ rolname: `trayward_${name}`, rolsuper: false, rolbypassrls: false });
  }
});

it('leaves nothing of a database that was dropped', async () => {
  const database = await fresh();
  await database.drop();
  await expect(ask(database.superuserUrl, 'SELECT 1')).rejects.toThrow('does not exist');
});
