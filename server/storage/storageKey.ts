import { randomUUID } from 'node:crypto';

const SAFE_KEY = /^[a-z0-9][a-z0-9-]*(\/[a-z0-9][a-z0-9-]*){0,4}(\.[a-z0-9]{2,5})?$/;

/** A key for one new file: `<school>/<kind>/<random>.<ending>`. Nothing in it comes from a person or says what the file shows. */
export function storageKey(schoolId: string, kind: string, ending: string): string {
  const key = `${schoolId.toLowerCase()}/${kind}/${randomUUID()}.${ending}`;
  assertSafeKey(key);
  return key;
}

/** The key of a photo's small version, beside the large one: `….webp` → `…-small.webp`. */
export function thumbnailKey(key: string): string {
  return key.replace(/(\.[a-z0-9]+)$/, '-small$1');
}

/** Keys become paths: letters, digits and dashes only, no dots but the ending's, at most 200 characters. */
export function assertSafeKey(key: string): void {
  if (key.length > 200 || !SAFE_KEY.test(key)) throw new RangeError('not a storage key');
}
