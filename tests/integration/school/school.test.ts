import { openDatabase } from '@/server/database/data-source';
import { createSchool } from '@/server/features/school/createSchool';
import type { SchoolView, TermsView } from '@shared/api/school';
import supertest from 'supertest';
import { as, createTestApp, type TestApp, type TestPerson } from '@/tests/support/testApp';

let test: TestApp;
let schoolId: string;
let admin: TestPerson;

beforeAll(async () => { test = await createTestApp(); });
beforeEach(async () => {
  schoolId = await test.school('Portellery');
  admin = await test.person(['admin'], schoolId);
});
afterAll(() => test.close());

describe('school settings', () => {
  it('change only where something is sent', async () => {
    const before = (await as(test, admin).get('/school').expect(200)).body as SchoolView;
    expect(before).toEqual({
      id: schoolId, name: 'Portellery', timeZone: 'Europe/Dublin', currency: 'EUR', closingTime: '17:00', loanDays: 3,
      depositRule: { kind: 'fixed', amountMinor: 8000 }, lateGraceHours: 24, checkingDays: 2, reservationMinutes: 45, objectionDays: 14,
    });
    const rule = { kind: 'share', percent: 40, minimumMinor: 2000, maximumMinor: null };
    const after = await as(test, admin).patch('/school', { closingTime: '18:30', depositRule: { ...rule, amountMinor: 5 } }).expect(200);
    expect(after.body).toEqual({ ...before, closingTime: '18:30', depositRule: rule });
    expect((await as(test, admin).patch('/school', {}).expect(200)).body).toEqual(after.body);
  });

  it.each([
    [{ timeZone: 'Europe/Atlantis' }, 'timeZone'],
    [{ timeZone: '+01:00' }, 'timeZone'],
    [{ currency: 'XYZ' }, 'currency'],
    [{ closingTime: '24:00' }, 'closingTime'],
    [{ closingTime: null }, 'closingTime'],
    [{ name: '   ' }, 'name'],
    [{ loanDays: 0 }, 'loanDays'],
    [{ loanDays: 2.5 }, 'loanDays'],
    [{ reservationMinutes: 29 }, 'reservationMinutes'],
    [{ depositRule: null }, 'depositRule'],
    [{ depositRule: {} }, 'depositRule.kind'],
    [{ depositRule: { kind: 'fixed' } }, 'depositRule.amountMinor'],
    [{ depositRule: { kind: 'fixed', amountMinor: -1 } }, 'depositRule.amountMinor'],
    [{ depositRule: { kind: 'share', percent: 10, minimumMinor: 5000, maximumMinor: 4000 } }, 'depositRule.maximumMinor'],
    [{ id: '6e5c2d56-35f6-4b5c-9f0e-0f5ba1a9f5a1' }, 'id'],
  ])('refuse %j, naming %s', async (body, field) => {
    const answer = await as(test, admin).patch('/school', body).expect(422);
    const fields = (answer.body as { errors: { field: string }[] }).errors.map((error) => error.field);
    expect(fields).toContain(field);
  });

  it('keep the currency once stones are valued in it', async () => {
    await as(test, admin).patch('/school', { currency: 'CHF' }).expect(200);
    const [kit] = await test.rows<{ id: string }>(
      "INSERT INTO kit (school_id, number, title, neutral_title) VALUES ($1, '014', 'Kit', 'Kit 014') RETURNING id", [schoolId]);
    await test.rows(
      `INSERT INTO stone (school_id, kit_id, slot, species, shape, neutral_description, replacement_value_minor)
       VALUES ($1, $2, 'A', 'topaz', 'oval', 'blue oval', 4000)`, [schoolId, kit?.id]);
    const answer = await as(test, admin).patch('/school', { currency: 'EUR' }).expect(409);
    expect(answer.body).toMatchObject({ code: 'currency_in_use' });
    await as(test, admin).patch('/school', { currency: 'CHF' }).expect(200);
  });
});

describe('terms', () => {
  it('get a new version with each change and keep the earlier ones', async () => {
    await as(test, admin).post('/school/terms', { text: 'Bring it back dry.' }).expect(201);
    const student = await test.person(['student'], schoolId);
    const terms = (await as(test, student).get('/school/terms').expect(200)).body as TermsView;
    expect(terms.current).toMatchObject({ version: 2, text: 'Bring it back dry.' });
    expect(terms.versions.map((version) => version.version)).toEqual([2, 1]);
    await as(test, student).post('/school/terms', { text: 'Keep it.' }).expect(403);
    const same = await as(test, admin).post('/school/terms', { text: 'Bring it back dry.' }).expect(409);
    expect(same.body).toMatchObject({ code: 'same_terms' });
  });

  it('stay a plain count when two admins save at once', async () => {
    const answers = await Promise.all([1, 2, 3, 4].map((n) => as(test, admin).post('/school/terms', { text: `Version of tab ${n}` })));
    expect(answers.map((answer) => answer.status)).toEqual([201, 201, 201, 201]);
    expect(answers.map((answer) => (answer.body as { version: number }).version).sort()).toEqual([2, 3, 4, 5]);
  });
});

describe('the command that makes the first school', () => {
  const given = {
    name: 'Saltpan', timeZone: 'Europe/Malta', currency: 'EUR', adminEmail: 'First@Saltpan.example', adminName: 'First Admin',
    adminPassword: 'pink salt in the sun', terms: 'Bring it back.',
  };

  it('makes school, terms and admin, who can then sign in', async () => {
    const owner = await openDatabase({ url: test.database.ownerUrl, poolSize: 1 });
    try {
      const { schoolId: made } = await createSchool(owner, given, test.clock.now);
      const session = await supertest(test.app).post('/api/v1/sessions').send({ email: 'first@saltpan.example', password: given.adminPassword }).expect(201);
      expect(session.body).toMatchObject({ memberships: [{ schoolId: made, schoolName: 'Saltpan', roles: ['admin'] }] });
      const token = (session.body as { accessToken: string }).accessToken;
      await as(test, { token }).get('/school/terms').expect(200);
    } finally {
      await owner.close();
    }
  });

  it('makes nothing at all when one value cannot be taken', async () => {
    const owner = await openDatabase({ url: test.database.ownerUrl, poolSize: 1 });
    try {
      await expect(createSchool(owner, { ...given, adminEmail: 'x@y.example', adminPassword: 'short' }, test.clock.now)).rejects.toThrow(/at least 10/);
      await expect(createSchool(owner, { ...given, timeZone: 'Mars/Olympus' }, test.clock.now)).rejects.toThrow(/time zone/);
      expect(await test.rows("SELECT 1 FROM account WHERE email = 'x@y.example'")).toEqual([]);
    } finally {
      await owner.close();
    }
  });
});
