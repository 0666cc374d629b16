import { randomBytes, randomUUID } from 'node:crypto';
import { createServer, type RequestListener } from 'node:http';
import type { AddressInfo } from 'node:net';
import { runOnce } from 'graphile-worker';
import pino from 'pino';
import type { Response } from 'supertest';
import type { JobDeps, JobHandler } from '@/server/jobs/deps';
import { payloads, type JobName, type JobPayload } from '@/server/jobs/payloads';
import { tasks } from '@/server/jobs/tasks';
import { workerLogger } from '@/server/jobs/workerLogger';
import { createPaymentFake, type PaymentFake } from '@/server/payments/fake';
import type { PaymentPort } from '@/server/payments/payments.port';
import { createPaymentPort } from '@/server/payments/stripe.adapter';
import { makeLabelCode } from '@shared/codes';
import type { LoanView, OpenPaymentView } from '@shared/api/loans';
import { RecordingMail } from '@/tests/support/mail/recordingMail';
import { as, createTestApp, type TestApp, type TestPerson } from '@/tests/support/testApp';

export const webhookSecret = 'whsec_of_the_tests';
/** Stripe's published test cards, docs.stripe.com/testing. */
export const cards = { works: '4242424242424242', declined: '4000000000000002' } as const;

export interface WorldKit {
  id: string;
  number: string;
  code: string;
  stones: { id: string; slot: string; code: string }[];
}

/** What must never reach a borrower: the species, title, marks and source that every kit of these tests has. */
export const secrets = ['topaz', 'Pleochroism teaching set', 'inclusion near the girdle', 'estate of a jeweller', 'biaxial'];

/** A school that lends, with the payment fake and a clock that only tests move. */
export interface World {
  test: TestApp;
  fake: PaymentFake;
  payments: PaymentPort;
  deps: JobDeps & { mail: RecordingMail };
  schoolId: string;
  admin: TestPerson;
  instructor: TestPerson;
  student: TestPerson;
  /** Works the queue until nothing is due. */
  jobs(): Promise<void>;
  job<N extends JobName>(name: N, payload: JobPayload<N>): Promise<void>;
  later(ms: number): void;
  kit(options?: { slots?: string[]; schoolId?: string; by?: TestPerson }): Promise<WorldKit>;
  close(): Promise<void>;
}

export interface WorldOptions {
  /** Stands between the app and the service, to cut lines. */
  wrap?: (payments: PaymentPort) => PaymentPort;
  /** The fake's notices reach the app over HTTP; without it nobody hears of anything. */
  notices?: boolean;
}

export async function makeWorld({ wrap = (payments) => payments, notices = false }: WorldOptions = {}): Promise<World> {
  const clock = { now: () => new Date() };
  const inbox = notices ? await listen() : undefined;
  const fake = createPaymentFake({
    webhookSecret, wallClockMs: () => clock.now().getTime(), retryDelaysMs: [50, 50, 50, 50],
    ...(inbox === undefined ? {} : { webhookUrl: `${inbox.url}/api/v1/webhooks/stripe` }),
  });
  const { url: _url, ...apiBase } = await fake.start();
  const payments = wrap(createPaymentPort({ secretKey: 'sk_test_of_the_tests', webhookSecret, apiBase, timeoutMs: 5000, now: () => clock.now() }));
  // A fault of ours shows in the test's output, not only as a 500.
  const logger = pino({ level: 'error' }, pino.destination({ fd: 2, sync: true }));
  const test = await createTestApp({ dependencies: { payments, logger } });
  clock.now = () => test.clock.now;
  inbox?.serve(test.app);
  const schoolId = await test.school('Portellery School');
  const people = { admin: await test.person(['admin'], schoolId, 'Ada Admin'), instructor: await test.person(['instructor'], schoolId, 'Iris Instructor'), student: await test.person(['student'], schoolId, 'Sam Student') };
  const deps = { db: test.db, mail: new RecordingMail(), payments, publicUrl: test.config.publicUrl, now: () => test.clock.now, log: logger };
  return {
    test, fake, payments, deps, schoolId, ...people,
    jobs: () => workQueue(test, deps),
    job: (name, payload) => perform(deps, name, payload),
    later: (ms) => { test.clock.now = new Date(test.clock.now.getTime() + ms); },
    kit: (options) => makeKit(test, { slots: ['A', 'B'], schoolId, by: people.admin, ...options }),
    close: async () => {
      await fake.stop();
      await inbox?.close();
      await test.close();
    },
  };
}

