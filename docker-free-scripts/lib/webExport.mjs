import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, readdirSync, renameSync, rmSync, statSync } from 'node:fs';
import path from 'node:path';
import { hashOf } from './hash.mjs';
import { inRoot, root } from './paths.mjs';
import { PlainError, say } from './say.mjs';

const sources = ['app', 'components', 'shared', 'assets', 'public', 'package-lock.json', 'app.json', 'babel.config.js', 'metro.config.js', 'tsconfig.json'];
const exportsKept = 3;

/** The exported web app of the sources as they stand; exported only if that has not been done. Returns its folder; `signal` breaks it off. */
export async function ensureWebExport({ signal } = {}) {
  const cache = inRoot('.trayward', 'web');
  const folder = path.join(cache, hashOf(sources));
  if (existsSync(folder)) return folder;
  say('Exporting the web app (about half a minute) …');
  mkdirSync(cache, { recursive: true });
  const fresh = path.join(cache, `new-${process.pid}`);
  await exportWeb(fresh, { signal });
  // Two runs may export at once; the second finds the place taken by the same files.
  if (existsSync(folder)) rmSync(fresh, { recursive: true });
  else renameSync(fresh, folder);
  dropOld(cache, folder);
  return folder;
}

/** Exports the web app for production into `folder`. Its messages are shown only when it fails. */
export function exportWeb(folder, { signal } = {}) {
  return new Promise((resolve, reject) => {
    let output = '';
    const child = spawn(inRoot('node_modules', '.bin', 'expo'), ['export', '-p', 'web', '--max-workers', '2', '--output-dir', folder], {
      cwd: root, stdio: ['ignore', 'pipe', 'pipe'], signal,
      env: { ...process.env, EXPO_OFFLINE: '1', EXPO_NO_TELEMETRY: '1', CI: '1', NODE_ENV: 'production' },
    });
    child.stdout.on('data', (chunk) => { output += chunk; });
    child.stderr.on('data', (chunk) => { output += chunk; });
    child.once('error', reject);
    child.once('exit', (code) => {
      if (code === 0) return resolve();
      rmSync(folder, { recursive: true, force: true });
      reject(new PlainError(`The web app could not be exported:\n${output.trimEnd().split('\n').slice(-40).join('\n')}`));
    });
  });
}

function dropOld(cache, current) {
  const folders = readdirSync(cache).map((name) => path.join(cache, name)).filter((folder) => folder !== current);
  const byAge = folders.sort((a, b) => statSync(b).mtimeMs - statSync(a).mtimeMs);
  for (const folder of byAge.slice(exportsKept - 1)) rmSync(folder, { recursive: true, force: true });
}
