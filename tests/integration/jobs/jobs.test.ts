import { randomUUID } from 'node:crypto';
import { type Database, openDatabase } from '@/server/database/data-source';
import { withSchoolSystem, withSystem } from '@/server/database/school';
import { enqueue } from '@/server/jobs/enqueue';
import { readQueueHealth } from '@/server/jobs/queueHealth';
import { type JobRunner, startRunner } from '@/server/jobs/runner';
import { queueMail } from '@/server/mail/queueMail';
import { createTestDatabase, type TestDatabase } from '@/tests/support/database';
import { testJobDeps, type TestJobDeps } from '@/tests/support/mail/jobDeps';
import { inDatabase, type MailSchool, makeMailSchool, until } from '@/tests/support/mail/school';

let database: TestDatabase;
let db: Database;
let school: MailSchool;
const runners: JobRunner[] = [];

beforeAll(async () => {
  database = await createTestDatabase();
  db = await openDatabase({ url: database.appUrl, poolSize: 10 });
  school = await makeMailSchool(database.superuserUrl);
});
afterEach(async () => {
  await Promise.all(runners.splice(0).map((runner) => runner.stop()));
});
afterAll(async () => {
  await db.close();
  await database.drop();
});

async function work(deps: TestJobDeps, sweeps = false): Promise<JobRunner> {
  const runner = await startRunner({ queueUrl: database.queueUrl, deps, concurrency: 4, pollIntervalMs: 100, sweeps });
  runners.push(runner);
  return runner;
}

interface JobRow { task_identifier: string; attempts: number; max_attempts: number; last_error: string | null }
const queued = (): Promise<JobRow[]> =>
  inDatabase(database.superuserUrl, async (client) => (await client.query<JobRow>('SELECT * FROM graphile_worker.jobs ORDER BY id')).rows);

function mailTo(tx: Parameters<typeof queueMail>[0], dedupeKey: string): Promise<boolean> {
  return queueMail(tx, {
    schoolId: school.schoolId, toAccountId: school.studentId, template: 'loan-cancelled', dedupeKey,
    data: { loanId: randomUUID(), kit: { kitNumber: '014', neutralTitle: 'six cabochons' }, reason: 'by_student' },
  });
}

test('a job does not exist when the transaction that asked for it is rolled back', async () => {
  await expect(withSchoolSystem(db, school.schoolId, async (tx) => {
    await mailTo(tx, 'rolled-back');
    throw new Error('cause failed');
  })).rejects.toThrow('cause failed');
  expect(await queued()).toEqual([]);
});

test('several workers on one database do each job once', async () => {
  for (let batch = 0; batch < 10; batch += 1) {
    await withSchoolSystem(db, school.schoolId, async (tx) => {
      for (let index = 0; index < 20; index += 1) await mailTo(tx, `once-${batch}-${index}`);
    });
  }
  const deps = [testJobDeps(db), testJobDeps(db), testJobDeps(db)] as const;
  await Promise.all(deps.map((each) => work(each)));
  await until('200 mails sent', () => deps.reduce((sum, each) => sum + each.mail.sent.length, 0) >= 200);
  await until('the queue to be empty', async () => (await queued()).length === 0);
  const ids = deps.flatMap((each) => each.mail.sent.map((mail) => mail.messageId));
  expect(ids).toHaveLength(200);
  expect(new Set(ids).size).toBe(200);
});

test('a poisoned payload fails at once and for good, is logged, and the others go on', async () => {
  const poison = JSON.stringify({ mailId: 'anna@private.example', schoolId: school.schoolId, accountId: null });
  await withSystem(db, (tx) => tx.query(`SELECT jobs.enqueue_job('send-mail', $1::json, NULL, NULL, 16)`, [poison]));
  await withSchoolSystem(db, school.schoolId, (tx) => mailTo(tx, 'after-the-poison'));
  const deps = testJobDeps(db);
  await work(deps);
  await until('the healthy job', () => deps.mail.sent.length === 1);
  await until('the poisoned job to be marked', async () => (await queued()).every((job) => job.attempts === job.max_attempts));
  expect(await queued()).toEqual([expect.objectContaining({ task_identifier: 'send-mail', last_error: 'mailId should be a uuid' })]);
  const errors = deps.lines.filter((line) => line.includes('"level":50'));
  expect(errors).toHaveLength(1);
  expect(errors[0]).toContain('mailId should be a uuid');
  expect(deps.lines.join('')).not.toContain('private.example');
  await inDatabase(database.queueUrl, (client) => client.query('DELETE FROM graphile_worker._private_jobs'));
});

