import { isPermission, may, roles } from '@shared/permissions';
import type { AnyRoute } from '@/server/http/route';
import { operationOf } from '@/server/http/route';
import { allRoutes } from '@/server/http/routes';
import { as, createTestApp, type TestApp, type TestPerson } from '@/tests/support/testApp';
import { fill, fillSchool, type FullSchool } from './support/schoolRows';
import { sampleBody } from './support/samples';

let test: TestApp;
let school: FullSchool;
const people = new Map<string, TestPerson>();
let outsider: TestPerson;

beforeAll(async () => {
  test = await createTestApp();
  school = await fillSchool(test);
  for (const role of roles) people.set(role, await test.person([role], school.schoolId));
  outsider = await test.person([], undefined);
});
afterAll(() => test.close());

const call = (declared: AnyRoute, who: TestPerson | undefined) =>
  as(test, who)[declared.method](fill(declared.path, school.params), sampleBody(declared, school.params) as object | undefined);

const inSchool = allRoutes.flatMap((declared) => (isPermission(declared.permission) ? [{ declared, permission: declared.permission }] : []));

describe('every route that is not public', () => {
  it.each(allRoutes.filter(({ permission }) => permission !== 'public').map((declared) => [operationOf(declared), declared]))(
    'answers 401 without an access token: %s',
    async (_name, declared) => {
      const answer = await call(declared, undefined);
      expect(answer.status).toBe(401);
      expect(answer.body).toMatchObject({ code: 'sign_in_needed', status: 401 });
      expect(answer.get('WWW-Authenticate')).toBe('Bearer');
    },
  );
});

describe('every route of a school', () => {
  const refused = inSchool.flatMap(({ declared, permission }) =>
    roles.filter((role) => !may([role], permission)).map((role): [string, string, AnyRoute] => [role, operationOf(declared), declared]),
  );

  it.each(refused)('answers 403 to a person who is %s only: %s', async (role, _name, declared) => {
    const answer = await call(declared, people.get(role));
    expect(answer.status).toBe(403);
    expect(answer.body).toMatchObject({ code: 'forbidden' });
  });

  it.each(inSchool.map(({ declared }): [string, AnyRoute] => [operationOf(declared), declared]))('answers 403 to an account of no school: %s', async (_name, declared) => {
    const answer = await call(declared, outsider);
    expect(answer.status).toBe(403);
    expect(answer.body).toMatchObject({ code: 'no_school' });
  });
});
