import type { FieldError } from './problem';

/** Limits of any request body: far above what a screen sends, far below what could hurt. */
const maxDepth = 16;
const maxTextLength = 20_000;
const maxValues = 20_000;
const forbiddenKeys = new Set(['__proto__', 'constructor', 'prototype']);

interface Visit {
  value: unknown;
  field: string;
  depth: number;
}

/**
 * The first things in a parsed body or query that no field may hold, whatever its DTO says: NUL characters and lone
 * surrogates (PostgreSQL stores neither), numbers beyond the finite (`1e999` parses as Infinity), nesting deep enough
 * to exhaust the stack, and keys that would reach an object's prototype. Walks with a list, not by recursion.
 */
export function unstorableValues(root: unknown): FieldError[] {
  const errors: FieldError[] = [];
  const waiting: Visit[] = [{ value: root, field: '', depth: 0 }];
  let seen = 0;
  for (let visit = waiting.pop(); visit !== undefined && errors.length < 10; visit = waiting.pop()) {
    seen += 1;
    if (seen > maxValues) return [{ field: '', message: 'Holds too many values. Send less at once.' }];
    const message = refusal(visit);
    if (message !== undefined) errors.push({ field: visit.field, message });
    else waiting.push(...children(visit));
  }
  return errors;
}

function refusal({ value, depth }: Visit): string | undefined {
  if (depth > maxDepth) return 'Is nested too deeply.';
  if (typeof value === 'string') {
    if (value.length > maxTextLength) return `Must be at most ${maxTextLength} characters.`;
    if (!isStorableText(value)) return 'Holds characters that cannot be stored.';
  }
  if (typeof value === 'number' && !Number.isFinite(value)) return 'Must be a finite number.';
  return undefined;
}

function children({ value, field, depth }: Visit): Visit[] {
  if (typeof value !== 'object' || value === null) return [];
  if (Array.isArray(value)) {
    return value.slice(0, maxValues).map((item: unknown, index) => ({ value: item, field: `${field}[${index}]`, depth: depth + 1 }));
  }
  return Object.entries(value).map(([key, item]: [string, unknown]) => ({
    value: forbiddenKeys.has(key) || !isStorableText(key) ? Number.NaN : item,
    field: field === '' ? key : `${field}.${key}`,
    depth: depth + 1,
  }));
}

/** False for text with a NUL or half a surrogate pair. */
export function isStorableText(text: string): boolean {
  return !text.includes('\0') && text.isWellFormed();
}
