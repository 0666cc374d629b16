import { defaultMetadataStorage } from 'class-transformer/cjs/storage';
import { validationMetadatasToSchemas } from 'class-validator-jsonschema';
import { permissions } from '@shared/permissions';
import { paramNames } from './pathParams';
import responses from './responses.schema.json';
import { operationOf, type AnyRoute, type DtoClass, type ResponseOf } from './route';

type Json = Record<string, unknown>;

const prefix = '#/components/schemas/';
const responseSchemas: Record<string, Json> = responses;

/**
 * The OpenAPI 3.1 document of a route table. Requests come from the DTO classes that validate them, responses from the
 * interfaces of `shared/api`, so neither can drift from what the server does.
 */
export function openApi(routes: readonly AnyRoute[], publicUrl: string): Json {
  // The published types want the storage's class; the package hands over its one instance.
  const requests = validationMetadatasToSchemas({ refPointerPrefix: prefix, classTransformerMetadataStorage: defaultMetadataStorage });
  const paths: Record<string, Json> = {};
  for (const declared of routes) {
    const path = declared.path.replaceAll(/:(\w+)/g, '{$1}');
    paths[path] = { ...paths[path], [declared.method]: operation(declared, requests) };
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Trayward', version: '1', description: 'Lends kits of reference stones and proves what came back. Times are ISO 8601 in UTC, money is whole minor units.' },
    servers: [{ url: `${publicUrl}/api/v1` }],
    paths,
    components: {
      schemas: { ...requests, ...responseSchemas },
      securitySchemes: { accessToken: { type: 'http', scheme: 'bearer', bearerFormat: 'JWT' } },
    },
  };
}

function operation(declared: AnyRoute, requests: Record<string, unknown>): Json {
  const { permission, summary } = declared;
  const holders = permission === 'public' || permission === 'signed-in' ? permission : permissions[permission].join(', ');
  const body = requestBody(declared);
  return {
    summary,
    operationId: operationOf(declared),
    tags: [declared.path.split('/')[1] ?? ''],
    description: `Permission: ${permission} (${holders}).`,
    'x-permission': permission,
    security: permission === 'public' ? [] : [{ accessToken: [] }],
    parameters: [...pathParameters(declared), ...headerParameters(declared), ...queryParameters(declared.query, requests)],
    ...(body ? { requestBody: body } : {}),
    responses: { [declared.status]: answer(declared.response), default: problem },
  };
}

const problem = {
  description: 'A problem document',
  content: { 'application/problem+json': { schema: { $ref: `${prefix}ProblemDocument` } } },
};

function pathParameters(declared: AnyRoute): Json[] {
  return paramNames(declared.path).map((name) => ({
    name, in: 'path', required: true, schema: name.endsWith('Id') ? { type: 'string', format: 'uuid' } : { type: 'string', maxLength: 200 },
  }));
}

function headerParameters({ permission, idempotent }: AnyRoute): Json[] {
  const school = { name: 'X-School', in: 'header', required: false, schema: { type: 'string', format: 'uuid' }, description: 'The current school; not needed by an account of one school.' };
  const key = { name: 'Idempotency-Key', in: 'header', required: true, schema: { type: 'string', minLength: 1, maxLength: 255 }, description: 'New for each thing done, the same for each retry.' };
  const inSchool = permission !== 'public' && permission !== 'signed-in';
  return [...(inSchool ? [school] : []), ...(idempotent ? [key] : [])];
}

function queryParameters(query: DtoClass | undefined, requests: Record<string, unknown>): Json[] {
  const schema = query ? requests[query.name] : undefined;
  if (!isJson(schema) || !isJson(schema['properties'])) return [];
  const required: unknown = schema['required'];
  return Object.entries(schema['properties']).map(([name, property]) => ({
    name, in: 'query', required: Array.isArray(required) && required.includes(name), schema: property,
  }));
}

function requestBody(declared: AnyRoute): Json | undefined {
  const fields: Json = declared.request ? { $ref: `${prefix}${declared.request.name}` } : {};
  if (declared.rawBody) return { required: true, content: { 'application/json': { schema: {} } } };
  if (declared.files) {
    const upload = { type: 'object', properties: { [declared.files.field]: { type: 'string', contentMediaType: 'application/octet-stream' } } };
    return { required: true, content: { 'multipart/form-data': { schema: { allOf: [upload, fields] } } } };
  }
  return declared.request ? { required: true, content: { 'application/json': { schema: fields } } } : undefined;
}

function answer({ kind, name }: ResponseOf<unknown>): Json {
  if (kind === 'nothing') return { description: 'Done' };
  if (kind === 'file') return { description: 'A file', content: { [name]: { schema: { type: 'string', contentMediaType: name } } } };
  return { description: name, content: { 'application/json': { schema: named(name) } } };
}

/** `LoanView`, `LoanView[]` or `Page<LoanView>`. */
function named(name: string): Json {
  const page = /^Page<(\w+)>$/.exec(name)?.[1];
  if (page !== undefined) {
    const nextCursor = { anyOf: [{ type: 'string' }, { type: 'null' }] };
    return { type: 'object', properties: { items: { type: 'array', items: named(page) }, nextCursor }, required: ['items', 'nextCursor'] };
  }
  if (name.endsWith('[]')) return { type: 'array', items: named(name.slice(0, -2)) };
  if (!Object.hasOwn(responseSchemas, name)) throw new Error(`No schema for ${name}: export it from shared/api and write the response schemas anew`);
  return { $ref: `${prefix}${name}` };
}

function isJson(value: unknown): value is Json {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
