import { createHmac } from 'node:crypto';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Writable } from 'node:stream';
import pino from 'pino';
import supertest from 'supertest';
import { createApp } from '@/server/app';
import { nothing, route } from '@/server/http/route';
import { allRoutes } from '@/server/http/routes';
import type { HealthView } from '@shared/api/health';
import { idlePayments, memoryStorage } from '@/tests/support/standIns';
import { as, createTestApp, testPassword, type TestApp, type TestPerson } from '@/tests/support/testApp';

let test: TestApp;
let person: TestPerson;
let schoolId: string;
let webDir: string;
let lines = '';

const broken = route({
  method: 'get', path: '/broken/:secretId', permission: 'public', summary: 'Fails', response: nothing(), idempotent: false,
  handle: async ({ tx }) => { await tx.query("SELECT 'somebody@example.test'::uuid, $1::text", ['a private parameter']); return undefined; },
});
const failing = route({
  method: 'get', path: '/failing', permission: 'public', summary: 'Fails', response: nothing(), idempotent: false,
  handle: async () => { throw new Error('the inside of the server'); },
});

beforeAll(async () => {
  webDir = mkdtempSync(path.join(tmpdir(), 'trayward-web-'));
  mkdirSync(path.join(webDir, '_expo'));
  writeFileSync(path.join(webDir, 'index.html'), '<!doctype html><title>Trayward</title>');
  writeFileSync(path.join(webDir, '_expo', 'entry-0123456789abcdef0123456789abcdef.js'), 'void 0;');
  writeFileSync(path.join(webDir, 'manifest.json'), '{}');
  const sink = new Writable({ write: (chunk: Buffer, _encoding, done) => { lines += chunk.toString(); done(); } });
  test = await createTestApp({ routes: [...allRoutes, broken, failing], environment: { WEB_DIR: webDir }, dependencies: { logger: pino({ level: 'info' }, sink) } });
  schoolId = await test.school();
  person = await test.person(['student'], schoolId);
});
afterAll(async () => {
  await test.close();
  rmSync(webDir, { recursive: true });
});

const get = (address: string) => supertest(test.app).get(address);

describe('the web app', () => {
  it('answers every screen with its one page, and a missing file with 404', async () => {
    for (const address of ['/', '/kits/014', '/invitation/abc']) expect((await get(address).expect(200)).text).toContain('<title>Trayward');
    expect((await get('/missing.js').expect(404)).type).toBe('application/problem+json');
    expect((await get('/..%2f..%2fetc%2fpasswd')).text).not.toContain('root:');
  });

  it('lets browsers keep hashed files for ever and asks for the rest anew', async () => {
    expect((await get('/_expo/entry-0123456789abcdef0123456789abcdef.js').expect(200)).get('Cache-Control')).toBe('public, max-age=31536000, immutable');
    expect((await get('/manifest.json').expect(200)).get('Cache-Control')).toBe('no-cache');
    expect((await get('/').expect(200)).get('Cache-Control')).toBe('no-cache');
  });

  it('may use the camera and WebAssembly, and nothing from elsewhere', async () => {
    const answer = await get('/').expect(200);
    const policy = answer.get('Content-Security-Policy') ?? '';
    expect(policy).toContain("script-src 'self' 'wasm-unsafe-eval'");
    expect(policy).toContain("frame-ancestors 'none'");
    expect(policy).not.toMatch(/unsafe-eval'(?<!wasm-unsafe-eval')|https?:\/\/|\*/);
    expect(answer.get('Permissions-Policy')).toContain('camera=(self)');
    expect(answer.get('X-Powered-By')).toBeUndefined();
    expect(answer.get('Strict-Transport-Security')).toBeUndefined();
  });
});

describe('the documents', () => {
  it('are there for machines and people', async () => {
    expect((await get('/api/openapi.json').expect(200)).body).toMatchObject({ openapi: '3.1.0' });
    expect((await get('/api').expect(200)).text).toContain('Trayward interface');
  });
});

describe('access tokens', () => {
  const part = (value: object): string => Buffer.from(JSON.stringify(value)).toString('base64url');
  const claims = (change: object = {}): object => ({ sub: person.accountId, iss: 'trayward', aud: 'trayward-api', exp: Math.floor(Date.now() / 1000) + 600, ...change });
  const signed = (header: object, body: object, secret: string): string => {
    const text = `${part(header)}.${part(body)}`;
    return `${text}.${createHmac('sha256', secret).update(text).digest('base64url')}`;
  };

  it('are taken with our key, algorithm, issuer and audience before they run out', async () => {
    await as(test, { token: signed({ alg: 'HS256', typ: 'JWT' }, claims(), test.config.accessTokenSecret) }).get('/me').expect(200);
  });

  it.each([
    ['signed with nothing', () => `${part({ alg: 'none' })}.${part(claims())}.`],
    ['signed with another key', () => signed({ alg: 'HS256' }, claims(), 'another secret')],
    ['that claims another algorithm', () => signed({ alg: 'HS512' }, claims(), test.config.accessTokenSecret)],
    ['of another issuer', () => signed({ alg: 'HS256' }, claims({ iss: 'somebody' }), test.config.accessTokenSecret)],
    ['for another audience', () => signed({ alg: 'HS256' }, claims({ aud: 'somebody' }), test.config.accessTokenSecret)],
    ['that has run out', () => signed({ alg: 'HS256' }, claims({ exp: Math.floor(Date.now() / 1000) - 1 }), test.config.accessTokenSecret)],
    ['whose subject is no account id', () => signed({ alg: 'HS256' }, claims({ sub: 'admin' }), test.config.accessTokenSecret)],
  ])('are refused when %s', async (_name, make) => {
    await as(test, { token: make() }).get('/me').expect(401);
  });
});

