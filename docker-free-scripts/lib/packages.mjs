// Runs before anything is installed: node's own modules only.
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { inRoot, isRoot, root } from './paths.mjs';
import { PlainError, say } from './say.mjs';

/** Installs the npm packages if they are missing or package-lock.json is not the one they were installed from. */
export function ensurePackages() {
  const [major] = process.versions.node.split('.').map(Number);
  if (major !== 20) throw new PlainError(`Trayward needs Node 20; this is ${process.version}.`);
  const installed = inRoot('node_modules', '.package-lock.json');
  const marker = inRoot('node_modules', '.trayward-installed');
  const lock = createHash('sha256').update(readFileSync(inRoot('package-lock.json'))).digest('hex');
  if (existsSync(marker) && readFileSync(marker, 'utf8') === lock) return;
  if (!existsSync(installed) || !matchesLock(installed)) {
    say('Installing packages (npm ci) …');
    const result = spawnSync('npm', ['ci', '--no-audit', '--no-fund'], { cwd: root, stdio: 'inherit' });
    if (result.status !== 0) throw new PlainError('npm ci failed; its message stands above.');
  }
  writeFileSync(marker, lock);
}

/** Whether a plain `npm install` already brought what the lock file asks for: same packages, same versions. */
function matchesLock(installed) {
  const packagesOf = (file) => JSON.parse(readFileSync(file, 'utf8')).packages;
  const [wanted, present] = [packagesOf(inRoot('package-lock.json')), packagesOf(installed)];
  return Object.entries(wanted).every(([name, entry]) => name === '' || entry.optional || present[name]?.version === entry.version);
}

/**
 * Installs Debian packages for what is missing.
 * @param needs package name → a function that says whether what it brings is there
 */
export function ensureDebian(needs) {
  const missing = Object.entries(needs).filter(([, isThere]) => !isThere()).map(([name]) => name);
  if (missing.length === 0) return;
  const command = `apt-get install -y --no-install-recommends ${missing.join(' ')}`;
  if (!has('apt-get')) throw new PlainError(`Missing: ${missing.join(', ')}. This is no Debian; install them with your system's own means.`);
  if (!isRoot && !has('sudo')) throw new PlainError(`Missing: ${missing.join(', ')}. Ask an administrator to run: ${command}`);
  say(`Installing from Debian: ${missing.join(', ')} …`);
  apt(['update', '-qq']);
  if (apt(['install', '-y', '-qq', '--no-install-recommends', ...missing]) !== 0) throw new PlainError(`Could not install. Try it by hand: ${command}`);
}

function apt(args) {
  const [file, ...rest] = [...(isRoot ? [] : ['sudo']), 'env', 'DEBIAN_FRONTEND=noninteractive', 'apt-get', ...args];
  return spawnSync(file, rest, { stdio: ['inherit', 'ignore', 'inherit'] }).status;
}

export const has = (command) => spawnSync('sh', ['-c', `command -v ${command}`]).status === 0;
