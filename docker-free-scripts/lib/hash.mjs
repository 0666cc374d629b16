import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import path from 'node:path';
import { root } from './paths.mjs';

/** A short hash over names and contents of the given files and folders (relative to the checkout); missing ones count as empty. */
export function hashOf(entries) {
  const hash = createHash('sha256');
  for (const entry of entries) addEntry(hash, entry);
  return hash.digest('hex').slice(0, 12);
}

function addEntry(hash, entry) {
  const file = path.join(root, entry);
  if (!existsSync(file)) return;
  if (statSync(file).isDirectory()) {
    for (const name of readdirSync(file).sort()) addEntry(hash, path.join(entry, name));
  } else {
    hash.update(entry).update('\0').update(readFileSync(file)).update('\0');
  }
}
