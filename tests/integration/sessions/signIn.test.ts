import supertest from 'supertest';
import { as, createTestApp, testPassword, type TestApp, type TestPerson } from '@/tests/support/testApp';

let test: TestApp;
let schoolId: string;
let person: TestPerson;

beforeAll(async () => {
  test = await createTestApp();
  schoolId = await test.school('Portellery');
  person = await test.person(['instructor'], schoolId, 'Ines Reader');
});
afterAll(() => test.close());

const signIn = (email: string, password: string) => supertest(test.app).post('/api/v1/sessions').send({ email, password });

describe('signing in', () => {
  it('answers with a token, the account and its schools, and keeps the refresh token out of the body', async () => {
    const answer = await signIn(` ${person.email.toUpperCase()} `, testPassword).expect(201);
    expect(answer.body).toEqual({
      accessToken: expect.any(String) as string,
      expiresAt: new Date(Math.floor(test.clock.now.getTime() / 1000) * 1000 + 15 * 60_000).toISOString(),
      account: { id: person.accountId, name: 'Ines Reader', email: person.email },
      memberships: [{ schoolId, schoolName: 'Portellery', roles: ['instructor'] }],
    });
    const [cookie] = answer.get('Set-Cookie') ?? [];
    expect(cookie).toMatch(/^trayward_refresh=[\w-]{43}; Path=\/api\/v1\/sessions; Expires=.*; HttpOnly; SameSite=Strict$/);
    const me = await as(test, { token: (answer.body as { accessToken: string }).accessToken }).get('/me').expect(200);
    expect(me.body).toEqual({
      account: { id: person.accountId, name: 'Ines Reader', email: person.email },
      memberships: [{ schoolId, schoolName: 'Portellery', roles: ['instructor'] }],
    });
  });

  it('refuses a wrong password and an unknown address with the same words', async () => {
    const wrong = await signIn(person.email, 'not the password').expect(401);
    const unknown = await signIn('nobody@example.test', 'not the password').expect(401);
    const withoutId = ({ requestId: _, ...rest }: Record<string, unknown>): object => rest;
    expect(withoutId(wrong.body as Record<string, unknown>)).toEqual(withoutId(unknown.body as Record<string, unknown>));
    expect(wrong.body).toMatchObject({ code: 'wrong_credentials', status: 401, errors: [] });
    expect(wrong.type).toBe('application/problem+json');
  });

  it('marks the cookie Secure when the public origin is HTTPS', async () => {
    const secure = await createTestApp({ environment: { PUBLIC_URL: 'https://lend.example.org' } });
    try {
      const someone = await secure.person(['admin'], await secure.school());
      const answer = await supertest(secure.app).post('/api/v1/sessions').send({ email: someone.email, password: testPassword }).expect(201);
      expect(answer.get('Set-Cookie')?.[0]).toContain('; Secure');
      expect(answer.get('Strict-Transport-Security')).toContain('max-age=');
    } finally {
      await secure.close();
    }
  });
});

describe('too many tries', () => {
  it('stops guessing one account after ten failures, right password or not, and says when to try again', async () => {
    const victim = await test.person(['student'], schoolId);
    for (let index = 0; index < 10; index += 1) await signIn(victim.email, `guess number ${index}`).expect(401);
    const stopped = await signIn(victim.email, testPassword).expect(429);
    expect(Number(stopped.get('Retry-After'))).toBeGreaterThan(800);
    expect(stopped.body).toMatchObject({ code: 'too_many_tries' });
  });

  it('treats an address nobody has in the same way', async () => {
    for (let index = 0; index < 10; index += 1) await signIn('ghost@example.test', `guess number ${index}`).expect(401);
    await signIn('ghost@example.test', 'one more guess').expect(429);
  });

  it('lets ten of forty guesses through that are sent at the same time', async () => {
    const victim = await test.person(['student'], schoolId);
    const answers = await Promise.all(Array.from({ length: 40 }, (_, index) => signIn(victim.email, `guess number ${index}`)));
    expect(answers.filter((answer) => answer.status === 401)).toHaveLength(10);
    expect(answers.filter((answer) => answer.status === 429)).toHaveLength(30);
  });

  it('forgets failures after a quarter of an hour and does not count a sign-in that worked', async () => {
    const victim = await test.person(['student'], schoolId);
    const start = test.clock.now;
    for (let index = 0; index < 15; index += 1) await signIn(victim.email, testPassword).expect(201);
    for (let index = 0; index < 10; index += 1) await signIn(victim.email, 'wrong password').expect(401);
    await signIn(victim.email, testPassword).expect(429);
    test.clock.now = new Date(start.getTime() + 16 * 60_000);
    await signIn(victim.email, testPassword).expect(201);
    test.clock.now = start;
  });

  it('stops one network address that tries many accounts', async () => {
    const narrow = await createTestApp({ environment: { SIGN_IN_FAILURES_PER_ADDRESS: '5' } });
    try {
      const someone = await narrow.person(['student'], await narrow.school());
      for (let index = 0; index < 5; index += 1) {
        await supertest(narrow.app).post('/api/v1/sessions').send({ email: `a${index}@example.test`, password: 'x' }).expect(401);
      }
      await supertest(narrow.app).post('/api/v1/sessions').send({ email: someone.email, password: testPassword }).expect(429);
    } finally {
      await narrow.close();
    }
  });

  it('keeps neither addresses nor e-mails in clear', async () => {
    const [row] = await test.rows<{ text: string }>("SELECT string_agg(a::text, ' ') AS text FROM sign_in_attempt a");
    expect(row?.text).not.toContain('example.test');
    expect(row?.text).not.toContain('127.0.0.1');
  });
});
