import type { AnyRoute } from './route';
import { NotFound } from './problem';
import { isStorableText } from './text';
import { isUuid } from './uuid';

const maxLength = 200;

/** The names in a path, in order: `/loans/:loanId` gives `['loanId']`. */
export function paramNames(path: string): string[] {
  return [...path.matchAll(/:([A-Za-z]\w*)/g)].map(([, name]) => name ?? '');
}

/**
 * Checked path parameters. An id that is no UUID, or text that could not be stored, names nothing: 404, as for any
 * address that leads nowhere, so that nobody learns from the difference.
 */
export function readParams(declared: Pick<AnyRoute, 'path'>, given: Readonly<Record<string, unknown>>): Record<string, string> {
  const params: Record<string, string> = {};
  for (const name of paramNames(declared.path)) {
    const value = given[name];
    if (typeof value !== 'string' || value.length > maxLength || !isStorableText(value)) throw new NotFound();
    if (name.endsWith('Id') && !isUuid(value)) throw new NotFound();
    params[name] = name.endsWith('Id') ? value.toLowerCase() : value;
  }
  return params;
}
