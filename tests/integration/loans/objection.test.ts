import { as } from '@/tests/support/testApp';
import type { LoanView } from '@shared/api/loans';
import { makeWorld, ok, takeOut, type World } from './world';
import { dayMs, decide } from '../deposits/support';

let world: World;
beforeAll(async () => { world = await makeWorld(); });
afterAll(() => world.close());

/** A settled loan of which something is kept for jar A, found different by two readers. */
async function kept(keepMinor = 2500): Promise<LoanView> {
  const kit = await world.kit();
  const loan = await takeOut(world, kit);
  await decide(world, loan.id, keepMinor);
  await world.test.rows("UPDATE loan_stone SET ending = CASE slot WHEN 'A' THEN 'different' ELSE 'same' END, ended_at = now() WHERE loan_id = $1", [loan.id]);
  if (keepMinor > 0) {
    await world.test.rows("INSERT INTO settlement_item (school_id, loan_id, stone_id, reason, amount_minor) VALUES ($1, $2, $3, 'Another stone is in jar A.', $4)",
      [world.schoolId, loan.id, kit.stones[0]?.id, keepMinor]);
  }
  return ok<LoanView>(await as(world.test, world.student).get(`/loans/${loan.id}`));
}

it('shows a borrower what is kept, why and until when they may object; a finding only for the stone money is kept for', async () => {
  const loan = await kept();
  expect(loan.actions).toEqual(['object']);
  expect(loan.outcome).toMatchObject({ keptMinor: 2500, releasedMinor: 5500, items: [{ slot: 'A', amountMinor: 2500 }] });
  expect(loan.outcome?.stones.map((stone) => ({ slot: stone.slot, told: stone.finding !== null }))).toEqual([{ slot: 'A', told: true }, { slot: 'B', told: false }]);
  expect(Date.parse(loan.outcome?.objectUntil ?? '')).toBe(world.test.clock.now.getTime() + 14 * dayMs);
});

it('takes one objection and tells the admins that there is one, not what it says', async () => {
  const loan = await kept();
  const objected = ok<LoanView>(await as(world.test, world.student).post(`/loans/${loan.id}/objection`, { text: 'I never opened jar A.' }));
  expect(objected.outcome?.objection).toMatchObject({ text: 'I never opened jar A.', answer: null });
  expect(objected.actions).toEqual([]);
  const again = await as(world.test, world.student).post(`/loans/${loan.id}/objection`, { text: 'Once more.' });
  expect(again.body).toMatchObject({ status: 409, code: 'objected' });
  const [mail] = await world.test.rows<{ to_account_id: string; data: object }>("SELECT * FROM mail WHERE template = 'objection-made' AND data->>'loanId' = $1", [loan.id]);
  expect(mail?.to_account_id).toBe(world.admin.accountId);
  expect(JSON.stringify(mail?.data)).not.toContain('never opened');
});

it('takes an objection until the last moment of its time and none after', async () => {
  const loan = await kept();
  world.later(14 * dayMs + 1);
  const late = await as(world.test, world.student).post(`/loans/${loan.id}/objection`, { text: 'Too late now.' });
  expect(late.body).toMatchObject({ status: 409, code: 'nothing_to_object' });
});

it('offers no objection where nothing was kept, nor before anything was decided, nor to staff for the borrower', async () => {
  const nothingKept = await kept(0);
  expect(nothingKept.actions).toEqual([]);
  for (const id of [nothingKept.id, (await takeOut(world, await world.kit())).id]) {
    expect((await as(world.test, world.student).post(`/loans/${id}/objection`, { text: 'Not so.' })).body).toMatchObject({ code: 'nothing_to_object' });
  }
  expect((await as(world.test, world.admin).post(`/loans/${(await kept()).id}/objection`, { text: 'For the student.' })).status).toBe(403);
});
