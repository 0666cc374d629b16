import { Client, escapeIdentifier, escapeLiteral } from 'pg';

export interface RolePasswords {
  readonly owner: string;
  readonly app: string;
  readonly queue: string;
  readonly readonly: string;
}

/**
 * Makes the four database roles (or renews their passwords) and, where it is missing, the database they use.
 * Needs a role that may create roles and databases; everything after this runs as the four.
 * `trayward_owner` owns the tables; `trayward_app` owns nothing and cannot pass row-level security;
 * `trayward_queue` owns the queue's schema; `trayward_readonly` reads reports.
 */
export async function bootstrap(options: { adminUrl: string; database: string; passwords: RolePasswords }): Promise<void> {
  const client = new Client({ connectionString: options.adminUrl });
  await client.connect();
  try {
    for (const role of ['owner', 'app', 'queue', 'readonly'] as const) await makeRole(client, `trayward_${role}`, options.passwords[role]);
    await makeDatabase(client, options.database);
  } finally {
    await client.end();
  }
}

async function makeRole(client: Client, role: string, password: string): Promise<void> {
  const name = escapeIdentifier(role);
  const { rowCount } = await client.query('SELECT 1 FROM pg_roles WHERE rolname = $1', [role]);
  if (rowCount === 0) await client.query(`CREATE ROLE ${name}`);
  await client.query(
    `ALTER ROLE ${name} LOGIN NOSUPERUSER NOCREATEDB NOCREATEROLE NOBYPASSRLS PASSWORD ${escapeLiteral(password)}`,
  );
}

async function makeDatabase(client: Client, database: string): Promise<void> {
  const name = escapeIdentifier(database);
  const { rowCount } = await client.query('SELECT 1 FROM pg_database WHERE datname = $1', [database]);
  if (rowCount === 0) await client.query(`CREATE DATABASE ${name} OWNER trayward_owner TEMPLATE template0 ENCODING 'UTF8'`);
  await grantOnDatabase(client, database);
}

/** Who may connect and who may make a schema; CREATE DATABASE … TEMPLATE does not copy these, so a clone needs them again. */
export async function grantOnDatabase(client: Client, database: string): Promise<void> {
  const name = escapeIdentifier(database);
  await client.query(`REVOKE ALL ON DATABASE ${name} FROM PUBLIC`);
  await client.query(`GRANT CONNECT ON DATABASE ${name} TO trayward_app, trayward_readonly, trayward_queue`);
  // The queue installs and upgrades its own schema.
  await client.query(`GRANT CREATE ON DATABASE ${name} TO trayward_queue`);
}
