import supertest from 'supertest';
import { createTestApp, testPassword, type TestApp } from '@/tests/support/testApp';

let test: TestApp;
beforeAll(async () => { test = await createTestApp(); });
afterAll(() => test.close());

const cookieOf = (answer: supertest.Response): string => (answer.get('Set-Cookie')?.[0] ?? '').split(';')[0] ?? '';
const later = (seconds: number): void => { test.clock.now = new Date(test.clock.now.getTime() + seconds * 1000); };

async function signedIn(): Promise<{ email: string; cookie: string }> {
  const person = await test.person(['student'], await test.school());
  const answer = await supertest(test.app).post('/api/v1/sessions').send({ email: person.email, password: testPassword }).expect(201);
  return { email: person.email, cookie: cookieOf(answer) };
}
const refresh = (cookie: string, headers: Record<string, string> = {}) =>
  supertest(test.app).post('/api/v1/sessions/refresh').set('Cookie', cookie).set(headers);

describe('refreshing a session', () => {
  it('gives a new access token and a new refresh token each time', async () => {
    const { email, cookie } = await signedIn();
    const first = await refresh(cookie).expect(200);
    expect((first.body as { account: { email: string } }).account.email).toBe(email);
    expect(cookieOf(first)).not.toBe(cookie);
    await refresh(cookieOf(first)).expect(200);
  });

  it('still takes the token before for 30 s while its successor is unused, so that a lost answer signs nobody out', async () => {
    const { cookie } = await signedIn();
    await refresh(cookie).expect(200); // this answer is lost on the way
    later(29);
    const again = await refresh(cookie).expect(200);
    await refresh(cookieOf(again)).expect(200);
  });

  it('takes two tabs that refresh at the same moment', async () => {
    const { cookie } = await signedIn();
    const tabs = await Promise.all([refresh(cookie), refresh(cookie)]);
    expect(tabs.map((answer) => answer.status)).toEqual([200, 200]);
    await refresh(cookieOf(tabs[1])).expect(200);
  });

  it('revokes the whole family when a used token comes back after 30 s', async () => {
    const { cookie } = await signedIn();
    const next = await refresh(cookie).expect(200);
    later(31);
    await refresh(cookie).expect(401);
    await refresh(cookieOf(next)).expect(401);
  });

  it('revokes the whole family when a used token comes back within 30 s after its successor was used', async () => {
    const { cookie } = await signedIn();
    const second = await refresh(cookie).expect(200);
    const third = await refresh(cookieOf(second)).expect(200);
    await refresh(cookie).expect(401);
    await refresh(cookieOf(third)).expect(401);
  });

  it('revokes the whole family when the lost answer turns up in other hands', async () => {
    const { cookie } = await signedIn();
    const stolen = await refresh(cookie).expect(200);
    const mine = await refresh(cookie).expect(200);
    const next = await refresh(cookieOf(mine)).expect(200);
    await refresh(cookieOf(stolen)).expect(401);
    await refresh(cookieOf(next)).expect(401);
  });

  it('leaves the sign-ins on other devices alone when one family is revoked', async () => {
    const { email, cookie } = await signedIn();
    const other = await supertest(test.app).post('/api/v1/sessions').send({ email, password: testPassword }).expect(201);
    await refresh(cookie).expect(200);
    later(31);
    await refresh(cookie).expect(401);
    await refresh(cookieOf(other)).expect(200);
  });

  it('ends after thirty days without use', async () => {
    const { cookie } = await signedIn();
    later(30 * 24 * 3600 + 1);
    await refresh(cookie).expect(401);
  });

  it('ends with signing out, which also clears the cookie', async () => {
    const { cookie } = await signedIn();
    const out = await supertest(test.app).delete('/api/v1/sessions/current').set('Cookie', cookie).expect(204);
    expect(out.get('Set-Cookie')?.[0]).toMatch(/^trayward_refresh=; Path=\/api\/v1\/sessions; Expires=Thu, 01 Jan 1970/);
    await refresh(cookie).expect(401);
    await supertest(test.app).delete('/api/v1/sessions/current').expect(204);
  });

  it('refuses what is no token, and a request without a cookie', async () => {
    await refresh('trayward_refresh=nonsense').expect(401);
    await supertest(test.app).post('/api/v1/sessions/refresh').expect(401);
  });

  it('refuses a request that another origin made the browser send, and takes our own', async () => {
    const { cookie } = await signedIn();
    await refresh(cookie, { 'Sec-Fetch-Site': 'cross-site' }).expect(403);
    await refresh(cookie, { 'Sec-Fetch-Site': 'same-site' }).expect(403);
    await refresh(cookie, { Origin: 'https://evil.example' }).expect(403);
    const mine = await refresh(cookie, { 'Sec-Fetch-Site': 'same-origin', Origin: 'http://localhost:8080' }).expect(200);
    await refresh(cookieOf(mine), { Origin: 'http://localhost:8080' }).expect(200);
  });
});
