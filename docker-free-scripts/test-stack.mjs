// One whole stack for a test, on free ports, driven through the channel to the test that forked it (tests/support/e2e/stack.ts):
// it answers { environment } when all is healthy, kills or starts a process when told, and stops everything when the test is gone.
import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { children } from './lib/children.mjs';
import { freePort } from './lib/ports.mjs';
import { keptState } from './lib/secrets.mjs';
import { helperProcesses, launch, mainProcesses, stackEnvironment, untilReady } from './lib/stack.mjs';
import { ensureWebExport } from './lib/webExport.mjs';

const { folder, database, postgresPort, passwords, web, extra } = JSON.parse(process.argv[2]);
const processes = children({ logFolder: path.join(folder, 'logs') });

let stopping;
/** Once, whoever asks first: a signal, the test's end or a failure. */
const stop = (code) => (stopping ??= processes.stop().finally(() => process.exit(code)));
for (const event of ['SIGINT', 'SIGTERM', 'disconnect']) process.on(event, () => stop(0));

async function prepare() {
  const ports = { postgres: postgresPort };
  for (const name of ['web', 'paymentFake', 'smtp', 'inbox']) ports[name] = await freePort();
  mkdirSync(path.join(folder, 'files'), { recursive: true });
  const state = { ...keptState(folder, 'stack.json').state, passwords };
  const webFolder = web ? await ensureWebExport() : '';
  return { ...stackEnvironment({ mode: 'test', state, ports, folder, webFolder, database }), ...extra };
}

async function obey({ kill, start }, environment) {
  if (kill) await processes.kill(kill);
  if (!start) return;
  launch({ processes, environment, names: [start] });
  await untilReady({ processes, environment });
}

try {
  const environment = await prepare();
  launch({ processes, environment, names: [...helperProcesses, ...mainProcesses] });
  await untilReady({ processes, environment });
  // One command after the other, in the order they came.
  let last = Promise.resolve();
  process.on('message', ({ id, ...command }) => {
    last = last.then(() => obey(command, environment)).then(() => process.send({ id }), (error) => process.send({ id, error: error.message }));
  });
  process.send({ environment });
} catch (error) {
  process.send({ error: error.message });
  await stop(1);
}