describe('the current school', () => {
  it('is the only one of an account, or the one named', async () => {
    const second = await test.school('Saltpan');
    await as(test, person).get('/school').expect(200);
    await test.rows("INSERT INTO membership (school_id, account_id, roles) VALUES ($1, $2, ARRAY['admin'])", [second, person.accountId]);
    expect((await as(test, person).get('/school').expect(400)).body).toMatchObject({ code: 'school_needed' });
    expect((await as(test, person, second).get('/school').expect(200)).body).toMatchObject({ id: second });
    expect((await as(test, person, schoolId.toUpperCase()).get('/school').expect(200)).body).toMatchObject({ id: schoolId });
    await as(test, person, schoolId).patch('/school', { loanDays: 4 }).expect(403);
    await as(test, person, second).patch('/school', { loanDays: 4 }).expect(200);
    expect((await as(test, person, 'x').get('/school').expect(400)).body).toMatchObject({ code: 'bad_school' });
  });
});

describe('health', () => {
  it('tells of process, database and queue', async () => {
    const health = (await get('/api/v1/health').expect(200)).body as HealthView;
    expect(health).toMatchObject({ status: 'ok', database: 'ok', queue: { status: 'ok', ready: 0, failed: 0 } });
  });

  it('answers 503 when a job has waited too long', async () => {
    await test.rows('SELECT 1');
    await test.db.dataSource.query(`SELECT jobs.enqueue_job('sweep-schools', '{}', now() - interval '10 minutes', NULL, 3)`);
    expect((await get('/api/v1/health').expect(503)).body).toMatchObject({ status: 'failing', database: 'ok', queue: { status: 'failing', ready: 1 } });
  });

  it('answers 503 when the database is away', async () => {
    const away = await createTestApp();
    await away.db.close();
    const answer = await supertest(away.app).get('/api/v1/health').expect(503);
    expect(answer.body).toMatchObject({ status: 'failing', database: 'failing' });
    await away.db.dataSource.initialize();
    await away.close();
  });
});

describe('what is logged', () => {
  const id = '6e5c2d56-35f6-4b5c-9f0e-0f5ba1a9f5a1';

  it('names the operation and the request, and nothing personal', async () => {
    lines = '';
    const answer = await supertest(test.app).post('/api/v1/sessions').set('X-Request-Id', 'proxy-request-1').send({ email: person.email, password: testPassword });
    await get('/api/v1/invitations/a-secret-token-in-the-address?email=somebody@example.test');
    expect(answer.get('X-Request-Id')).toBe('proxy-request-1');
    expect(lines).toContain('"operation":"POST /sessions"');
    expect(lines).toContain('"operation":"GET /invitations/:token"');
    expect(lines).toContain('proxy-request-1');
    for (const secret of ['example.test', testPassword, 'a-secret-token', (answer.body as { accessToken: string }).accessToken, 'trayward_refresh']) {
      expect(lines).not.toContain(secret);
    }
  });

  it('takes no request id that could forge a line', async () => {
    const answer = await get('/api/v1/health').set('X-Request-Id', 'a"} forged');
    expect(answer.get('X-Request-Id')).toMatch(/^[0-9a-f-]{36}$/);
  });

  it('keeps a fault of ours from the answer, and the data of a database error from the log', async () => {
    lines = '';
    const failed = await get('/api/v1/failing').expect(500);
    expect(failed.body).toMatchObject({ code: 'internal', requestId: failed.get('X-Request-Id') });
    expect(failed.text).not.toContain('inside');
    expect(lines).toContain('the inside of the server');
    await get(`/api/v1/broken/${id}`).expect(422);
    expect(lines).toContain('"sqlState":"22P02"');
    expect(lines).not.toMatch(/somebody@example\.test|a private parameter/);
  });
});

describe('routes without sign-in', () => {
  it('are slowed down for a network address that hammers them, except health', async () => {
    const narrow = createApp({ ...dependenciesOf(test), config: { ...test.config, limits: { ...test.config.limits, publicPerMinute: 3 } } });
    const statuses: number[] = [];
    for (let index = 0; index < 5; index += 1) statuses.push((await supertest(narrow).get('/api/v1/invitations/x')).status);
    expect(statuses).toEqual([404, 404, 404, 429, 429]);
    for (let index = 0; index < 5; index += 1) expect((await supertest(narrow).get('/api/v1/health')).status).not.toBe(429);
  });
});

function dependenciesOf({ db, config, clock }: TestApp) {
  return { db, config, clock: () => clock.now, logger: pino({ level: 'silent' }), payments: idlePayments(), storage: memoryStorage() };
}
