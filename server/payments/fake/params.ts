import { invalidRequest } from './errors';

/** A decoded form body or query: text leaves, nested by brackets. */
export type Params = Readonly<Record<string, unknown>>;

function missing(param: string): Error {
  return invalidRequest(`Missing required param: ${param}.`, { code: 'parameter_missing', param });
}

/** Refuses a field the operation does not know, as Stripe does; `expand` is common to all. */
export function allowOnly(params: Params, names: readonly string[]): void {
  for (const name of Object.keys(params)) {
    if (name !== 'expand' && !names.includes(name)) {
      throw invalidRequest(`Received unknown parameter: ${name}`, { code: 'parameter_unknown', param: name });
    }
  }
}

/** @returns undefined when absent; an empty text counts as absent (that is how a form unsets a field) */
export function text(params: Params, name: string, param = name): string | undefined {
  const value = params[name];
  if (value === undefined || value === '') return undefined;
  if (typeof value !== 'string') throw invalidRequest(`Invalid string: ${param}`, { param });
  if (value.length > 5000) throw invalidRequest(`Invalid string: ${param}; must be at most 5000 characters`, { param });
  return value;
}

export function requiredText(params: Params, name: string, param = name): string {
  const value = text(params, name, param);
  if (value === undefined) throw missing(param);
  return value;
}

export function integer(params: Params, name: string, param = name): number | undefined {
  const value = text(params, name, param);
  if (value === undefined) return undefined;
  const number = Number(value);
  if (!/^-?\d+$/.test(value) || !Number.isSafeInteger(number)) {
    throw invalidRequest(`Invalid integer: ${value}`, { code: 'parameter_invalid_integer', param });
  }
  return number;
}

/** @throws for a number below 1, as every amount of money must be */
export function positive(params: Params, name: string, param = name): number | undefined {
  const value = integer(params, name, param);
  if (value !== undefined && value < 1) {
    throw invalidRequest('This value must be greater than or equal to 1.', { code: 'parameter_invalid_integer', param });
  }
  return value;
}

export function flag(params: Params, name: string, param = name): boolean | undefined {
  const value = text(params, name, param);
  if (value === undefined) return undefined;
  if (value !== 'true' && value !== 'false') throw invalidRequest(`Invalid boolean: ${value}`, { param });
  return value === 'true';
}

export function oneOf<const T extends string>(params: Params, name: string, allowed: readonly T[], param = name): T | undefined {
  const value = text(params, name, param);
  if (value === undefined) return undefined;
  const found = allowed.find((candidate) => candidate === value);
  if (found === undefined) throw invalidRequest(`Invalid ${param}: must be one of ${allowed.join(', ')}`, { param });
  return found;
}

export function nested(params: Params, name: string, param = name): Params | undefined {
  const value = params[name];
  if (value === undefined || value === '') return undefined;
  if (!isParams(value)) throw invalidRequest(`Invalid object: ${param}`, { param });
  return value;
}

export function list(params: Params, name: string): readonly unknown[] {
  const value = params[name];
  if (value === undefined || value === '') return [];
  if (Array.isArray(value)) return value;
  // A sparse or long list (`items[100]`) is decoded as an object with number keys.
  return isParams(value) ? Object.values(value) : [value];
}

export function isParams(value: unknown): value is Params {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** At most 50 keys of 40 characters with values of 500 (docs.stripe.com/api/metadata); an empty value unsets its key. */
export function metadata(params: Params, before: Readonly<Record<string, string>> = {}, name = 'metadata'): Record<string, string> {
  const given = nested(params, name) ?? {};
  const result = new Map(Object.entries(before));
  for (const [key, value] of Object.entries(given)) {
    if (typeof value !== 'string' || key.length > 40 || value.length > 500) {
      throw invalidRequest(`Invalid metadata: ${key}`, { param: name });
    }
    if (value === '') result.delete(key);
    else result.set(key, value);
  }
  if (result.size > 50) throw invalidRequest('Metadata can hold at most 50 keys.', { param: name });
  return Object.fromEntries(result);
}

export function currency(params: Params, name = 'currency', param = name): string {
  const value = requiredText(params, name, param).toLowerCase();
  if (!/^[a-z]{3}$/.test(value)) throw invalidRequest(`Invalid currency: ${value}`, { param });
  return value;
}