/** A port that is known before the app that will answer on it. */
async function listen(): Promise<{ url: string; serve(app: RequestListener): void; close(): Promise<void> }> {
  let answer: RequestListener = (_request, response) => {
    response.writeHead(503).end();
  };
  const server = createServer((request, response) => {
    answer(request, response);
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  return {
    url: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    serve: (app) => { answer = app; },
    close: () => new Promise((resolve) => {
      server.close(() => resolve());
      server.closeAllConnections();
    }),
  };
}

function perform<N extends JobName>(deps: JobDeps, name: N, payload: JobPayload<N>): Promise<void> {
  const handler: JobHandler<JobPayload<N>> = tasks[name];
  return handler(deps, payload, { number: 1, isLast: false });
}

async function workQueue(test: TestApp, deps: JobDeps): Promise<void> {
  const names = Object.keys(tasks) as JobName[];
  const taskList = Object.fromEntries(names.map((name) => [name, (raw: unknown) => perform(deps, name, payloads[name](raw) as JobPayload<typeof name>)]));
  await runOnce({ connectionString: test.database.queueUrl, taskList, logger: workerLogger(), noHandleSignals: true });
}

let made = 0;

async function makeKit(test: TestApp, { slots, schoolId, by }: { slots: string[]; schoolId: string; by: TestPerson }): Promise<WorldKit> {
  made += 1;
  const kit = { id: randomUUID(), number: String(made).padStart(3, '0'), code: makeLabelCode(randomBytes(48)), stones: slots.map((slot) => ({ id: randomUUID(), slot, code: makeLabelCode(randomBytes(48)) })) };
  await test.rows('INSERT INTO kit (id, school_id, number, title, neutral_title) VALUES ($1, $2, $3, $4, $5)',
    [kit.id, schoolId, kit.number, 'Pleochroism teaching set', `Six cabochons, tray ${kit.number}`]);
  await label(test, { schoolId, kitId: kit.id, stoneId: null, code: kit.code, by });
  for (const stone of kit.stones) {
    await test.rows(
      `INSERT INTO stone (id, school_id, kit_id, slot, species, colour, shape, neutral_description, marks, source, replacement_value_minor)
       VALUES ($1, $2, $3, $4, 'topaz', 'blue', 'oval', 'pale blue oval, 8×6', 'inclusion near the girdle', 'estate of a jeweller', 4000)`,
      [stone.id, schoolId, kit.id, stone.slot]);
    await intake(test, schoolId, stone.id, by);
    await label(test, { schoolId, kitId: kit.id, stoneId: stone.id, code: stone.code, by });
  }
  return kit;
}

function label(test: TestApp, of: { schoolId: string; kitId: string; stoneId: string | null; code: string; by: TestPerson }): Promise<unknown> {
  return test.rows('INSERT INTO label (school_id, code, kit_id, stone_id, issued_by, issued_at) VALUES ($1, $2, $3, $4, $5, now())',
    [of.schoolId, of.code, of.kitId, of.stoneId, of.by.accountId]);
}

/** A record complete enough for a verdict; the figures are a topaz's, invented for the tests. */
async function intake(test: TestApp, schoolId: string, stoneId: string, by: TestPerson): Promise<void> {
  const numbers = { weight_ct: [1.566, 0.004], length_mm: [8.02, 0.012], width_mm: [6.01, 0.012], height_mm: [3.52, 0.015], ri_spot: [1.62, 0.006] };
  const insert = (attribute: string, value: number | null, category: string | null, u: number | null): Promise<unknown> => test.rows(
    `INSERT INTO reading (school_id, stone_id, purpose, reader_id, observer, attribute, value, category, u, u_instrument, taken_at)
     VALUES ($1, $2, 'intake', $3, 'instructor', $4, $5, $6, $7, $7, now())`,
    [schoolId, stoneId, by.accountId, attribute, value, category, u]);
  for (const [attribute, [value, u]] of Object.entries(numbers)) await insert(attribute, value ?? null, null, u ?? null);
  await insert('polariscope', null, 'DR', null);
  await insert('optic_figure', null, 'biaxial', null);
}

/** For `toMatchObject`: a text that holds these words. */
export const holding = (words: string): unknown => expect.stringContaining(words);

/** Unwraps an answer as the type its route declares, or fails with what the server said. */
// eslint-disable-next-line @typescript-eslint/no-unnecessary-type-parameters -- a body off the wire has no type of its own
export function ok<T>(response: Response): T {
  if (response.status >= 300) throw new Error(`${response.status} ${JSON.stringify(response.body)}`);
  return response.body as T;
}

export async function reserve(world: World, kit: WorldKit, who = world.student): Promise<LoanView> {
  return ok<LoanView>(await as(world.test, who).post('/loans', { code: kit.code }));
}

/** Reserves a kit, scans its jars and accepts the terms: ready to pay. */
export async function readyToPay(world: World, kit: WorldKit, who = world.student): Promise<LoanView> {
  const loan = await reserve(world, kit, who);
  for (const stone of kit.stones) ok(await as(world.test, who).post(`/loans/${loan.id}/jars`, { code: stone.code, condition: 'as it should be' }));
  return ok<LoanView>(await as(world.test, who).post(`/loans/${loan.id}/terms`, { termsVersionId: loan.terms.versionId }));
}

export async function openPage(world: World, loanId: string, who = world.student): Promise<OpenPaymentView> {
  return ok<OpenPaymentView>(await as(world.test, who).post(`/loans/${loanId}/payment`));
}

export async function sessionOf(world: World, loanId: string): Promise<string> {
  const [row] = await world.test.rows<{ session_id: string }>('SELECT session_id FROM payment WHERE loan_id = $1 ORDER BY created_at DESC LIMIT 1', [loanId]);
  if (row === undefined) throw new Error('no payment');
  return row.session_id;
}

export async function payCard(world: World, loanId: string, cardNumber: string = cards.works): Promise<string> {
  return (await world.fake.control.pay({ sessionId: await sessionOf(world, loanId), cardNumber })).kind;
}

export async function check(world: World, loanId: string, who = world.student): Promise<LoanView> {
  return ok<LoanView>(await as(world.test, who).post(`/loans/${loanId}/payment/check`));
}

/** The whole take-out: the kit is out and its deposit held or charged. */
export async function takeOut(world: World, kit: WorldKit, who = world.student): Promise<LoanView> {
  const loan = await readyToPay(world, kit, who);
  await openPage(world, loan.id, who);
  await payCard(world, loan.id);
  return check(world, loan.id, who);
}

export interface PaymentRow { id: string; mode: string; state: string; session_id: string | null; payment_intent_id: string | null; capture_before: Date | null; secured_at: Date | null }

export async function paymentOf(world: World, loanId: string): Promise<PaymentRow> {
  const [row] = await world.test.rows<PaymentRow>('SELECT * FROM payment WHERE loan_id = $1 ORDER BY created_at DESC LIMIT 1', [loanId]);
  if (row === undefined) throw new Error('no payment');
  return row;
}

/** Transfer kinds of a loan in the order posted. */
export async function transfers(world: World, loanId: string): Promise<string[]> {
  return (await world.test.rows<{ kind: string }>('SELECT kind FROM ledger_transfer WHERE loan_id = $1 ORDER BY seq', [loanId])).map((row) => row.kind);
}

/** Balances of the whole school by account. */
export async function balances(world: World): Promise<Record<string, number>> {
  const rows = await world.test.rows<{ kind: string; sum: string }>(
    'SELECT a.kind, sum(p.amount_minor) AS sum FROM ledger_posting p JOIN ledger_account a ON a.id = p.account_id GROUP BY a.kind');
  return Object.fromEntries(rows.map((row) => [row.kind, Number(row.sum)]));
}

export async function mails(world: World, loanId: string): Promise<string[]> {
  return (await world.test.rows<{ template: string }>("SELECT template FROM mail WHERE data->>'loanId' = $1 ORDER BY created_at", [loanId])).map((row) => row.template);
}
