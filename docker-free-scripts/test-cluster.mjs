// The database cluster of the tests. Called by tests/support (and by hand, to look into a database):
//
//   node docker-free-scripts/test-cluster.mjs up <pid> [migrated|seeded]   starts it if need be, prepares the template, prints JSON
//   node docker-free-scripts/test-cluster.mjs down <pid>                   stops it when no other test run uses it any more
//
// Test runs of one checkout share the cluster: each registers its pid, the last one to leave stops the server.
import { spawnSync } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { testFolder } from './lib/paths.mjs';
import { PlainError, runScript } from './lib/say.mjs';

/** Runs this very command again under a lock, so that two test runs never prepare or stop the cluster at once. */
function again(folder) {
  const lock = path.join(folder, 'lock');
  // -o: the lock is flock's alone; inherited by the postmaster it would never be let go.
  const result = spawnSync('flock', ['-o', lock, process.execPath, fileURLToPath(import.meta.url), ...process.argv.slice(2)],
    { stdio: 'inherit', env: { ...process.env, TRAYWARD_TEST_LOCK: lock } });
  process.exit(result.status ?? 1);
}

await runScript(async () => {
  const [action, user, kind] = process.argv.slice(2);
  const folder = testFolder();
  mkdirSync(folder, { recursive: true, mode: 0o755 });
  if (process.env.TRAYWARD_TEST_LOCK !== path.join(folder, 'lock')) again(folder);
  const { up, down } = await import('./lib/testCluster.mjs');
  if (action === 'up') process.stdout.write(`${JSON.stringify(await up(folder, Number(user), kind))}\n`);
  else if (action === 'down') await down(folder, Number(user));
  else throw new PlainError('Say up or down, and the process id of who needs the cluster.');
});