test('a payload that is not what the job carries is refused before it is written', async () => {
  await withSystem(db, async (tx) => {
    expect(() => enqueue(tx, 'send-mail', { mailId: 'no', schoolId: null, accountId: null })).toThrow('mailId should be a uuid');
  });
  expect(await queued()).toEqual([]);
});

test('a job that is stopped half-way is finished by the next worker', async () => {
  await withSchoolSystem(db, school.schoolId, (tx) => mailTo(tx, 'half-way'));
  const first = testJobDeps(db);
  first.mail.answer = () => { throw new Error('cut off'); };
  const runner = await work(first);
  await until('the first try', () => first.mail.attempts === 1);
  await runner.stop();
  expect(await queued()).toHaveLength(1);
  await inDatabase(database.queueUrl, (client) => client.query('UPDATE graphile_worker._private_jobs SET run_at = now()'));
  const second = testJobDeps(db);
  await work(second);
  await until('the second try', () => second.mail.sent.length === 1);
  await until('the queue to be empty', async () => (await queued()).length === 0);
});

test('the job of a worker that died is done by another within moments, not after hours', async () => {
  await withSchoolSystem(db, school.schoolId, (tx) => mailTo(tx, 'orphan'));
  await inDatabase(database.queueUrl, (client) =>
    client.query(`UPDATE graphile_worker._private_jobs SET attempts = 1, locked_by = 'pool-that-died', locked_at = now() - interval '11 seconds'`));
  const deps = testJobDeps(db);
  await work(deps);
  await until('the orphan', () => deps.mail.sent.length === 1);
  await until('the queue to be empty', async () => (await queued()).length === 0);
});

test('a job that is in the hands of a living worker is left to it', async () => {
  await withSchoolSystem(db, school.schoolId, (tx) => mailTo(tx, 'in-good-hands'));
  const slow = testJobDeps(db);
  let letGo = (): void => undefined;
  const held = new Promise<void>((resolve) => { letGo = resolve; });
  const living = await startRunner({ queueUrl: database.queueUrl, sweeps: false, deps: { ...slow, mail: { close: () => slow.mail.close(), send: () => held } } });
  runners.push(living);
  await until('the job to be taken', async () => (await queued()).some((job) => job.attempts === 1));
  await inDatabase(database.queueUrl, (client) => client.query(`UPDATE graphile_worker._private_jobs SET locked_at = now() - interval '1 minute'`));
  const other = testJobDeps(db);
  await work(other);
  await new Promise((resolve) => setTimeout(resolve, 500));
  expect(other.mail.attempts).toBe(0);
  letGo();
  await until('the queue to be empty', async () => (await queued()).length === 0);
});

test('stopping waits for the job in hand and takes no other', async () => {
  await withSchoolSystem(db, school.schoolId, (tx) => mailTo(tx, 'in-hand'));
  const deps = testJobDeps(db);
  let finished = false;
  const slow = { ...deps, mail: { close: () => deps.mail.close(), send: async () => {
    await new Promise((resolve) => setTimeout(resolve, 400));
    finished = true;
  } } };
  const runner = await startRunner({ queueUrl: database.queueUrl, deps: slow, pollIntervalMs: 100, sweeps: false });
  await until('the job to be taken', async () => (await queued()).some((job) => job.attempts === 1));
  await runner.stop();
  expect(finished).toBe(true);
  expect(await queued()).toEqual([]);
});

test('the sweep of every minute visits every school and leaves nothing behind', async () => {
  await makeMailSchool(database.superuserUrl, 'Saltpan School');
  await withSystem(db, (tx) => enqueue(tx, 'sweep-schools', {}));
  const deps = testJobDeps(db);
  await work(deps, true);
  await until('the queue to be empty', async () => (await queued()).length === 0);
  expect(deps.lines.filter((line) => line.includes('"level":50'))).toEqual([]);
});

test('the application role cannot reach the queue except through its doors', async () => {
  await expect(withSystem(db, (tx) => tx.query('SELECT * FROM graphile_worker.jobs'))).rejects.toThrow(/permission denied/);
  await expect(withSystem(db, (tx) => tx.query(`SELECT graphile_worker.add_job('send-mail')`))).rejects.toThrow(/permission denied/);
  await expect(withSystem(db, (tx) => tx.query(`SELECT jobs.enqueue_job('DROP TABLE', '{}', NULL, NULL, 3)`))).rejects.toThrow(/bad task name/);
});

test('health tells how many jobs wait, how long, and how many were given up', async () => {
  await withSchoolSystem(db, school.schoolId, (tx) => mailTo(tx, 'waiting'));
  const health = await withSystem(db, readQueueHealth);
  expect(health).toMatchObject({ ready: 1, failed: 0 });
  expect(health.waitedSeconds).toBeLessThan(60);
});
