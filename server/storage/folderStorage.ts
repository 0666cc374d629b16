import { randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { mkdir, open, rename, rm, stat } from 'node:fs/promises';
import path from 'node:path';
import { FileNotFound, type StoragePort } from './storage.port';
import { assertSafeKey } from './storageKey';

const mimeOfEnding: Readonly<Record<string, string>> = { webp: 'image/webp', jpg: 'image/jpeg', png: 'image/png', pdf: 'application/pdf' };

/** Keeps files under one folder, readable by the server's own user only. The media type follows from the key's ending. */
export function createFolderStorage(folder: string): StoragePort {
  const root = path.resolve(folder);
  const place = (key: string): string => {
    assertSafeKey(key);
    return path.join(root, ...key.split('/'));
  };
  return {
    async put(key, content, mime) {
      if (mimeOf(key) !== mime) throw new RangeError(`a ${mime} file needs a key that ends so`);
      await writeWhole(place(key), content);
    },
    async get(key) {
      const file = place(key);
      const { size } = await stat(file).catch(notFound(key));
      return { stream: createReadStream(file), mime: mimeOf(key), sizeBytes: size };
    },
    async delete(key) {
      await rm(place(key), { force: true });
    },
  };
}

/** Written beside its place, flushed and renamed, so that no reader and no power cut ever sees half a file. */
async function writeWhole(file: string, content: Buffer): Promise<void> {
  await mkdir(path.dirname(file), { recursive: true, mode: 0o700 });
  const draft = `${file}.${randomUUID()}.part`;
  try {
    const handle = await open(draft, 'wx', 0o600);
    try {
      await handle.writeFile(content);
      await handle.sync();
    } finally {
      await handle.close();
    }
    await rename(draft, file);
  } catch (error) {
    await rm(draft, { force: true });
    throw error;
  }
}

function mimeOf(key: string): string {
  return mimeOfEnding[path.extname(key).slice(1)] ?? 'application/octet-stream';
}

function notFound(key: string) {
  return (error: unknown): never => {
    if (typeof error === 'object' && error !== null && 'code' in error && error.code === 'ENOENT') throw new FileNotFound(`no file ${key}`);
    throw error;
  };
}
