import supertest from 'supertest';
import type { Page } from '@shared/api/common';
import type { InvitationView, PersonView } from '@shared/api/people';
import { as, createTestApp, testPassword, type TestApp, type TestPerson } from '@/tests/support/testApp';

let test: TestApp;
let schoolId: string;
let admin: TestPerson;

beforeAll(async () => { test = await createTestApp(); });
beforeEach(async () => {
  schoolId = await test.school('Portellery');
  admin = await test.person(['admin'], schoolId, 'Ada Admin');
});
afterAll(() => test.close());

let made = 0;
const newAddress = (): string => `invited${(made += 1)}@example.test`;
const offer = (token: string) => supertest(test.app).get(`/api/v1/invitations/${token}`);
const accept = (token: string, body: object) => supertest(test.app).post(`/api/v1/invitations/${token}/acceptance`).send(body);

async function invite(email: string, roles: string[], name?: string): Promise<{ view: InvitationView; token: string }> {
  const answer = await as(test, admin).post('/people/invitations', { email, roles, ...(name ? { name } : {}) }).expect(201);
  const view = answer.body as InvitationView;
  const [mail] = await test.rows<{ token: string }>("SELECT data->>'token' AS token FROM mail WHERE dedupe_key LIKE $1", [`%invitation:${view.id}%`]);
  return { view, token: mail?.token ?? '' };
}

describe('inviting', () => {
  it('mails a link with which a new person joins with the roles given', async () => {
    const email = newAddress();
    const { view, token } = await invite(email.toUpperCase(), ['student'], 'New Student');
    expect(view).toMatchObject({ email, name: 'New Student', roles: ['student'] });
    expect((await offer(token).expect(200)).body).toEqual({ schoolName: 'Portellery', email, name: 'New Student', roles: ['student'] });
    await accept(token, { name: 'Nia Student', password: 'a good password' }).expect(204);
    const session = await supertest(test.app).post('/api/v1/sessions').send({ email, password: 'a good password' }).expect(201);
    expect(session.body).toMatchObject({ account: { name: 'Nia Student' }, memberships: [{ schoolId, roles: ['student'] }] });
    await offer(token).expect(404);
    await accept(token, { name: 'Nia Student', password: 'a good password' }).expect(404);
  });

  it('asks somebody who has an account for its password and leaves name and password as they are', async () => {
    const elsewhere = await test.person(['student'], await test.school('Saltpan'), 'Sal Elsewhere');
    const { token } = await invite(elsewhere.email, ['instructor']);
    const wrong = await accept(token, { name: 'Somebody Else', password: 'not the password' }).expect(422);
    expect(wrong.body).toMatchObject({ code: 'account_password', errors: [{ field: 'password' }] });
    await accept(token, { name: 'Somebody Else', password: testPassword }).expect(204);
    const session = await supertest(test.app).post('/api/v1/sessions').send({ email: elsewhere.email, password: testPassword }).expect(201);
    expect(session.body).toMatchObject({ account: { name: 'Sal Elsewhere' } });
    expect((session.body as { memberships: unknown[] }).memberships).toHaveLength(2);
  });

  it('counts guesses at the password of an account like sign-ins', async () => {
    const elsewhere = await test.person(['student'], await test.school('Saltpan'));
    const { token } = await invite(elsewhere.email, ['student']);
    for (let index = 0; index < 10; index += 1) await accept(token, { name: 'Guess', password: `guess ${index}` }).expect(422);
    await accept(token, { name: 'Guess', password: testPassword }).expect(429);
  });

  it('lets exactly one of several acceptances at once through', async () => {
    const { token } = await invite(newAddress(), ['student']);
    const answers = await Promise.all(Array.from({ length: 6 }, () => accept(token, { name: 'Nia', password: 'a good password' })));
    expect(answers.filter((answer) => answer.status === 204)).toHaveLength(1);
    expect(answers.every((answer) => answer.status < 500)).toBe(true);
  });

  it('lets the link of an older invitation, a withdrawn one and one of two weeks ago run out', async () => {
    const email = newAddress();
    const older = await invite(email, ['student']);
    const newer = await invite(email, ['student']);
    await offer(older.token).expect(404);
    await offer(newer.token).expect(200);
    const open = (await as(test, admin).get('/people/invitations').expect(200)).body as Page<InvitationView>;
    expect(open.items.map((item) => item.id)).toEqual([newer.view.id]);
    await as(test, admin).delete(`/people/invitations/${newer.view.id}`).expect(204);
    await as(test, admin).delete(`/people/invitations/${newer.view.id}`).expect(404);
    await offer(newer.token).expect(404);
    const last = await invite(email, ['student']);
    const start = test.clock.now;
    test.clock.now = new Date(start.getTime() + 15 * 24 * 3600_000);
    await offer(last.token).expect(404);
    await accept(last.token, { name: 'Late', password: 'a good password' }).expect(404);
    test.clock.now = start;
  });

  it('refuses somebody who belongs to the school, and says so', async () => {
    const member = await test.person(['student'], schoolId);
    const answer = await as(test, admin).post('/people/invitations', { email: member.email, roles: ['instructor'] }).expect(409);
    expect(answer.body).toMatchObject({ code: 'already_member' });
  });

  it('names each wrong field', async () => {
    const answer = await as(test, admin).post('/people/invitations', { email: 'nobody', roles: ['owner'], colour: 'red' }).expect(422);
    const fields = (answer.body as { errors: { field: string }[] }).errors.map((error) => error.field).sort();
    expect(fields).toEqual(['colour', 'email', 'roles']);
  });
});

