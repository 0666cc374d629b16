import type { EntityManager } from 'typeorm';
import { QueryFailedError } from 'typeorm';
import type { Database } from './data-source';

/** Who acts, in which school. Roles are checked by the route before a unit of work begins. */
export interface SchoolActor {
  readonly accountId: string;
  readonly schoolId: string;
}

type Work<T> = (tx: EntityManager) => Promise<T>;

const attemptsMax = 3;
const serializationFailure = '40001';
const deadlockDetected = '40P01';

/**
 * One unit of work inside one school: a transaction in which row-level security shows that school's rows only.
 * The whole transaction is run again, at most three times in all, when PostgreSQL asks for it (40001, 40P01).
 * Never call the payment or mail service inside, and never open a second unit of work inside.
 */
export function withSchool<T>(db: Database, actor: SchoolActor, work: Work<T>): Promise<T> {
  return inTransaction(db, { 'app.school_id': actor.schoolId, 'app.account_id': actor.accountId }, work);
}

/** A unit of work of the system inside one school: jobs and webhooks, once the school is known. */
export function withSchoolSystem<T>(db: Database, schoolId: string, work: Work<T>): Promise<T> {
  return inTransaction(db, { 'app.school_id': schoolId }, work);
}

/** A unit of work of one account before a school is chosen: sign-in, refresh, memberships. */
export function withAccount<T>(db: Database, accountId: string, work: Work<T>): Promise<T> {
  return inTransaction(db, { 'app.account_id': accountId }, work);
}

/** A unit of work that sees no school: the webhook inbox and the functions that find ids. */
export function withSystem<T>(db: Database, work: Work<T>): Promise<T> {
  return inTransaction(db, {}, work);
}

async function inTransaction<T>(db: Database, settings: Record<string, string>, work: Work<T>): Promise<T> {
  let first: unknown;
  for (let attempt = 1; attempt <= attemptsMax; attempt += 1) {
    try {
      return await db.dataSource.transaction(async (tx) => {
        const names = Object.keys(settings);
        if (names.length > 0) {
          const calls = names.map((name, index) => `set_config('${name}', $${index + 1}, true)`).join(', ');
          await tx.query(`SELECT ${calls}`, names.map((name) => settings[name]));
        }
        return work(tx);
      });
    } catch (error) {
      first ??= error;
      if (!asksForRetry(error) || attempt === attemptsMax) throw first;
      await pause(10 * attempt + Math.random() * 20);
    }
  }
  throw first;
}

function asksForRetry(error: unknown): boolean {
  if (!(error instanceof QueryFailedError)) return false;
  const code = (error.driverError as { code?: string }).code;
  return code === serializationFailure || code === deadlockDetected;
}

const pause = (ms: number): Promise<void> => new Promise((resolve) => setTimeout(resolve, ms));
