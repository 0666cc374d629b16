// npm run demo:reset: throws the demo's data away; the next npm start seeds it anew.
import { existsSync, rmSync } from 'node:fs';
import path from 'node:path';
import { dataFolder } from './lib/paths.mjs';
import { PlainError, runScript, say } from './lib/say.mjs';

await runScript(async () => {
  const folder = dataFolder();
  if (!existsSync(folder)) return say(`There is no demo in ${folder}; npm start makes one.`);
  // Only a folder that the demo itself made: TRAYWARD_DATA may have been mistyped.
  if (!existsSync(path.join(folder, 'demo.json'))) throw new PlainError(`${folder} holds no Trayward demo; nothing was deleted.`);
  const { clusterOf, occupyFolder } = await import('./lib/demo.mjs');
  const { keptState } = await import('./lib/secrets.mjs');
  const leave = occupyFolder(folder);
  clusterOf(folder, keptState(folder).state).stop({ mode: 'immediate' });
  for (const name of ['postgres', 'files', 'logs', 'payment-fake.json', 'demo.json']) rmSync(path.join(folder, name), { recursive: true, force: true });
  leave();
  say('The demo is gone. npm start makes a new one.');
});
