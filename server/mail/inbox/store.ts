import { randomUUID } from 'node:crypto';
import { mkdir, readdir, readFile, rename, rm, writeFile } from 'node:fs/promises';
import path from 'node:path';

export interface InboxMessage {
  readonly id: string;
  /** ISO 8601, UTC. */
  readonly receivedAt: string;
  readonly messageId: string;
  readonly from: string;
  /** Addresses of the envelope: who really got it. */
  readonly to: readonly string[];
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

export interface InboxStore {
  add(message: Omit<InboxMessage, 'id'>): Promise<InboxMessage>;
  /** Newest first. */
  all(): readonly InboxMessage[];
  clear(): Promise<void>;
}

const FILE = /^\d{15}-[0-9a-f-]{36}\.json$/;

/** Keeps the newest `limit` messages in memory and, where a folder is given, one file each, so that a restart shows them again. */
export async function openStore({ dir, limit }: { dir: string | undefined; limit: number }): Promise<InboxStore> {
  let messages: InboxMessage[] = dir === undefined ? [] : await readFolder(dir);
  await drop(messages.slice(limit));
  messages = messages.slice(0, limit);

  async function drop(old: readonly InboxMessage[]): Promise<void> {
    if (dir !== undefined) await Promise.all(old.map((message) => rm(path.join(dir, fileName(message)), { force: true })));
  }

  return {
    async add(given) {
      const message = { id: randomUUID(), ...given };
      if (dir !== undefined) await writeWhole(path.join(dir, fileName(message)), JSON.stringify(message));
      messages = [message, ...messages];
      await drop(messages.slice(limit));
      messages = messages.slice(0, limit);
      return message;
    },
    all: () => messages,
    async clear() {
      const old = messages;
      messages = [];
      await drop(old);
    },
  };
}

/** Names sort by time. */
function fileName(message: InboxMessage): string {
  return `${String(Date.parse(message.receivedAt)).padStart(15, '0')}-${message.id}.json`;
}

async function readFolder(dir: string): Promise<InboxMessage[]> {
  await mkdir(dir, { recursive: true, mode: 0o700 });
  const names = (await readdir(dir)).filter((name) => FILE.test(name)).sort().reverse();
  return Promise.all(names.map(async (name) => JSON.parse(await readFile(path.join(dir, name), 'utf8')) as InboxMessage));
}

async function writeWhole(file: string, content: string): Promise<void> {
  const draft = `${file}.part`;
  await writeFile(draft, content, { mode: 0o600 });
  await rename(draft, file);
}
