import { randomUUID } from 'node:crypto';
import { as, type TestPerson } from '@/tests/support/testApp';
import type { LoanView } from '@shared/api/loans';
import type { MoneyView } from '@shared/api/money';
import type { SettlementView } from '@shared/api/settlement';
import { serviceBooks, settlementState } from '../deposits/support';
import { makeWorld, mails, ok, paymentOf, takeOut, transfers, type World, type WorldKit } from './world';

let world: World;
let second: TestPerson;
const balance = randomUUID();
const caliper = randomUUID();
const refractometer = randomUUID();

beforeAll(async () => {
  world = await makeWorld();
  second = await world.test.person(['instructor'], world.schoolId, 'Basil Second');
  for (const [id, kind, u] of [[balance, 'balance', 0.004], [caliper, 'caliper', 0.012], [refractometer, 'refractometer', 0.003]]) {
    await world.test.rows(
      'INSERT INTO instrument (id, school_id, kind, name, resolution, standard_uncertainty, spot_uncertainty) VALUES ($1, $2, $3, $3, $4, $4, 0.006)',
      [id, world.schoolId, kind, u]);
  }
});
afterAll(() => world.close());

/** The stone of the record as these tests invented it, and glass cut to look like it. */
const stones = {
  same: [['weight_ct', 1.567, balance], ['length_mm', 8.02, caliper], ['width_mm', 6.01, caliper], ['height_mm', 3.52, caliper], ['ri_spot', 1.62, refractometer]],
  glass: [['weight_ct', 1.104, balance], ['length_mm', 8.03, caliper], ['width_mm', 6.0, caliper], ['height_mm', 3.5, caliper], ['ri_spot', 1.52, refractometer], ['weight_ct', 1.105, balance], ['ri_spot', 1.522, refractometer]],
} as const;

const entries = (kind: keyof typeof stones) => ({
  readings: [...stones[kind].map(([attribute, value, instrumentId]) => ({ attribute, value, instrumentId })), { attribute: 'polariscope', category: kind === 'same' ? 'DR' : 'SR' }],
});

async function bringBack(kit: WorldKit): Promise<LoanView> {
  const loan = await takeOut(world, kit);
  ok(await as(world.test, world.student).post(`/loans/${loan.id}/return`, { stones: kit.stones.map((stone) => ({ stoneId: stone.id, state: 'seen' })) }));
  const bench = as(world.test, world.instructor);
  ok(await bench.post(`/bench/${loan.id}/opening`, { code: kit.code }));
  for (const stone of kit.stones) ok(await bench.post(`/bench/${loan.id}/jars`, { code: stone.code, state: 'seen' }));
  return loan;
}

const read = async (who: TestPerson, loanId: string, stoneId: string | undefined, kind: keyof typeof stones): Promise<void> => {
  ok(await as(world.test, who).post(`/bench/${loanId}/stones/${stoneId ?? ''}/readings`, entries(kind)));
};
const mine = async (loanId: string): Promise<LoanView> => ok<LoanView>(await as(world.test, world.student).get(`/loans/${loanId}`));

it('releases the hold by itself when every stone comes back as itself, and the kit can go out again', async () => {
  const kit = await world.kit();
  const loan = await bringBack(kit);
  for (const stone of kit.stones) await read(world.instructor, loan.id, stone.id, 'same');
  await world.jobs();
  expect(await mine(loan.id)).toMatchObject({ state: 'settled', deposit: { state: 'released', keptMinor: 0, returnedMinor: 8000 }, outcome: { state: 'done' } });
  expect(await transfers(world, loan.id)).toEqual(['hold_placed', 'hold_released']);
  expect(await mails(world, loan.id)).toEqual(['loan-started', 'kit-returned', 'deposit-released']);
  expect((await as(world.test, world.student).post('/loans', { code: kit.code })).status).toBe(201);
});

it('keeps part of a deposit for a swap that two readers found, once, and the student sees why', async () => {
  const kit = await world.kit();
  const loan = await bringBack(kit);
  const [swapped, kept] = kit.stones;
  await read(world.instructor, loan.id, swapped?.id, 'glass');
  await read(world.instructor, loan.id, kept?.id, 'same');
  ok(await as(world.test, world.instructor).post(`/bench/${loan.id}/stones/${swapped?.id ?? ''}/second-reading`));
  await read(second, loan.id, swapped?.id, 'glass');
  const view = ok<SettlementView>(await as(world.test, world.admin).get(`/settlements/${loan.id}`));
  expect(view).toMatchObject({ ready: true });
  const items = [{ stoneId: swapped?.id, reason: 'Another stone is in jar A.', amountMinor: 4000 }];
  const decisions = await Promise.all([1, 2].map(async () => as(world.test, world.admin).post(`/settlements/${loan.id}/decision`, { items })));
  expect(decisions.map((answer) => answer.status).sort()).toEqual([200, 409]);
  await world.jobs();
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'part_kept' });
  expect(await settlementState(world, loan.id)).toBe('done');
  const { outcome, deposit, actions } = await mine(loan.id);
  expect(deposit).toMatchObject({ state: 'part_kept', keptMinor: 4000, returnedMinor: 4000 });
  expect(outcome).toMatchObject({ keptMinor: 4000, items: [{ reason: 'Another stone is in jar A.', slot: 'A' }] });
  expect(outcome?.stones[0]?.finding).toContain('topaz');
  expect(outcome?.stones[1]?.finding).toBeNull();
  expect(actions).toEqual(['object']);
  expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: 4000 });
  expect(ok<MoneyView>(await as(world.test, world.admin).get('/money'))).toMatchObject({ keptMinor: 4000, ledgerSumMinor: 0, unfinishedSteps: 0 });
  const again = await as(world.test, world.student).post('/loans', { code: kit.code });
  expect(again.body).toMatchObject({ status: 409, code: 'kit_not_lendable' });
});
