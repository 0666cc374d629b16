import { randomUUID } from 'node:crypto';
import { type Database, openDatabase } from '@/server/database/data-source';
import { withAccount, withSchoolSystem } from '@/server/database/school';
import { type JobRunner, startRunner } from '@/server/jobs/runner';
import { createInbox } from '@/server/mail/inbox/createInbox';
import { MailRefused, MailUnavailable } from '@/server/mail/mail.port';
import type { MailData, SchoolMailTemplate } from '@/server/mail/mailData';
import { queueMail } from '@/server/mail/queueMail';
import { createSmtpMail } from '@/server/mail/smtpMail';
import { createTestDatabase, type TestDatabase } from '@/tests/support/database';
import { testJobDeps } from '@/tests/support/mail/jobDeps';
import { samples, schoolTemplates as templates } from '@/tests/support/mail/samples';
import { inDatabase, type MailSchool, makeMailSchool, until } from '@/tests/support/mail/school';

let database: TestDatabase;
let db: Database;
let school: MailSchool;
let runner: JobRunner | undefined;

beforeAll(async () => {
  database = await createTestDatabase();
  db = await openDatabase({ url: database.appUrl, poolSize: 6 });
  school = await makeMailSchool(database.superuserUrl);
});
afterEach(async () => {
  await runner?.stop();
  runner = undefined;
});
afterAll(async () => {
  await db.close();
  await database.drop();
});

interface MailRow { state: string; failure: string | null; data: Record<string, unknown>; sent_at: Date | null }
const rows = (dedupe: string): Promise<MailRow[]> => inDatabase(database.superuserUrl, async (client) =>
  (await client.query<MailRow>('SELECT * FROM mail WHERE dedupe_key LIKE $1 ORDER BY created_at', [`%${dedupe}%`])).rows);
const retryNow = () => inDatabase(database.queueUrl, (client) => client.query('UPDATE graphile_worker._private_jobs SET run_at = now() WHERE locked_at IS NULL'));

async function work(deps: ReturnType<typeof testJobDeps>): Promise<void> {
  runner = await startRunner({ queueUrl: database.queueUrl, deps, pollIntervalMs: 50, sweeps: false });
}

function returned(dedupeKey: string): Promise<boolean> {
  return withSchoolSystem(db, school.schoolId, (tx) => queueMail(tx, { schoolId: school.schoolId, toAccountId: school.studentId, template: 'kit-returned', data: samples['kit-returned'], dedupeKey }));
}

test('a mail is sent to the account’s address under a stable Message-ID, and marked', async () => {
  expect(await returned('plain')).toBe(true);
  const deps = testJobDeps(db);
  await work(deps);
  await until('the mark', async () => (await rows('plain'))[0]?.state === 'sent');
  expect(deps.mail.sent).toEqual([expect.objectContaining({ to: school.studentEmail, subject: 'Kit 014 is in the return box', messageId: expect.stringMatching(/^<[0-9a-f-]{36}@lend\.portellery\.example>$/) as string })]);
  expect((await rows('plain'))[0]?.sent_at).not.toBeNull();
});

test('the same occasion is mailed once to each addressee, whatever happens at the same time', async () => {
  const made = await Promise.all(Array.from({ length: 8 }, () => returned('twice')));
  expect(made.filter(Boolean)).toHaveLength(1);
  expect(await rows('twice')).toHaveLength(1);
});

test('an outage is waited out: tried again under the same Message-ID, sent once, nothing lost', async () => {
  await returned('outage');
  const deps = testJobDeps(db);
  const tries = new Map<string, number>();
  deps.mail.answer = ({ messageId }) => {
    const count = (tries.get(messageId) ?? 0) + 1;
    tries.set(messageId, count);
    if (count < 3) throw new MailUnavailable('the mail could not be handed over (no reply ECONNECTION)');
  };
  await work(deps);
  await until('two failures and a success', async () => {
    await retryNow();
    return (await rows('outage'))[0]?.state === 'sent';
  });
  const ids = deps.mail.sent.map((mail) => mail.messageId);
  expect(new Set(ids).size).toBe(ids.length);
  expect([...tries.values()].every((count) => count === 3)).toBe(true);
});

test('a refused address is recorded as failed, not tried again, and named in no log', async () => {
  await returned('refused');
  const deps = testJobDeps(db);
  deps.mail.answer = () => { throw new MailRefused('the mail server refused for good (550 EENVELOPE)'); };
  await work(deps);
  await until('the record', async () => (await rows('refused'))[0]?.state === 'failed');
  expect((await rows('refused'))[0]?.failure).toBe('the mail server refused for good (550 EENVELOPE)');
  expect(deps.mail.attempts).toBe(1);
  expect(deps.lines.join('')).not.toContain('@portellery.example');
  expect(deps.lines.join('')).not.toContain('Ida Marl');
});

test('the last try that fails is recorded, so that nobody waits for a mail that will not come', async () => {
  await returned('last');
  await inDatabase(database.queueUrl, (client) => client.query('UPDATE graphile_worker._private_jobs SET max_attempts = 1'));
  const deps = testJobDeps(db);
  deps.mail.answer = () => { throw new MailUnavailable('the mail could not be handed over (421 ECONNECTION)'); };
  await work(deps);
  await until('the record', async () => (await rows('last'))[0]?.state === 'failed');
  expect((await rows('last'))[0]?.failure).toContain('421');
});

