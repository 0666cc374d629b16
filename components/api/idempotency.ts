import { isTransient } from './problem';

/**
 * Keys of writes that a phone may have to repeat. The key is stored before the first attempt and used again until a
 * final answer has come, over reloads too, so that one intent never becomes two loans.
 */
export interface PendingKey {
  key: string;
  /** Hash of what was sent: other content is another intent and takes another key. */
  content: string;
}

const prefix = 'trayward.pending.';

/** The key for this operation and content: the stored one if it is the same intent, else a new one, stored at once. */
export function claimKey(operation: string, variables: unknown): string {
  const content = hashText(stableText(variables));
  const stored = read(operation);
  if (stored?.content === content) return stored.key;
  const key = crypto.randomUUID();
  write(operation, { key, content });
  return key;
}

/** Forgets the key once the answer is final. After no answer, or one that asks to try again, the key stays. */
export function settleKey(operation: string, error?: unknown): void {
  if (error !== undefined && isTransient(error)) return;
  memory.delete(operation);
  try {
    localStorage.removeItem(prefix + operation);
  } catch {
    // Storage is closed; the copy in memory is gone.
  }
}

/** Where storage is closed, keys last for this visit. */
const memory = new Map<string, PendingKey>();

function read(operation: string): PendingKey | undefined {
  try {
    const text = localStorage.getItem(prefix + operation);
    if (text) return JSON.parse(text) as PendingKey;
  } catch {
    // Fall through to memory.
  }
  return memory.get(operation);
}

function write(operation: string, pending: PendingKey): void {
  memory.set(operation, pending);
  try {
    localStorage.setItem(prefix + operation, JSON.stringify(pending));
  } catch {
    // Kept in memory.
  }
}

/** JSON with sorted keys; files by their name, size and time. */
function stableText(value: unknown): string {
  if (typeof File !== 'undefined' && value instanceof File) return `file:${value.name}:${value.size}:${value.lastModified}`;
  if (typeof FormData !== 'undefined' && value instanceof FormData) {
    const parts: unknown[] = [];
    value.forEach((part, name) => parts.push([name, part]));
    return stableText(parts);
  }
  if (Array.isArray(value)) return `[${value.map(stableText).join(',')}]`;
  if (value !== null && typeof value === 'object') {
    const entries = Object.entries(value).sort(([left], [right]) => (left < right ? -1 : 1));
    return `{${entries.map(([key, inner]) => `${JSON.stringify(key)}:${stableText(inner)}`).join(',')}}`;
  }
  return value === undefined ? 'undefined' : JSON.stringify(value);
}

/** FNV-1a over two seeds, 64 bits in hexadecimal: tells contents apart without storing them. */
function hashText(text: string): string {
  return [0x811c9dc5, 0x01000193].map((seed) => fnv(text, seed)).join('');
}

function fnv(text: string, seed: number): string {
  let hash = seed;
  for (let index = 0; index < text.length; index++) hash = Math.imul(hash ^ text.charCodeAt(index), 0x01000193);
  return (hash >>> 0).toString(16).padStart(8, '0');
}
