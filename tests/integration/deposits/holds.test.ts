import { as } from '@/tests/support/testApp';
import type { LoanView } from '@shared/api/loans';
import { makeWorld, mails, ok, paymentOf, takeOut, transfers, type World } from '../loans/world';
import { dayMs, decide, serviceBooks, settlementState } from './support';

let world: World;
beforeEach(async () => { world = await makeWorld(); });
afterEach(() => world.close());

const watch = () => world.job('watch-holds', { schoolId: world.schoolId });
const view = async (loanId: string): Promise<LoanView> => ok<LoanView>(await as(world.test, world.student).get(`/loans/${loanId}`));

it('leaves a hold alone that has more than a day to go', async () => {
  const loan = await takeOut(world, await world.kit());
  world.later(5.9 * dayMs);
  await watch();
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'held' });
});

it('secures the whole deposit when a hold would lapse under an unsettled loan: charged, still the student’s', async () => {
  const loan = await takeOut(world, await world.kit());
  world.later(6.2 * dayMs);
  await watch();
  expect((await paymentOf(world, loan.id)).secured_at).not.toBeNull();
  const { deposit } = await view(loan.id);
  expect(deposit).toMatchObject({ mode: 'hold', state: 'charged', keptMinor: 0, captureBefore: null });
  expect(deposit.explanation).toContain('It is still yours');
  expect(await transfers(world, loan.id)).toEqual(['hold_placed', 'hold_secured']);
  expect(await mails(world, loan.id)).toEqual(['loan-started', 'hold-secured']);
  expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: 8000 });
  await decide(world, loan.id, 1000);
  await world.jobs();
  expect(await transfers(world, loan.id)).toEqual(['hold_placed', 'hold_secured', 'deposit_refunded', 'deposit_kept']);
  expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: 1000 });
});

it('secures once when two workers watch at the same moment and the watch runs again', async () => {
  const loan = await takeOut(world, await world.kit());
  world.later(6.2 * dayMs);
  await Promise.all([watch(), watch()]);
  await watch();
  expect(await transfers(world, loan.id)).toEqual(['hold_placed', 'hold_secured']);
});

it('does not secure a hold that is already decided', async () => {
  const loan = await takeOut(world, await world.kit());
  world.later(6.2 * dayMs);
  await decide(world, loan.id, 0);
  await watch();
  await world.jobs();
  expect(await transfers(world, loan.id)).toEqual(['hold_placed', 'hold_released']);
});

it('books a hold that lapsed in spite of all as ended, and lets the loan be settled with nothing kept', async () => {
  const loan = await takeOut(world, await world.kit());
  world.later(8 * dayMs);
  await world.fake.control.advanceClock(0);
  await watch();
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'released' });
  expect(await transfers(world, loan.id)).toEqual(['hold_placed', 'hold_released']);
  await expect(decide(world, loan.id, 500)).rejects.toMatchObject({ status: 409, code: 'deposit_gone' });
  await decide(world, loan.id, 0);
  expect(await settlementState(world, loan.id)).toBe('done');
});
