import { isPermission, roles } from '@shared/permissions';
import { operationOf, type AnyRoute } from '@/server/http/route';
import { allRoutes } from '@/server/http/routes';
import { as, createTestApp, type TestApp, type TestPerson } from '@/tests/support/testApp';
import { fill, fillSchool, markedWord, type FullSchool } from './support/schoolRows';
import { sampleBody } from './support/samples';

let test: TestApp;
let first: FullSchool;
let otherSchoolId: string;
const strangers = new Map<string, TestPerson>();

beforeAll(async () => {
  test = await createTestApp();
  first = await fillSchool(test);
  otherSchoolId = await test.school('Saltpan');
  for (const role of roles) strangers.set(role, await test.person([role], otherSchoolId));
  strangers.set('all roles', await test.person(roles, otherSchoolId));
});
afterAll(() => test.close());

/** A digest of every row of the first school in every table that has a school. */
async function digest(): Promise<Record<string, string>> {
  const tables = await test.rows<{ name: string }>(
    `SELECT c.relname AS name FROM pg_class c JOIN pg_attribute a ON a.attrelid = c.oid
      WHERE c.relkind = 'r' AND c.relnamespace = 'public'::regnamespace AND a.attname = 'school_id' ORDER BY 1`);
  expect(tables.length).toBeGreaterThan(15);
  const digests: Record<string, string> = {};
  for (const { name } of tables) {
    const [row] = await test.rows<{ md5: string }>(
      `SELECT md5(coalesce(string_agg(t::text, ' ' ORDER BY t::text), '')) AS md5 FROM ${name} t WHERE school_id = $1`, [first.schoolId]);
    digests[name] = row?.md5 ?? '';
  }
  return digests;
}

const call = (declared: AnyRoute, who: TestPerson | undefined, school?: string) =>
  as(test, who, school)[declared.method](fill(declared.path, first.params), sampleBody(declared, first.params) as object | undefined);

const signedInRoutes = allRoutes.filter(({ permission }) => permission !== 'public');
const schoolRoutes = allRoutes.filter(({ permission }) => isPermission(permission));
const leadsToARow = (declared: AnyRoute): boolean => /:\w+/.test(declared.path);

describe('a person of another school', () => {
  const cases = signedInRoutes.flatMap((declared) => [...roles, 'all roles'].map((role): [string, string, AnyRoute] => [role, operationOf(declared), declared]));

  it.each(cases)('who has there the role %s gets nothing of this one: %s', async (role, _name, declared) => {
    const answer = await call(declared, strangers.get(role));
    const said = Buffer.isBuffer(answer.body) ? answer.body.toString('latin1') : answer.text;
    expect(answer.status).toBeLessThan(500);
    if (leadsToARow(declared)) expect([403, 404, 409, 415, 422]).toContain(answer.status);
    expect(said).not.toContain(markedWord);
    for (const [name, id] of Object.entries(first.params)) {
      if (name !== 'token') expect(echoless(said, declared, answer.status)).not.toContain(id);
    }
  });

  it.each(schoolRoutes.map((declared): [string, AnyRoute] => [operationOf(declared), declared]))('cannot name this school as theirs: %s', async (_name, declared) => {
    const answer = await call(declared, strangers.get('all roles'), first.schoolId);
    expect(answer.status).toBe(403);
    expect(answer.body).toMatchObject({ code: 'not_a_member' });
  });

  it('has changed no row of this school by all of that', async () => {
    const before = await digest();
    for (const declared of signedInRoutes) {
      await call(declared, strangers.get('all roles'));
      await call(declared, strangers.get('all roles'), first.schoolId);
    }
    expect(await digest()).toEqual(before);
  });
});

describe('the digest of a school', () => {
  it('notices one changed row, so that the test above can fail', async () => {
    const before = await digest();
    await test.rows('UPDATE kit SET title = title || $2 WHERE school_id = $1', [first.schoolId, '.']);
    expect(await digest()).not.toEqual(before);
  });
});

/** A refusal may repeat what the caller sent; anything else is new to them. */
function echoless(said: string, declared: AnyRoute, status: number): string {
  return status >= 400 && leadsToARow(declared) ? said.replaceAll(new RegExp(Object.values(first.params).join('|'), 'g'), '') : said;
}
