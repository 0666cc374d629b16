import { mkdtemp, readdir, rm, stat } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { buffer } from 'node:stream/consumers';
import { createFolderStorage } from '@/server/storage/folderStorage';
import { FileNotFound, type StoragePort } from '@/server/storage/storage.port';
import { storageKey, thumbnailKey } from '@/server/storage/storageKey';

let folder: string;
let storage: StoragePort;
const schoolId = '3f0e8a52-6b0c-4a53-9a27-2d0c1a4f6e11';

beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'trayward-storage-'));
  storage = createFolderStorage(folder);
});
afterEach(() => rm(folder, { recursive: true, force: true }));

test('what is put comes back the same, with its type and size', async () => {
  const key = storageKey(schoolId, 'photos', 'webp');
  await storage.put(key, Buffer.from('picture'), 'image/webp');
  const file = await storage.get(key);
  expect({ mime: file.mime, sizeBytes: file.sizeBytes, content: (await buffer(file.stream)).toString() }).toEqual({ mime: 'image/webp', sizeBytes: 7, content: 'picture' });
});

test('the same key again replaces the file whole, and no draft is left', async () => {
  const key = storageKey(schoolId, 'photos', 'webp');
  await Promise.all(Array.from({ length: 20 }, (_, index) => storage.put(key, Buffer.alloc(10_000, index), 'image/webp')));
  const content = await buffer((await storage.get(key)).stream);
  expect(content).toHaveLength(10_000);
  expect(new Set(content).size).toBe(1);
  expect(await readdir(path.dirname(path.join(folder, key)))).toHaveLength(1);
});

test('other users of the machine cannot read the files', async () => {
  const key = storageKey(schoolId, 'photos', 'webp');
  await storage.put(key, Buffer.from('x'), 'image/webp');
  expect((await stat(path.join(folder, key))).mode & 0o077).toBe(0);
});

test('a missing file says so, and deleting it again is no error', async () => {
  const key = storageKey(schoolId, 'photos', 'webp');
  await storage.put(key, Buffer.from('x'), 'image/webp');
  await storage.delete(key);
  await storage.delete(key);
  await expect(storage.get(key)).rejects.toThrow(FileNotFound);
});

test.each(['../outside.webp', '/etc/passwd', 'a/../../b.webp', 'a//b.webp', 'a\\b.webp', 'A/b.webp', 'a/.hidden', '', 'a\0b.webp', `${'a'.repeat(300)}.webp`])(
  'a key that could leave the folder or surprise the file system is refused: %j', async (key) => {
    await expect(storage.put(key, Buffer.from('x'), 'image/webp')).rejects.toThrow(RangeError);
    await expect(storage.get(key)).rejects.toThrow(RangeError);
    await expect(storage.delete(key)).rejects.toThrow(RangeError);
    expect(await readdir(folder)).toEqual([]);
  });

test('a type that its key does not promise is refused, so that it is served as what it is', async () => {
  await expect(storage.put(storageKey(schoolId, 'photos', 'webp'), Buffer.from('x'), 'text/html')).rejects.toThrow(RangeError);
});

test('the small version has its own key beside the large one', () => {
  expect(thumbnailKey('s/photos/abc.webp')).toBe('s/photos/abc-small.webp');
});
