import { existsSync } from 'node:fs';
import { homedir, tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { createHash } from 'node:crypto';

export const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..', '..');
export const isRoot = process.getuid?.() === 0;

export const inRoot = (...parts) => path.join(root, ...parts);

/** The command line that runs one of the server's TypeScript entry points. */
export const runTs = (file) => ['-r', inRoot('docker-free-scripts', 'register.cjs'), inRoot(file)];

/**
 * Where the demo keeps its database, photos and generated secrets. Outside the checkout, because PostgreSQL
 * refuses to run as root and the `postgres` user may not enter a checkout in root's home.
 */
export function dataFolder() {
  if (process.env.TRAYWARD_DATA) return path.resolve(process.env.TRAYWARD_DATA);
  return isRoot ? '/var/lib/trayward-demo' : path.join(homedir(), '.local', 'share', 'trayward');
}

/** One test cluster per person and checkout; it holds nothing worth keeping. */
export function testFolder() {
  if (process.env.TRAYWARD_TEST_DATA) return path.resolve(process.env.TRAYWARD_TEST_DATA);
  const key = createHash('sha256').update(root).digest('hex').slice(0, 8);
  const base = isRoot && existsSync('/var/tmp') ? '/var/tmp' : tmpdir();
  return path.join(base, `trayward-test-${process.getuid?.() ?? 'user'}-${key}`);
}
