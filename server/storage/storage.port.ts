import type { Readable } from 'node:stream';

/** Keeps files: photos today. Keys are made by `storageKey` and never by a person. */
export interface StoragePort {
  /** Stores the whole file or nothing. The same key again replaces the file. */
  put(key: string, content: Buffer, mime: string): Promise<void>;
  /** @throws FileNotFound */
  get(key: string): Promise<StoredFile>;
  /** Does nothing when there is no such file. */
  delete(key: string): Promise<void>;
}

export interface StoredFile {
  readonly stream: Readable;
  readonly mime: string;
  readonly sizeBytes: number;
}

export class FileNotFound extends Error {
  override readonly name = 'FileNotFound';
}
