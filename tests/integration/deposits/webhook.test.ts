import { randomUUID } from 'node:crypto';
import supertest from 'supertest';
import { as } from '@/tests/support/testApp';
import type { LoanView } from '@shared/api/loans';
import { makeWorld, mails, ok, openPage, payCard, paymentOf, readyToPay, transfers, type World } from '../loans/world';

let world: World;
beforeEach(async () => { world = await makeWorld({ notices: true }); });
afterEach(() => world.close());

const state = async (loanId: string): Promise<string> => ok<LoanView>(await as(world.test, world.student).get(`/loans/${loanId}`)).state;
const events = () => world.test.rows<{ id: string; type: string; outcome: string | null; done_at: Date | null }>('SELECT * FROM webhook_event ORDER BY received_at, id');

async function paidPage(): Promise<LoanView> {
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  await payCard(world, loan.id);
  await world.fake.control.webhooksIdle();
  return loan;
}

it('puts a kit out by the notice alone, when the student never comes back to the app', async () => {
  const loan = await paidPage();
  expect(await state(loan.id)).toBe('reserved');
  await world.jobs();
  expect(await state(loan.id)).toBe('out');
  expect((await events()).every((event) => event.done_at !== null)).toBe(true);
});

it('does everything once when each notice comes twice and in reverse order', async () => {
  world.fake.control.webhooks({ paused: true, doubled: true, reversed: true });
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  await payCard(world, loan.id);
  world.fake.control.releaseWebhooks();
  await world.fake.control.webhooksIdle();
  await world.jobs();
  const stored = await events();
  expect(stored.length).toBeGreaterThan(1);
  expect(world.fake.control.deliveries().filter((delivery) => delivery.status === 204).length).toBe(stored.length * 2);
  expect(await state(loan.id)).toBe('out');
  expect(await transfers(world, loan.id)).toEqual(['hold_placed']);
  expect(await mails(world, loan.id)).toEqual(['loan-started']);
});

it('refuses forged, unsigned and stale notices and takes none of them into the inbox', async () => {
  for (const signature of ['wrong', 'none', 'stale'] as const) {
    expect({ signature, status: await world.fake.control.forge({ signature }) }).toEqual({ signature, status: 400 });
  }
  const bare = await supertest(world.test.app).post('/api/v1/webhooks/stripe').set('Content-Type', 'application/json').send('{"id":"evt_1"}');
  expect(bare.body).toMatchObject({ status: 400, code: 'webhook_refused' });
  expect(await events()).toEqual([]);
});

it('puts a well-signed notice about an unknown object aside as not ours', async () => {
  expect(await world.fake.control.forge({ signature: 'right' })).toBe(204);
  await world.jobs();
  const [event] = await events();
  expect(event?.outcome).toBe('not ours');
  expect(event?.done_at).toBeInstanceOf(Date);
});

it('does not believe a payment object whose metadata names another school, loan or amount', async () => {
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  const payment = await paymentOf(world, loan.id);
  // Somebody with the service's key makes a page that names our payment but another school.
  const foreign = await world.payments.openDepositPage({
    paymentId: payment.id, schoolId: randomUUID(), loanId: loan.id, amountMinor: 100, currency: 'EUR', capture: 'charge', description: 'Deposit',
    returnUrl: 'http://localhost:8080/', cancelUrl: 'http://localhost:8080/', expiresAt: new Date(world.test.clock.now.getTime() + 3_600_000), idempotencyKey: randomUUID(),
  });
  await world.fake.control.pay({ sessionId: foreign.sessionId, cardNumber: '4242424242424242' });
  await world.fake.control.webhooksIdle();
  await world.jobs();
  expect(await state(loan.id)).toBe('reserved');
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'open' });
  expect((await events()).map((event) => event.outcome)).toContain('not ours');
});

it('leaves a notice in the inbox while the service cannot be asked, and works it off later', async () => {
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  await payCard(world, loan.id);
  await world.fake.control.webhooksIdle();
  world.fake.control.addFault({ kind: 'error', status: 503, times: null });
  await world.jobs();
  expect(await state(loan.id)).toBe('reserved');
  world.fake.control.clearFaults();
  for (const { id } of await events()) await world.job('payment-event', { eventId: id, paymentIntentId: null });
  expect(await state(loan.id)).toBe('out');
});
