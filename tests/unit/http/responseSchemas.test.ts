import { readFileSync } from 'node:fs';
import path from 'node:path';
import { responseSchemas } from '@/server/http/responseSchemas';
import { asText } from '@/server/http/writeResponseSchemas';

const root = path.resolve(__dirname, '..', '..', '..');
const schemas = responseSchemas(root);

describe('the response schemas', () => {
  it('are those of shared/api: run server/http/writeResponseSchemas.ts after changing an interface', () => {
    const kept = readFileSync(path.join(root, 'server', 'http', 'responses.schema.json'), 'utf8');
    expect(kept).toBe(asText(schemas));
  });

  it('follow types that are computed from constants', () => {
    expect(schemas['Role']).toMatchObject({ enum: ['admin', 'instructor', 'student'] });
    expect(schemas['OpticSign']).toMatchObject({ enum: ['+', '-'] });
    expect(schemas['SessionView']).toMatchObject({
      type: 'object',
      properties: { accessToken: { type: 'string' }, memberships: { type: 'array', items: { $ref: '#/components/schemas/MembershipView' } } },
      required: ['accessToken', 'expiresAt', 'account', 'memberships'],
      additionalProperties: false,
    });
  });
});
