import { randomUUID } from 'node:crypto';
import type { Express } from 'express';
import pino from 'pino';
import supertest from 'supertest';
import { createApp } from '@/server/app';
import { readConfig, type Config } from '@/server/config';
import { openDatabase, type Database } from '@/server/database/data-source';
import { hashPassword } from '@/server/features/sessions/passwords';
import { createAccessTokens } from '@/server/http/accessTokens';
import type { AnyRoute } from '@/server/http/route';
import type { Dependencies } from '@/server/http/services';
import type { Role } from '@shared/permissions';
import { Client } from 'pg';
import { createTestDatabase, type TestDatabase } from './database';
import { idlePayments, memoryStorage } from './standIns';

/** The app on a database of its own, mounted without a port, with a clock that tests move. */
export interface TestApp {
  readonly app: Express;
  readonly config: Config;
  readonly db: Database;
  readonly database: TestDatabase;
  /** Moves only when a test says so. */
  readonly clock: { now: Date };
  /** Makes a school as the owner role, which passes row-level security. */
  school(name?: string): Promise<string>;
  /** Makes an account with these roles in a school, and a signed-in client for it. */
  person(roles: readonly Role[], schoolId: string | undefined, name?: string): Promise<TestPerson>;
  /** Rows as the owner sees them: all schools. */
  rows<T>(sql: string, values?: readonly unknown[]): Promise<T[]>;
  close(): Promise<void>;
}

export interface TestPerson {
  readonly accountId: string;
  readonly email: string;
  readonly token: string;
}

export const testPassword = 'crossed-polars';

export interface TestAppOptions {
  readonly routes?: readonly AnyRoute[];
  readonly environment?: Readonly<Record<string, string>>;
  readonly dependencies?: Partial<Pick<Dependencies, 'payments' | 'storage' | 'logger'>>;
}

export async function createTestApp(options: TestAppOptions = {}): Promise<TestApp> {
  const database = await createTestDatabase();
  const config = readConfig({
    TRAYWARD_MODE: 'test', PUBLIC_URL: 'http://localhost:8080', ACCESS_TOKEN_SECRET: 'test secret of at least thirty-two characters',
    STRIPE_SECRET_KEY: 'sk_test_of_the_tests', STRIPE_WEBHOOK_SECRET: 'whsec_of_the_tests', SMTP_URL: 'smtp://127.0.0.1:1',
    PUBLIC_REQUESTS_PER_MINUTE: '1000000', ...database.environment, ...options.environment,
  });
  const db = await openDatabase({ url: database.appUrl, poolSize: 10 });
  const owner = new Client({ connectionString: database.ownerUrl });
  await owner.connect();
  const clock = { now: new Date() };
  const dependencies: Dependencies = {
    config, db, clock: () => clock.now, logger: pino({ level: 'silent' }), payments: idlePayments(), storage: memoryStorage(), ...options.dependencies,
  };
  const app = createApp(dependencies, options.routes);
  const tokens = createAccessTokens(config.accessTokenSecret);
  const passwordHash = hashPassword(testPassword);

  async function rows<T>(sql: string, values: readonly unknown[] = []): Promise<T[]> {
    const result = await owner.query(sql, [...values]);
    return result.rows as T[];
  }

  async function school(name = 'Test school'): Promise<string> {
    const id = randomUUID();
    await rows(
      `INSERT INTO school (id, name, time_zone, currency, deposit_rule) VALUES ($1, $2, 'Europe/Dublin', 'EUR', $3)`,
      [id, name, JSON.stringify({ kind: 'fixed', amountMinor: 8000 })],
    );
    await rows(`INSERT INTO terms_version (school_id, version, text) VALUES ($1, 1, 'Bring it back as it was.')`, [id]);
    return id;
  }

  async function person(roles: readonly Role[], schoolId: string | undefined, name = 'Ada Test'): Promise<TestPerson> {
    const accountId = randomUUID();
    const email = `${accountId}@example.test`;
    await rows('INSERT INTO account (id, email, name, password_hash) VALUES ($1, $2, $3, $4)', [accountId, email, name, await passwordHash]);
    if (schoolId !== undefined) await rows('INSERT INTO membership (school_id, account_id, roles) VALUES ($1, $2, $3)', [schoolId, accountId, roles]);
    return { accountId, email, token: tokens.issue(accountId, new Date()).accessToken };
  }

  async function close(): Promise<void> {
    await owner.end();
    await db.close();
    await database.drop();
  }

  return { app, config, db, database, clock, school, person, rows, close };
}

/** A request as one person: `as(test, admin).post('/kits', { … })`. Writes carry a new idempotency key. */
export function as(test: Pick<TestApp, 'app'>, who: Pick<TestPerson, 'token'> | undefined, school?: string) {
  const send = (method: 'get' | 'post' | 'put' | 'patch' | 'delete', path: string) => {
    const request = supertest(test.app)[method](`/api/v1${path}`);
    if (who) void request.set('Authorization', `Bearer ${who.token}`);
    if (school !== undefined) void request.set('X-School', school);
    return method === 'get' ? request : request.set('Idempotency-Key', randomUUID());
  };
  return {
    get: (path: string) => send('get', path),
    delete: (path: string) => send('delete', path),
    post: (path: string, body: object = {}) => send('post', path).send(body),
    put: (path: string, body: object = {}) => send('put', path).send(body),
    patch: (path: string, body: object = {}) => send('patch', path).send(body),
  };
}
