import { withSchoolSystem } from '@/server/database/school';
import { depositOf } from '@/server/features/deposits/depositView';
import { settleDeposit } from '@/server/features/deposits/settle';
import { balances, makeWorld, openPage, paymentOf, readyToPay, takeOut, transfers, type World } from '../loans/world';
import { decide, lendForWeeks, serviceBooks, settlementState } from './support';

let world: World;
beforeEach(async () => { world = await makeWorld(); });
afterEach(() => world.close());

const deposit = (loanId: string) => withSchoolSystem(world.test.db, world.schoolId, (tx) => depositOf(tx, loanId, world.test.clock.now));

const cases = [
  { long: false, keep: 0, state: 'released', posted: ['hold_placed', 'hold_released'], kept: 0, money: 0 },
  { long: false, keep: 2500, state: 'part_kept', posted: ['hold_placed', 'hold_captured_kept'], kept: 2500, money: 2500 },
  { long: false, keep: 8000, state: 'kept', posted: ['hold_placed', 'hold_captured_kept'], kept: 8000, money: 8000 },
  { long: true, keep: 0, state: 'refunded', posted: ['deposit_charged', 'deposit_refunded'], kept: 0, money: 0 },
  { long: true, keep: 2500, state: 'part_kept', posted: ['deposit_charged', 'deposit_refunded', 'deposit_kept'], kept: 2500, money: 2500 },
  { long: true, keep: 8000, state: 'kept', posted: ['deposit_charged', 'deposit_kept'], kept: 8000, money: 8000 },
];

it.each(cases)('settles a deposit that was $posted.0 keeping $keep: $state, and the books agree with the service', async ({ long, keep, state, posted, kept, money }) => {
  if (long) await lendForWeeks(world);
  const loan = await takeOut(world, await world.kit());
  expect(loan.deposit.mode).toBe(long ? 'charge' : 'hold');
  await decide(world, loan.id, keep);
  expect(await settlementState(world, loan.id)).toBe('decided');
  await world.jobs();
  expect(await paymentOf(world, loan.id)).toMatchObject({ state });
  expect(await transfers(world, loan.id)).toEqual(posted);
  expect(await settlementState(world, loan.id)).toBe('done');
  expect(await deposit(loan.id)).toMatchObject({ state, keptMinor: kept, returnedMinor: 8000 - kept });
  expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: money });
  expect((await balances(world))['payment_service'] ?? 0).toBe(money);
});

it('decides a deposit once: the same decision again changes nothing, another is refused', async () => {
  const loan = await takeOut(world, await world.kit());
  await decide(world, loan.id, 2500);
  await decide(world, loan.id, 2500);
  await expect(decide(world, loan.id, 0)).rejects.toMatchObject({ status: 409, code: 'deposit_decided' });
  await world.jobs();
  await decide(world, loan.id, 2500);
  await expect(decide(world, loan.id, 8000)).rejects.toMatchObject({ code: 'deposit_decided' });
  await world.jobs();
  expect(await transfers(world, loan.id)).toEqual(['hold_placed', 'hold_captured_kept']);
  expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: 2500 });
});

it('refuses to keep more than the deposit, less than nothing or part of a cent', async () => {
  const loan = await takeOut(world, await world.kit());
  for (const keepMinor of [8001, -1, 0.5, Number.NaN]) {
    const tried = withSchoolSystem(world.test.db, world.schoolId, (tx) => settleDeposit(tx, loan.id, { keepMinor, actorId: null, now: world.test.clock.now }));
    await expect(tried).rejects.toMatchObject({ status: 422, errors: [{ field: 'keepMinor' }] });
  }
});

it('moves nothing when the transaction of the decision is rolled back', async () => {
  const loan = await takeOut(world, await world.kit());
  await expect(withSchoolSystem(world.test.db, world.schoolId, async (tx) => {
    await settleDeposit(tx, loan.id, { keepMinor: 0, actorId: null, now: world.test.clock.now });
    throw new Error('the settlement failed');
  })).rejects.toThrow('the settlement failed');
  await world.jobs();
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'held' });
});

it('finishes a settlement at once where no deposit was due', async () => {
  await world.test.rows(`UPDATE school SET deposit_rule = '{"kind":"fixed","amountMinor":0}' WHERE id = $1`, [world.schoolId]);
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  await decide(world, loan.id, 0);
  expect(await settlementState(world, loan.id)).toBe('done');
});
