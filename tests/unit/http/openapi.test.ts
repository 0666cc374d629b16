import 'reflect-metadata';
import { openApi } from '@/server/http/openapi';
import { apiPage } from '@/server/http/apiPage';
import { allRoutes } from '@/server/http/routes';

interface Operation {
  summary: string;
  'x-permission': string;
  security: unknown[];
  parameters: { name: string; in: string; required: boolean }[];
}

const document = openApi(allRoutes, 'https://lend.example.org');
const text = JSON.stringify(document);
const paths = document['paths'] as Record<string, Record<string, Operation>>;
const schemas = (document['components'] as { schemas: Record<string, unknown> }).schemas;

describe('the OpenAPI document', () => {
  it('describes every route of the table once, with its permission', () => {
    const operations = Object.values(paths).flatMap((methods) => Object.values(methods));
    expect(operations).toHaveLength(allRoutes.length);
    for (const declared of allRoutes) {
      const operation = paths[declared.path.replaceAll(/:(\w+)/g, '{$1}')]?.[declared.method];
      expect(operation).toMatchObject({ summary: declared.summary, 'x-permission': declared.permission });
      expect(operation?.security).toHaveLength(declared.permission === 'public' ? 0 : 1);
      const key = operation?.parameters.find((parameter) => parameter.name === 'Idempotency-Key');
      expect(key !== undefined).toBe(declared.idempotent);
    }
  });

  it('refers to no schema that is not there', () => {
    const wanted = [...text.matchAll(/"#\/components\/schemas\/([^"]+)"/g)].map(([, name]) => name ?? '');
    expect(wanted.length).toBeGreaterThan(10);
    expect([...new Set(wanted)].filter((name) => !Object.hasOwn(schemas, name))).toEqual([]);
  });

  it('declares every name of a path as a parameter', () => {
    for (const [path, methods] of Object.entries(paths)) {
      const named = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
      for (const operation of Object.values(methods)) {
        const declared = operation.parameters.filter((parameter) => parameter.in === 'path').map((parameter) => parameter.name);
        expect(declared).toEqual(named);
      }
    }
  });

  it('gives every request class a schema with fields', () => {
    for (const { request } of allRoutes) {
      if (request) expect(schemas[request.name]).toMatchObject({ type: 'object', properties: expect.any(Object) as object });
    }
  });
});

describe('the readable page', () => {
  it('names every route and loads nothing from elsewhere', () => {
    const page = apiPage(allRoutes);
    for (const declared of allRoutes) expect(page).toContain(`${declared.method.toUpperCase()} ${declared.path}</code>`);
    expect(page).not.toMatch(/<script|https?:\/\//);
  });
});
