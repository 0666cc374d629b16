import { writeFileSync } from 'node:fs';
import path from 'node:path';
import { responseSchemas, type JsonSchema } from './responseSchemas';

/** One schema a line: a change of one interface is a change of one line. */
export function asText(schemas: Record<string, JsonSchema>): string {
  const lines = Object.entries(schemas).map(([name, schema]) => `${JSON.stringify(name)}: ${JSON.stringify(schema)}`);
  return `{\n${lines.join(',\n')}\n}\n`;
}

/**
 * Writes `responses.schema.json` from the interfaces of `shared/api`, so that the server can show them without a
 * compiler. Run it after changing those interfaces; a unit test fails while the file is stale.
 *
 *   node -r ./docker-free-scripts/register.cjs server/http/writeResponseSchemas.ts
 */
if (require.main === module) {
  const root = path.resolve(__dirname, '..', '..');
  writeFileSync(path.join(__dirname, 'responses.schema.json'), asText(responseSchemas(root)));
}
