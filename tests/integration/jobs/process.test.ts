import { spawn } from 'node:child_process';
import path from 'node:path';
import { type Database, openDatabase } from '@/server/database/data-source';
import { withSchoolSystem } from '@/server/database/school';
import { createInbox, type Inbox } from '@/server/mail/inbox/createInbox';
import { queueMail } from '@/server/mail/queueMail';
import { createTestDatabase, type TestDatabase } from '@/tests/support/database';
import { samples } from '@/tests/support/mail/samples';
import { type MailSchool, makeMailSchool, until } from '@/tests/support/mail/school';

const root = path.join(__dirname, '..', '..', '..');
const healthPort = 18_510;

let database: TestDatabase;
let db: Database;
let school: MailSchool;
let inbox: Inbox;

beforeAll(async () => {
  database = await createTestDatabase();
  db = await openDatabase({ url: database.appUrl, poolSize: 2 });
  school = await makeMailSchool(database.superuserUrl);
  inbox = await createInbox({ smtpPort: 0, httpPort: 0 });
});
afterAll(async () => {
  await inbox.close();
  await db.close();
  await database.drop();
});

function startWorker(environment: Record<string, string>) {
  const child = spawn(process.execPath, ['-r', './docker-free-scripts/register.cjs', 'server/jobs/main.ts'], { cwd: root, env: { ...process.env, ...environment }, stdio: ['ignore', 'pipe', 'pipe'] });
  let output = '';
  const heard = (part: Buffer): void => { output += part.toString(); };
  child.stdout.on('data', heard);
  child.stderr.on('data', heard);
  const exit = new Promise<number | null>((resolve) => { child.once('exit', resolve); });
  return { child, exit, output: () => output };
}

test('the worker process sends the outbox, tells its health, and ends on SIGTERM with nothing in hand', async () => {
  const worker = startWorker({
    ...database.environment, TRAYWARD_MODE: 'test', SMTP_URL: `smtp://127.0.0.1:${inbox.smtpPort}`, WORKER_PORT: String(healthPort),
    ACCESS_TOKEN_SECRET: 'test', STRIPE_SECRET_KEY: 'sk_test_none', STRIPE_WEBHOOK_SECRET: 'whsec_none', STRIPE_API_BASE: 'http://127.0.0.1:9',
  });
  try {
    await until('the worker to be ready', () => worker.output().includes('worker ready'), 45_000);
    expect((await fetch(`http://127.0.0.1:${healthPort}/health`)).status).toBe(200);
    await withSchoolSystem(db, school.schoolId, (tx) =>
      queueMail(tx, { schoolId: school.schoolId, toAccountId: school.studentId, template: 'kit-returned', data: samples['kit-returned'], dedupeKey: 'process' }));
    await until('the mail', () => inbox.messages().length === 1);
    worker.child.kill('SIGTERM');
    expect(await worker.exit).toBe(0);
    expect(worker.output()).toContain('worker stopped');
    expect(worker.output()).not.toContain(school.studentEmail);
  } finally {
    worker.child.kill('SIGKILL');
  }
}, 90_000);

test('a worker without its settings ends at once and says which are missing', async () => {
  const worker = startWorker({ TRAYWARD_MODE: 'production', DATABASE_URL: '', DATABASE_QUEUE_URL: '', SMTP_URL: '' });
  expect(await worker.exit).toBe(1);
  expect(worker.output()).toContain('DATABASE_QUEUE_URL is required');
}, 60_000);
