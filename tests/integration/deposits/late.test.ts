import { as } from '@/tests/support/testApp';
import type { LoanView } from '@shared/api/loans';
import { balances, check, makeWorld, mails, ok, openPage, payCard, paymentOf, readyToPay, reserve, transfers, type World } from '../loans/world';
import { lendForWeeks, minuteMs, serviceBooks } from './support';

let world: World;
beforeEach(async () => { world = await makeWorld(); });
afterEach(() => world.close());

const state = async (loanId: string): Promise<LoanView> => ok<LoanView>(await as(world.test, world.student).get(`/loans/${loanId}`));

it('frees the kit of an abandoned reservation after its time, and closes its payment page', async () => {
  const kit = await world.kit();
  const loan = await readyToPay(world, kit);
  await openPage(world, loan.id);
  world.later(44 * minuteMs);
  await world.job('expire-reservations', { schoolId: world.schoolId });
  expect((await state(loan.id)).state).toBe('reserved');
  world.later(2 * minuteMs);
  await world.job('expire-reservations', { schoolId: world.schoolId });
  expect(await state(loan.id)).toMatchObject({ state: 'cancelled', cancelReason: 'abandoned' });
  await world.jobs();
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'cancelled' });
  const next = await world.test.person(['student'], world.schoolId);
  expect((await reserve(world, kit, next)).state).toBe('reserved');
});

it('gives whoever opens the payment page late enough time to pay', async () => {
  const loan = await readyToPay(world, await world.kit());
  world.later(44 * minuteMs);
  await openPage(world, loan.id);
  world.later(10 * minuteMs);
  await world.job('expire-reservations', { schoolId: world.schoolId });
  expect((await state(loan.id)).state).toBe('reserved');
  await payCard(world, loan.id);
  expect((await check(world, loan.id)).state).toBe('out');
});

it('lets a kit go out when it was paid in time and only the notice is late', async () => {
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  await payCard(world, loan.id);
  world.later(60 * minuteMs);
  await world.job('expire-reservations', { schoolId: world.schoolId });
  expect((await state(loan.id)).state).toBe('out');
});

it.each([false, true])('gives back a payment that completes after the loan was cancelled, and tells the student (charged: %s)', async (long) => {
  if (long) await lendForWeeks(world);
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  ok(await as(world.test, world.student).post(`/loans/${loan.id}/cancel`));
  // The student pays on the page in another tab before the job has closed it.
  expect(await payCard(world, loan.id)).toBe('done');
  await world.jobs();
  expect(await state(loan.id)).toMatchObject({ state: 'cancelled', deposit: { state: long ? 'refunded' : 'released', keptMinor: 0 } });
  expect(await transfers(world, loan.id)).toEqual(long ? ['deposit_charged', 'deposit_refunded'] : ['hold_placed', 'hold_released']);
  expect(await mails(world, loan.id)).toEqual(['loan-cancelled', 'payment-too-late']);
  expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: 0 });
  expect(Object.values(await balances(world)).every((sum) => sum === 0)).toBe(true);
});

it('opens a new page under a new key when the service closed the first', async () => {
  await world.test.rows('UPDATE school SET reservation_minutes = 1440 WHERE id = $1', [world.schoolId]);
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  world.later(23.5 * 60 * minuteMs);
  const gone = await as(world.test, world.student).post(`/loans/${loan.id}/payment`);
  expect(gone.body).toMatchObject({ status: 409, code: 'page_closed' });
  expect((await openPage(world, loan.id)).url).not.toBeNull();
  await payCard(world, loan.id);
  expect((await check(world, loan.id)).state).toBe('out');
  const rows = await world.test.rows<{ state: string }>('SELECT state FROM payment WHERE loan_id = $1 ORDER BY created_at', [loan.id]);
  expect(rows.map((row) => row.state)).toEqual(['cancelled', 'held']);
});