test('a person who is not of the school gets no mail of it', async () => {
  const other = await makeMailSchool(database.superuserUrl, 'Saltpan School');
  await withSchoolSystem(db, school.schoolId, (tx) => queueMail(tx, { schoolId: school.schoolId, toAccountId: other.studentId, template: 'kit-returned', data: samples['kit-returned'], dedupeKey: 'stranger' }));
  const deps = testJobDeps(db);
  await work(deps);
  await until('the record', async () => (await rows('stranger'))[0]?.state === 'failed');
  expect(deps.mail.sent).toEqual([]);
});

test('a school cannot put mail into another school’s outbox', async () => {
  const other = await makeMailSchool(database.superuserUrl, 'Third School');
  await expect(withSchoolSystem(db, school.schoolId, (tx) =>
    queueMail(tx, { schoolId: other.schoolId, toAccountId: other.studentId, template: 'kit-returned', data: samples['kit-returned'], dedupeKey: 'foreign' }))).rejects.toThrow(/row-level security/);
});

test('the secret of a link is gone from the database once its mail is sent', async () => {
  await withAccount(db, school.studentId, (tx) => queueMail(tx, { toAccountId: school.studentId, template: 'password-reset', data: { token: 'very-secret', expiresAt: '2026-12-01T12:00:00Z' }, dedupeKey: 'reset' }));
  await withSchoolSystem(db, school.schoolId, (tx) => queueMail(tx, { schoolId: school.schoolId, toEmail: 'New.Person@portellery.example', template: 'invitation', data: { ...samples.invitation, token: 'very-secret-too' }, dedupeKey: 'invite' }));
  const deps = testJobDeps(db);
  await work(deps);
  await until('both to be sent', async () => (await Promise.all([rows('reset'), rows('invite')])).every(([row]) => row?.state === 'sent'));
  expect(deps.mail.sent.map((mail) => mail.to).sort()).toEqual(['new.person@portellery.example', school.studentEmail]);
  expect(deps.mail.sent.some((mail) => mail.text.includes('/invitation/very-secret-too'))).toBe(true);
  expect(JSON.stringify([await rows('reset'), await rows('invite')])).not.toContain('very-secret');
  expect(deps.lines.join('')).not.toContain('very-secret');
});

test('data that does not fit its template fails for good at once and says which', async () => {
  await withSchoolSystem(db, school.schoolId, (tx) => queueMail(tx, { schoolId: school.schoolId, toAccountId: school.studentId, template: 'kit-returned', data: { ...samples['kit-returned'], returnedAt: 'soon' }, dedupeKey: 'unfit' }));
  const deps = testJobDeps(db);
  await work(deps);
  await until('the record', async () => (await rows('unfit'))[0]?.state === 'failed');
  expect((await rows('unfit'))[0]?.failure).toBe('the data does not fit the template kit-returned');
});

test('every kind of mail goes from the outbox through SMTP into the inbox', async () => {
  const inbox = await createInbox({ smtpPort: 0, httpPort: 0 });
  const mail = createSmtpMail({ smtpUrl: `smtp://127.0.0.1:${inbox.smtpPort}`, from: 'Portellery School <kits@portellery.example>' });
  await withSchoolSystem(db, school.schoolId, async (tx) => {
    for (const template of templates) {
      const request = { schoolId: school.schoolId, toAccountId: school.studentId, template, data: samples[template], dedupeKey: `all:${template}:${randomUUID()}` };
      await queueMail(tx, request as { [T in SchoolMailTemplate]: typeof request & { template: T; data: MailData[T] } }[SchoolMailTemplate]);
    }
  });
  runner = await startRunner({ queueUrl: database.queueUrl, deps: { ...testJobDeps(db), mail }, pollIntervalMs: 50, sweeps: false });
  await until('all mails', () => inbox.messages().length >= templates.length);
  expect(inbox.messages().every((message) => message.to[0] === school.studentEmail && message.html.includes('<h1') && message.text.length > 100)).toBe(true);
  await runner.stop();
  await mail.close();
  await inbox.close();
});

test('a mail server that is not there, refuses the address or asks to wait is told apart', async () => {
  const nobody = createSmtpMail({ smtpUrl: 'smtp://127.0.0.1:9', from: 'a@portellery.example' });
  const letter = { messageId: '<x@y>', to: 'private.person@portellery.example', subject: 's', text: 't', html: '<p>t</p>' };
  await expect(nobody.send(letter)).rejects.toThrow(MailUnavailable);
  await expect(nobody.send(letter)).rejects.not.toThrow(/private/);
  await nobody.close();
  const { SMTPServer } = await import('smtp-server');
  for (const [code, kind] of [[550, MailRefused], [451, MailUnavailable]] as const) {
    const server = new SMTPServer({ authOptional: true, disabledCommands: ['STARTTLS', 'AUTH'], onRcptTo: (address, _session, done) => done(Object.assign(new Error(`no ${address.address}`), { responseCode: code })) });
    await new Promise<void>((resolve) => { server.listen(0, '127.0.0.1', resolve); });
    const address = server.server.address();
    const port = createSmtpMail({ smtpUrl: `smtp://127.0.0.1:${typeof address === 'object' && address ? address.port : 0}`, from: 'a@portellery.example' });
    const failure = await port.send(letter).catch((error: unknown) => error);
    expect(failure).toBeInstanceOf(kind);
    expect(String(failure)).not.toContain('private');
    await port.close();
    await new Promise<void>((resolve) => { server.close(() => resolve()); });
  }
});
