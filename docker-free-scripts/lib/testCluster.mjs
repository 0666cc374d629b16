import { existsSync, mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { asSuperuser, prepareDatabase } from './database.mjs';
import { hashOf } from './hash.mjs';
import { keepOrChoosePort } from './ports.mjs';
import { cluster } from './postgres.mjs';
import { keptState } from './secrets.mjs';

// Nothing here must survive a power cut, so the disk is never waited for. Autovacuum would connect to a template at the
// very moment it is cloned; a test that needs statistics runs ANALYZE itself.
const settings = { fsync: 'off', synchronous_commit: 'off', full_page_writes: 'off', autovacuum: 'off', max_connections: 300 };

/** What a template's contents depend on: change any of it and the next run builds a new one. */
const templateSources = {
  migrated: ['server/database', 'package-lock.json', '.swcrc'],
  seeded: ['server', 'shared', 'package-lock.json', '.swcrc'],
};

/** Starts the cluster, registers `user` (a process id) and sees to the template of this kind. Returns what tests need to connect. */
export async function up(folder, user, kind = 'migrated') {
  const { state, save } = keptState(folder, 'cluster.json');
  const server = clusterIn(folder, state);
  const port = server.runningPort() ?? server.ensure(await keepOrChoosePort(state.ports.postgres));
  save({ ports: { postgres: port } });
  register(folder, user);
  const access = { port, superuserPassword: state.superuserPassword, passwords: state.passwords, folder };
  await dropLeftovers(access);
  const templates = { migrated: await ensureTemplate(access, 'migrated') };
  if (kind === 'seeded') templates.seeded = await ensureTemplate(access, 'seeded', templates.migrated);
  return { ...access, user, templates, seededFiles: filesOf(folder, templates.seeded) };
}

/** Takes `user` off the list; with nobody left the server stops (its files stay, so that the next run starts fast). */
export async function down(folder, user) {
  rmSync(userFile(folder, user), { force: true });
  if (liveUsers(folder).length > 0) return;
  const { state } = keptState(folder, 'cluster.json');
  clusterIn(folder, state).stop({ mode: 'fast' });
}

const clusterIn = (folder, state) =>
  cluster({ folder: path.join(folder, 'postgres'), superuserPassword: state.superuserPassword, settings });

const userFile = (folder, user) => path.join(folder, 'users', String(user));

function register(folder, user) {
  mkdirSync(path.join(folder, 'users'), { recursive: true });
  writeFileSync(userFile(folder, user), '');
}

function liveUsers(folder) {
  const users = existsSync(path.join(folder, 'users')) ? readdirSync(path.join(folder, 'users')) : [];
  return users.filter((user) => {
    if (isAlive(Number(user))) return true;
    rmSync(userFile(folder, user), { force: true });
    return false;
  });
}

function isAlive(pid) {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error.code === 'EPERM';
  }
}

/** Kept although their sources changed: a test run that started earlier may still be cloning from one. */
const templatesKept = 6;

/** Databases are named test_<pid>_…; those of dead test runs, and the oldest templates, only take up room. */
async function dropLeftovers({ port, superuserPassword }) {
  await asSuperuser({ port, password: superuserPassword }, async (client) => {
    const { rows } = await client.query(
      `SELECT datname FROM pg_database WHERE datname ~ '^(test_[0-9]+_|template_(migrated|seeded)_)' ORDER BY oid DESC`);
    const names = rows.map((row) => row.datname);
    const templates = (kind) => names.filter((name) => name.startsWith(`template_${kind}_`)).slice(templatesKept);
    const orphans = names.filter((name) => name.startsWith('test_') && !isAlive(Number(name.split('_')[1])));
    for (const name of [...orphans, ...templates('migrated'), ...templates('seeded')]) {
      await client.query(`DROP DATABASE IF EXISTS ${client.escapeIdentifier(name)} WITH (FORCE)`);
    }
  });
}

/** The photos that belong to a seeded template; a stack that clones the database copies them. */
const filesOf = (folder, template) => (template ? path.join(folder, 'files', template) : undefined);

const templateName = (kind) => `template_${kind}_${hashOf(templateSources[kind])}`;

/** A template is built under a passing name and renamed when done, so that a broken build is never cloned. */
async function ensureTemplate({ port, superuserPassword, passwords, folder }, kind, base) {
  const name = templateName(kind);
  const access = { port, password: superuserPassword };
  const exists = await asSuperuser(access, async (client) =>
    (await client.query('SELECT 1 FROM pg_database WHERE datname = $1', [name])).rowCount);
  if (exists) return name;

  const building = `building_${kind}`;
  await asSuperuser(access, async (client) => {
    await client.query(`DROP DATABASE IF EXISTS ${building} WITH (FORCE)`);
    if (base) await client.query(`CREATE DATABASE ${building} OWNER trayward_owner TEMPLATE ${client.escapeIdentifier(base)}`);
  });
  mkdirSync(filesOf(folder, name), { recursive: true });
  await prepareDatabase({ port, superuserPassword, passwords, database: building, seed: kind === 'seeded', files: filesOf(folder, name) });
  await asSuperuser(access, async (client) => {
    await client.query('SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE datname = $1', [building]);
    await client.query(`ALTER DATABASE ${building} RENAME TO ${client.escapeIdentifier(name)}`);
  });
  return name;
}
