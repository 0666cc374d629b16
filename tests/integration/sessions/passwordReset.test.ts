import supertest from 'supertest';
import { createTestApp, testPassword, type TestApp, type TestPerson } from '@/tests/support/testApp';

let test: TestApp;
let person: TestPerson;

beforeAll(async () => { test = await createTestApp(); });
beforeEach(async () => { person = await test.person(['student'], await test.school()); });
afterAll(() => test.close());

const ask = (email: string) => supertest(test.app).post('/api/v1/password-resets').send({ email });
const set = (token: string, password: string) => supertest(test.app).post(`/api/v1/password-resets/${token}`).send({ password });
const signIn = (email: string, password: string) => supertest(test.app).post('/api/v1/sessions').send({ email, password });

async function mailedTokens(accountId: string): Promise<string[]> {
  const rows = await test.rows<{ token: string }>(
    `SELECT data->>'token' AS token FROM mail WHERE to_account_id = $1 AND template = 'password-reset' ORDER BY created_at`, [accountId]);
  return rows.map((row) => row.token);
}

describe('resetting a password', () => {
  it('mails a link that sets a new password once and signs out every device', async () => {
    const before = await signIn(person.email, testPassword).expect(201);
    await ask(person.email).expect(202);
    const [token = ''] = await mailedTokens(person.accountId);
    await set(token, 'a new good password').expect(204);
    await signIn(person.email, testPassword).expect(401);
    await signIn(person.email, 'a new good password').expect(201);
    await supertest(test.app).post('/api/v1/sessions/refresh').set('Cookie', (before.get('Set-Cookie') ?? []).join('; ')).expect(401);
    const again = await set(token, 'another new password').expect(404);
    expect(again.body).toMatchObject({ code: 'reset_not_valid' });
  });

  it('answers the same for an address nobody has, and takes as long', async () => {
    const timed = async (email: string): Promise<number> => {
      const start = performance.now();
      const answer = await ask(email).expect(202);
      expect(answer.text).toBe('');
      return performance.now() - start;
    };
    expect(await timed('nobody@example.test')).toBeGreaterThanOrEqual(140);
    expect(await timed(person.email)).toBeGreaterThanOrEqual(140);
  });

  it('lets a link run out after an hour', async () => {
    await ask(person.email).expect(202);
    const [token = ''] = await mailedTokens(person.accountId);
    const start = test.clock.now;
    test.clock.now = new Date(start.getTime() + 61 * 60_000);
    await set(token, 'a new good password').expect(404);
    test.clock.now = start;
  });

  it('keeps only a hash of the link beside the account', async () => {
    await ask(person.email).expect(202);
    const [token = ''] = await mailedTokens(person.accountId);
    const [row] = await test.rows<{ text: string }>('SELECT string_agg(r::text, \' \') AS text FROM password_reset r WHERE account_id = $1', [person.accountId]);
    expect(token).toHaveLength(43);
    expect(row?.text).not.toContain(token);
  });

  it('writes at most three mails to one address in a quarter of an hour, and answers the same', async () => {
    for (let index = 0; index < 5; index += 1) await ask(person.email).expect(202);
    expect(await mailedTokens(person.accountId)).toHaveLength(3);
  });

  it.each([
    ['short', 'too short'],
    ['aaaaaaaaaaaa', 'one letter over and over'],
  ])('refuses %s: %s', async (password) => {
    await ask(person.email).expect(202);
    const [token = ''] = await mailedTokens(person.accountId);
    const answer = await set(token, password).expect(422);
    expect(answer.body).toMatchObject({ errors: [{ field: 'password' }] });
    await set(token, person.email).expect(422);
    await set(token, 'a new good password').expect(204); // a refused password does not use the link up
  });
});
