// npm run serve: the built product in production, server and worker under one parent that ends when either ends, so that
// whatever supervises it (an init script, a process manager, a shell loop) starts both anew. Each can also be run alone:
//   node dist-server/server/main.js      node dist-server/server/jobs/main.js
import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import { inRoot, root } from './lib/paths.mjs';
import { PlainError, runScript, say } from './lib/say.mjs';

const entries = { server: 'dist-server/server/main.js', worker: 'dist-server/server/jobs/main.js' };
const stopTimeoutMs = 15_000;

await runScript(async () => {
  if (existsSync(inRoot('.env'))) process.loadEnvFile(inRoot('.env'));
  for (const file of [...Object.values(entries), 'dist/index.html']) {
    if (!existsSync(inRoot(file))) throw new PlainError(`${file} is missing. Run npm run build first.`);
  }
  const environment = { WEB_DIR: inRoot('dist'), ...process.env, NODE_ENV: 'production', TRAYWARD_MODE: 'production' };
  const running = Object.entries(entries).map(([name, file]) => start(name, inRoot(file), environment));

  const first = await Promise.race([...running.map(({ ended }) => ended), askedToStop()]);
  if (first.name) say(`The ${first.name} process ended with ${first.code ?? first.signal}; stopping.`);
  for (const { child } of running) child.kill('SIGTERM');
  setTimeout(() => running.forEach(({ child }) => child.kill('SIGKILL')), stopTimeoutMs).unref();
  await Promise.all(running.map(({ ended }) => ended));
  process.exitCode = first.name ? 1 : 0;
  process.exit();
});

function start(name, file, environment) {
  const child = spawn(process.execPath, ['--enable-source-maps', '-r', inRoot('docker-free-scripts', 'exit-with-parent.cjs'), file],
    { cwd: root, env: environment, stdio: ['ignore', 'inherit', 'inherit', 'ipc'], detached: true });
  return { child, ended: new Promise((resolve) => child.once('exit', (code, signal) => resolve({ name, code, signal }))) };
}

function askedToStop() {
  return new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => resolve({}));
  });
}