describe('people of a school', () => {
  it('are listed by name a page at a time, with nobody left out or twice', async () => {
    for (const name of ['Cleo', 'Bea', 'Eve', 'Dan']) await test.person(['student'], schoolId, name);
    const seen: string[] = [];
    let cursor: string | null = '';
    while (cursor !== null) {
      const page = (await as(test, admin).get(`/people?limit=2${cursor ? `&cursor=${cursor}` : ''}`).expect(200)).body as Page<PersonView>;
      seen.push(...page.items.map((item) => item.name));
      cursor = page.nextCursor;
    }
    expect(seen).toEqual(['Ada Admin', 'Bea', 'Cleo', 'Dan', 'Eve']);
    const found = (await as(test, admin).get('/people?search=LEO&role=student').expect(200)).body as Page<PersonView>;
    expect(found.items.map((item) => item.name)).toEqual(['Cleo']);
    const percent = (await as(test, admin).get('/people?search=%25').expect(200)).body as Page<PersonView>;
    expect(percent.items).toEqual([]);
  });

  it('get other roles at once, without signing in anew', async () => {
    const member = await test.person(['student'], schoolId);
    await as(test, member).get('/people').expect(403);
    await as(test, admin).patch(`/people/${member.accountId}`, { roles: ['instructor'] }).expect(200);
    await as(test, member).get('/people').expect(200);
    await as(test, admin).delete(`/people/${member.accountId}`).expect(204);
    const after = await as(test, member).get('/people').expect(403);
    expect(after.body).toMatchObject({ code: 'no_school' });
  });

  it('never lose their last admin, even when two admins remove each other at once', async () => {
    const alone = await as(test, admin).patch(`/people/${admin.accountId}`, { roles: ['student'] }).expect(409);
    expect(alone.body).toMatchObject({ code: 'last_admin' });
    await as(test, admin).delete(`/people/${admin.accountId}`).expect(409);
    const second = await test.person(['admin'], schoolId);
    const answers = await Promise.all([
      as(test, admin).delete(`/people/${second.accountId}`),
      as(test, second).delete(`/people/${admin.accountId}`),
    ]);
    const statuses = answers.map((answer) => answer.status).sort();
    expect(statuses[0]).toBe(204);
    expect([403, 409]).toContain(statuses[1]);
    const [row] = await test.rows<{ admins: number }>(
      "SELECT count(*)::integer AS admins FROM membership WHERE school_id = $1 AND 'admin' = ANY (roles) AND ended_at IS NULL", [schoolId]);
    expect(row?.admins).toBe(1);
  });

  it('cannot be removed while a kit is with them', async () => {
    const member = await test.person(['student'], schoolId);
    const [kit] = await test.rows<{ id: string }>(
      "INSERT INTO kit (school_id, number, title, neutral_title) VALUES ($1, '014', 'Kit', 'Kit 014') RETURNING id", [schoolId]);
    await test.rows(
      `INSERT INTO loan (school_id, kit_id, borrower_id, state, reserved_at, reserved_until, out_at, due_at, deposit_minor, currency)
       VALUES ($1, $2, $3, 'out', now(), now(), now(), now() + interval '3 days', 8000, 'EUR')`, [schoolId, kit?.id, member.accountId]);
    const answer = await as(test, admin).delete(`/people/${member.accountId}`).expect(409);
    expect(answer.body).toMatchObject({ code: 'loan_open' });
  });

  it('of another school are not there', async () => {
    const stranger = await test.person(['student'], await test.school('Saltpan'));
    await as(test, admin).patch(`/people/${stranger.accountId}`, { roles: ['admin'] }).expect(404);
    await as(test, admin).delete(`/people/${stranger.accountId}`).expect(404);
  });
});
