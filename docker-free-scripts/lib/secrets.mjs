import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { roles } from './database.mjs';
import { PlainError } from './say.mjs';

const newSecret = () => randomBytes(24).toString('base64url');

/** What the demo makes up once and keeps: passwords, secrets and the ports it was lucky with. */
function freshState() {
  return {
    superuserPassword: newSecret(),
    passwords: Object.fromEntries(roles.map((role) => [role, newSecret()])),
    accessTokenSecret: `demo-${newSecret()}`,
    stripeSecretKey: `sk_test_demo_${newSecret()}`,
    stripeWebhookSecret: `whsec_demo_${newSecret()}`,
    ports: {},
  };
}

/** Reads the state kept in `folder` (0600), or makes it. `save(changes)` merges and writes it back in one step. */
export function keptState(folder, name = 'demo.json') {
  const file = path.join(folder, name);
  try {
    mkdirSync(folder, { recursive: true, mode: 0o755 });
    const state = existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : freshState();
    const save = (changes = {}) => {
      Object.assign(state, changes);
      writeFileSync(`${file}.new`, `${JSON.stringify(state, null, 2)}\n`, { mode: 0o600 });
      renameSync(`${file}.new`, file);
    };
    if (!existsSync(file)) save();
    return { state, save };
  } catch (error) {
    if (error.code !== 'EACCES' && error.code !== 'EPERM' && error.code !== 'EROFS') throw error;
    throw new PlainError(`Cannot write in ${folder}. Choose another data folder with TRAYWARD_DATA.`);
  }
}
