import { openApi } from '@/server/http/openapi';
import type { AnyRoute, DtoClass } from '@/server/http/route';
import { allRoutes } from '@/server/http/routes';

type Json = Record<string, unknown>;

const document = openApi(allRoutes, 'http://localhost');
const schemas = (document['components'] as { schemas: Record<string, Json> }).schemas;

/** The schema of a request class, as the OpenAPI document gives it. */
export function schemaOf(dto: DtoClass): Json {
  return schemas[dto.name] ?? {};
}

export function propertiesOf(dto: DtoClass): Record<string, Json> {
  return (schemaOf(dto)['properties'] ?? {}) as Record<string, Json>;
}

/** Values that satisfy the patterns the DTOs use. */
const patterned = ['17:00', 'A', 'Q1', '8x6', 'EUR', '2026-12-01', '6e5c2d56-35f6-4b5c-9f0e-0f5ba1a9f5a1'];
/** Fields whose rule is code rather than a schema. */
const byName: Record<string, unknown> = { timeZone: 'Europe/Dublin', currency: 'EUR', email: 'somebody@example.test', species: 'topaz', colour: 'blue', password: 'a good password' };

/**
 * A body that is likely to pass a route's validation, made from its schema; names in `known` (ids of rows) win.
 * With it a request reaches the service instead of ending at the first missing field.
 */
export function sampleBody({ request }: Pick<AnyRoute, 'request'>, known: Readonly<Record<string, unknown>>): unknown {
  return request ? sample(schemaOf(request), '', known, 0) : undefined;
}

function sample(schema: Json, name: string, known: Readonly<Record<string, unknown>>, depth: number): unknown {
  if (Object.hasOwn(known, name)) return known[name];
  if (typeof schema['$ref'] === 'string') return sample(schemas[schema['$ref'].split('/').at(-1) ?? ''] ?? {}, name, known, depth + 1);
  if (Array.isArray(schema['enum'])) return schema['enum'][0];
  if (Array.isArray(schema['anyOf']) || Array.isArray(schema['oneOf'])) return sample(((schema['anyOf'] ?? schema['oneOf']) as Json[])[0] ?? {}, name, known, depth + 1);
  if (Object.hasOwn(byName, name)) return byName[name];
  if (depth > 6) return null;
  switch (schema['type']) {
    case 'object':
      return Object.fromEntries(Object.entries((schema['properties'] ?? {}) as Record<string, Json>).map(([key, part]) => [key, sample(part, key, known, depth + 1)]));
    case 'array':
      return [sample((schema['items'] ?? {}) as Json, '', known, depth + 1)];
    case 'integer':
    case 'number':
      return schema['minimum'] ?? 1;
    case 'boolean':
      return true;
    case 'string':
      return text(schema);
    default:
      return 'text';
  }
}

function text(schema: Json): string {
  const { pattern, format, minLength } = schema;
  if (format === 'uuid') return '6e5c2d56-35f6-4b5c-9f0e-0f5ba1a9f5a1';
  if (typeof pattern === 'string') {
    const found = patterned.find((value) => new RegExp(pattern.replace(/^\/|\/[a-z]*$/g, '')).test(value));
    if (found !== undefined) return found;
  }
  return 'text'.padEnd(typeof minLength === 'number' ? minLength : 0, 'x');
}
