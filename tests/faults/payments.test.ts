import { as } from '@/tests/support/testApp';
import type { LoanView } from '@shared/api/loans';
import { cuttable, dayMs, decide, minuteMs, serviceBooks, settlementState } from '../integration/deposits/support';
import { balances, holding, makeWorld, mails, ok, openPage, payCard, paymentOf, readyToPay, takeOut, transfers, type World } from '../integration/loans/world';

let world: World;
const line = cuttable();

beforeEach(async () => {
  line.cuts.length = 0;
  line.calls.length = 0;
  world = await makeWorld({ wrap: line.wrap });
});
afterEach(() => world.close());

const state = async (loanId: string): Promise<string> => ok<LoanView>(await as(world.test, world.student).get(`/loans/${loanId}`)).state;
const sweep = async (): Promise<void> => {
  world.later(2 * minuteMs);
  await world.job('finish-payments', { schoolId: world.schoolId });
};
const steps = async () => world.test.rows<{ kind: string; state: string }>('SELECT kind, state FROM payment_step ORDER BY created_at, kind');

it.each(['before', 'after'] as const)('goes on with the same page when the process is killed %s the service opened it', async (when) => {
  const loan = await readyToPay(world, await world.kit());
  line.cuts.push({ method: 'openDepositPage', when, left: 1 });
  expect((await as(world.test, world.student).post(`/loans/${loan.id}/payment`)).status).toBe(500);
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'opening', session_id: null });
  const { url } = await openPage(world, loan.id);
  expect(url).not.toBeNull();
  await payCard(world, loan.id);
  await sweep();
  expect(await state(loan.id)).toBe('out');
  expect(await world.test.rows('SELECT id FROM payment')).toHaveLength(1);
});

it('answers a retry with the same key after such a kill with the page, not with a second one', async () => {
  const loan = await readyToPay(world, await world.kit());
  line.cuts.push({ method: 'openDepositPage', when: 'after', left: 1 });
  const tryToPay = () => as(world.test, world.student).post(`/loans/${loan.id}/payment`).set('Idempotency-Key', 'the-same-key');
  expect((await tryToPay()).status).toBe(500);
  const second = await tryToPay();
  expect(second).toMatchObject({ status: 200, body: { url: holding('http') } });
  const third = await tryToPay();
  expect(third.headers).toMatchObject({ 'idempotency-hit': 'true' });
  expect(third.body).toEqual(second.body);
});

it('closes a page that was opened just before a kill, when its reservation lapses', async () => {
  const loan = await readyToPay(world, await world.kit());
  line.cuts.push({ method: 'openDepositPage', when: 'after', left: 1 });
  await as(world.test, world.student).post(`/loans/${loan.id}/payment`);
  world.later(60 * minuteMs);
  await world.job('expire-reservations', { schoolId: world.schoolId });
  await world.jobs();
  expect(await state(loan.id)).toBe('cancelled');
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'cancelled' });
  expect((await steps()).every((step) => step.state === 'done' || step.state === 'refused')).toBe(true);
});

it('puts the kit out by the sweep when the process is killed between the payment and its answer, once', async () => {
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  await payCard(world, loan.id);
  line.cuts.push({ method: 'readPayment', when: 'after', left: 1 });
  expect((await as(world.test, world.student).post(`/loans/${loan.id}/payment/check`)).status).toBe(500);
  expect(await state(loan.id)).toBe('reserved');
  await sweep();
  await sweep();
  expect(await state(loan.id)).toBe('out');
  expect(await transfers(world, loan.id)).toEqual(['hold_placed']);
  expect(await mails(world, loan.id)).toEqual(['loan-started']);
});

const settling = [
  { keep: 0, method: 'cancelHold', days: 3, final: 'released' },
  { keep: 3000, method: 'capture', days: 3, final: 'part_kept' },
  { keep: 8000, method: 'capture', days: 3, final: 'kept' },
  { keep: 0, method: 'refund', days: 30, final: 'refunded' },
  { keep: 3000, method: 'refund', days: 30, final: 'part_kept' },
] as const;

describe.each(settling)('settling by $method, keeping $keep', ({ keep, method, days, final }) => {
  it.each(['before', 'after'] as const)('is finished once by the sweep when the process is killed %s the call', async (when) => {
    await world.test.rows('UPDATE school SET loan_days = $1', [days]);
    const loan = await takeOut(world, await world.kit());
    await decide(world, loan.id, keep);
    line.cuts.push({ method, when, left: 1 });
    await world.jobs();
    expect(await settlementState(world, loan.id)).toBe('decided');
    await Promise.all([sweep(), sweep()]);
    await sweep();
    expect(await paymentOf(world, loan.id)).toMatchObject({ state: final });
    expect(await settlementState(world, loan.id)).toBe('done');
    expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: keep });
    const books = await balances(world);
    expect({ service: books['payment_service'] ?? 0, kept: 0 - (books['kept_deposits'] ?? 0) }).toEqual({ service: keep, kept: keep });
    expect(Object.values(books).reduce((sum, balance) => sum + balance, 0)).toBe(0);
  });

  it('is finished even when the sweep comes so late that the service has forgotten the keys', async () => {
    await world.test.rows('UPDATE school SET loan_days = $1', [days]);
    const loan = await takeOut(world, await world.kit());
    await decide(world, loan.id, keep);
    line.cuts.push({ method, when: 'after', left: 1 });
    await world.jobs();
    world.later(2 * dayMs);
    await world.fake.control.advanceClock(0);
    await sweep();
    expect(await paymentOf(world, loan.id)).toMatchObject({ state: final });
    expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: keep });
  });
});

it('pays back a payment that came too late even when the refunding process is killed', async () => {
  await world.test.rows('UPDATE school SET loan_days = 30');
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  ok(await as(world.test, world.student).post(`/loans/${loan.id}/cancel`));
  await payCard(world, loan.id);
  line.cuts.push({ method: 'refund', when: 'after', left: 1 });
  await world.jobs();
  await sweep();
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'refunded' });
  expect(line.calls.filter((call) => call === 'refund')).toHaveLength(1);
  expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: 0 });
});

it('says in words that the payment service is away, keeps the reservation, and opens the page later', async () => {
  const loan = await readyToPay(world, await world.kit());
  world.fake.control.addFault({ kind: 'dropped', times: null });
  const away = await as(world.test, world.student).post(`/loans/${loan.id}/payment`);
  expect(away).toMatchObject({ status: 503, body: { code: 'payment_service_away' } });
  world.fake.control.clearFaults();
  expect((await openPage(world, loan.id)).url).not.toBeNull();
});

it('loses nothing when the service does the work and its answer is lost on the line', async () => {
  const loan = await readyToPay(world, await world.kit());
  world.fake.control.addFault({ kind: 'lost-answer', path: '/checkout/sessions', times: null });
  expect((await as(world.test, world.student).post(`/loans/${loan.id}/payment`)).status).toBe(503);
  world.fake.control.clearFaults();
  await openPage(world, loan.id);
  await payCard(world, loan.id);
  await sweep();
  await decide(world, loan.id, 2000);
  world.fake.control.addFault({ kind: 'lost-answer', path: '/capture', times: 2 });
  await world.jobs();
  await sweep();
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'part_kept' });
  expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: 2000 });
});
