import { as } from '@/tests/support/testApp';
import type { LoanView, StaffLoanRow, StaffLoanView } from '@shared/api/loans';
import type { Page } from '@shared/api/common';
import { holding, makeWorld, mails, ok, reserve, takeOut, type World, type WorldKit } from './world';

let world: World;
beforeAll(async () => { world = await makeWorld(); });
afterAll(() => world.close());

const allSeen = (kit: WorldKit) => ({ stones: kit.stones.map((stone) => ({ stoneId: stone.id, state: 'seen' })) });

it('puts a kit in the return box with a word on every jar, and sends a receipt', async () => {
  const kit = await world.kit({ slots: ['A', 'B', 'C'] });
  const loan = await takeOut(world, kit);
  const [a, b, c] = kit.stones;
  const back = ok<LoanView>(await as(world.test, world.student).post(`/loans/${loan.id}/return`, {
    stones: [{ stoneId: a?.id, state: 'seen' }, { stoneId: b?.id, state: 'missing' }, { stoneId: c?.id, state: 'damaged', condition: 'a chip at the edge' }],
  }));
  expect(back).toMatchObject({ state: 'returned', actions: [] });
  expect(back.jars.map((jar) => jar.backState)).toEqual(['seen', 'missing', 'damaged']);
  expect(await mails(world, loan.id)).toEqual(['loan-started', 'kit-returned']);
});

it('refuses a return that leaves a jar unsaid, names one twice or says damage without words', async () => {
  const kit = await world.kit();
  const loan = await takeOut(world, kit);
  const [a, b] = kit.stones;
  const tries = [
    [[{ stoneId: a?.id, state: 'seen' }], 'stones', 'Scan jar B too'],
    [[{ stoneId: a?.id, state: 'seen' }, { stoneId: a?.id, state: 'seen' }], 'stones[1].stoneId', 'twice'],
    [[{ stoneId: a?.id, state: 'damaged' }, { stoneId: b?.id, state: 'seen' }], 'stones[0].condition', 'what is damaged'],
  ] as const;
  for (const [stones, field, words] of tries) {
    const answer = await as(world.test, world.student).post(`/loans/${loan.id}/return`, { stones });
    expect(answer.body).toMatchObject({ status: 422, errors: [{ field, message: holding(words) }] });
  }
  expect(ok<LoanView>(await as(world.test, world.student).get(`/loans/${loan.id}`)).state).toBe('out');
});

it('returns a loan once however many phones say so at the same time', async () => {
  const kit = await world.kit();
  const loan = await takeOut(world, kit);
  const answers = await Promise.all(Array.from({ length: 10 }, async () => as(world.test, world.student).post(`/loans/${loan.id}/return`, allSeen(kit))));
  expect(answers.filter((answer) => answer.status === 200)).toHaveLength(1);
  const refusals = answers.filter((answer) => answer.status === 409);
  expect(refusals).toHaveLength(9);
  expect(refusals[0]?.body).toMatchObject({ code: 'loan_state', detail: 'This loan is in the return box. What can be done now: begin the bench check.' });
});

it('says what would be allowed when a reserved kit is returned or an out one cancelled', async () => {
  const kit = await world.kit();
  const loan = await reserve(world, kit);
  const early = await as(world.test, world.student).post(`/loans/${loan.id}/return`, allSeen(kit));
  expect(early.body).toMatchObject({ status: 409, detail: holding('take it out, or cancel it') });
  const out = await takeOut(world, await world.kit());
  const late = await as(world.test, world.student).post(`/loans/${out.id}/cancel`);
  expect(late.body).toMatchObject({ status: 409, detail: holding('bring it back') });
});

it('lets staff bring a kit back for a student', async () => {
  const kit = await world.kit();
  const loan = await takeOut(world, kit);
  expect(ok<LoanView>(await as(world.test, world.instructor).post(`/loans/${loan.id}/return`, allSeen(kit))).state).toBe('returned');
});

it('lists loans for staff with the borrower and the true title, by state', async () => {
  const kit = await world.kit();
  const loan = await takeOut(world, kit);
  const page = ok<Page<StaffLoanRow>>(await as(world.test, world.instructor).get('/staff/loans?state=out&limit=200'));
  expect(page.items.every((row) => row.state === 'out')).toBe(true);
  expect(page.items.find((row) => row.id === loan.id)).toMatchObject({ title: 'Pleochroism teaching set', borrower: { name: 'Sam Student' }, depositState: 'held' });
  const view = ok<StaffLoanView>(await as(world.test, world.instructor).get(`/staff/loans/${loan.id}`));
  expect(view.custody.map((event) => event.kind)).toContain('kit_out');
});

it('pages through loans without losing or repeating one', async () => {
  const seen: string[] = [];
  let cursor: string | null = null;
  do {
    const page: Page<StaffLoanRow> = ok(await as(world.test, world.admin).get(`/staff/loans?limit=2${cursor === null ? '' : `&cursor=${cursor}`}`));
    seen.push(...page.items.map((row) => row.id));
    cursor = page.nextCursor;
  } while (cursor !== null);
  const all = await world.test.rows<{ id: string }>('SELECT id FROM loan');
  expect([...seen].sort()).toEqual(all.map((row) => row.id).sort());
  expect(new Set(seen).size).toBe(seen.length);
});

it('calls a loan overdue from the minute it is due', async () => {
  const loan = await takeOut(world, await world.kit());
  expect(loan.overdue).toBe(false);
  world.later(Date.parse(loan.dueAt) - world.test.clock.now.getTime() + 1);
  expect(ok<LoanView>(await as(world.test, world.student).get(`/loans/${loan.id}`)).overdue).toBe(true);
});
