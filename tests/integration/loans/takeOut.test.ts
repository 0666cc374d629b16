import { as } from '@/tests/support/testApp';
import type { BrowseKit, LoanView } from '@shared/api/loans';
import type { Page, ProblemDocument } from '@shared/api/common';
import { cards, check, holding, makeWorld, mails, ok, openPage, payCard, paymentOf, readyToPay, reserve, takeOut, transfers, type World } from './world';

let world: World;
beforeAll(async () => { world = await makeWorld(); });
afterAll(() => world.close());

const custody = async (loanId: string): Promise<string[]> =>
  (await world.test.rows<{ kind: string }>('SELECT kind FROM custody_event WHERE loan_id = $1 ORDER BY seq', [loanId])).map((row) => row.kind);

it('takes a kit out: scan, jars, terms, deposit held, and out until closing time of the last day', async () => {
  const kit = await world.kit();
  const loan = await takeOut(world, kit);
  expect(loan.state).toBe('out');
  expect(loan.deposit).toMatchObject({ mode: 'hold', state: 'held', amountMinor: 8000 });
  expect(loan.deposit.captureBefore).not.toBeNull();
  expect(loan.actions).toEqual(['return']);
  expect(await custody(loan.id)).toEqual(['kit_reserved', 'jar_seen_out', 'jar_seen_out', 'terms_accepted', 'kit_out']);
  expect(await transfers(world, loan.id)).toEqual(['hold_placed']);
  expect(await mails(world, loan.id)).toEqual(['loan-started']);
});

it('gives one kit to exactly one of fifty who try at once, and tells the forty-nine others', async () => {
  const kit = await world.kit();
  const people = [world.student, ...(await Promise.all(Array.from({ length: 9 }, () => world.test.person(['student'], world.schoolId))))];
  const answers = await Promise.all(Array.from({ length: 50 }, async (_, index) => as(world.test, people[index % people.length]).post('/loans', { code: kit.code })));
  expect(answers.filter((answer) => answer.status === 201)).toHaveLength(1);
  const refusals = answers.filter((answer) => answer.status === 409).map((answer) => answer.body as ProblemDocument);
  expect(refusals).toHaveLength(49);
  for (const refusal of refusals) {
    expect(refusal.code).toBe('kit_taken');
    expect(refusal.detail).toMatch(new RegExp(`^Kit ${kit.number} (has just been taken|is yours already)`));
  }
  expect(await world.test.rows('SELECT id FROM loan WHERE kit_id = $1', [kit.id])).toHaveLength(1);
});

it('lets a declined card be followed by one that works, on the same page', async () => {
  const loan = await readyToPay(world, await world.kit());
  await openPage(world, loan.id);
  expect(await payCard(world, loan.id, cards.declined)).toBe('declined');
  expect(await check(world, loan.id)).toMatchObject({ state: 'reserved', actions: ['pay', 'cancel'] });
  await payCard(world, loan.id);
  expect((await check(world, loan.id)).state).toBe('out');
});

it('answers a second request to pay with the page that is open, and one after paying with the kit being out', async () => {
  const loan = await readyToPay(world, await world.kit());
  const first = await openPage(world, loan.id);
  expect((await openPage(world, loan.id)).url).toBe(first.url);
  await payCard(world, loan.id);
  expect(await openPage(world, loan.id)).toMatchObject({ url: null, loan: { state: 'out' } });
});

it('refuses to open the payment page before every jar was seen and the terms were accepted', async () => {
  const loan = await reserve(world, await world.kit());
  const early = await as(world.test, world.student).post(`/loans/${loan.id}/payment`);
  expect(early.status).toBe(409);
  expect(early.body).toMatchObject({ code: 'jars_unseen', detail: holding('jar A, B') });
});

it('puts a kit out at once where no deposit is due', async () => {
  await world.test.rows(`UPDATE school SET deposit_rule = '{"kind":"fixed","amountMinor":0}' WHERE id = $1`, [world.schoolId]);
  const loan = await readyToPay(world, await world.kit());
  expect(await openPage(world, loan.id)).toMatchObject({ url: null, loan: { state: 'out', deposit: { mode: 'none', state: 'none' } } });
  await world.test.rows(`UPDATE school SET deposit_rule = '{"kind":"fixed","amountMinor":8000}' WHERE id = $1`, [world.schoolId]);
});

it('names the right kit when a jar of another is scanned, and takes a double scan once', async () => {
  const [kit, other] = [await world.kit(), await world.kit()];
  const loan = await reserve(world, kit);
  const wrong = await as(world.test, world.student).post(`/loans/${loan.id}/jars`, { code: other.stones[0]?.code });
  expect(wrong.body).toMatchObject({ status: 422, code: 'other_kit', errors: [{ field: 'code', message: holding(`belongs to kit ${other.number}`) }] });
  const code = kit.stones[0]?.code;
  ok(await as(world.test, world.student).post(`/loans/${loan.id}/jars`, { code }));
  ok(await as(world.test, world.student).post(`/loans/${loan.id}/jars`, { code }));
  expect((await custody(loan.id)).filter((kind) => kind === 'jar_seen_out')).toHaveLength(1);
});

it('lets staff tick a jar without its label, and a student not', async () => {
  const kit = await world.kit();
  const loan = await reserve(world, kit);
  const stoneId = kit.stones[0]?.id;
  expect((await as(world.test, world.student).post(`/loans/${loan.id}/jars`, { stoneId })).status).toBe(403);
  const ticked = ok<LoanView>(await as(world.test, world.instructor).post(`/loans/${loan.id}/jars`, { stoneId }));
  expect(ticked.jars[0]?.outSeenAt).not.toBeNull();
});

it('stops the loan when a jar is not there: cancelled, kit set aside, admins told', async () => {
  const kit = await world.kit();
  const loan = await reserve(world, kit);
  const stopped = ok<LoanView>(await as(world.test, world.student).post(`/loans/${loan.id}/jars`, { stoneId: kit.stones[1]?.id, absent: true }));
  expect(stopped).toMatchObject({ state: 'cancelled', cancelReason: 'jar_absent' });
  expect(await world.test.rows('SELECT standing, standing_reason FROM kit WHERE id = $1', [kit.id])).toEqual([{ standing: 'set_aside', standing_reason: 'Jar B was not there at take-out' }]);
  expect(await custody(loan.id)).toEqual(['kit_reserved', 'jar_absent', 'loan_cancelled', 'kit_set_aside']);
  const told = await world.test.rows<{ id: string; template: string }>("SELECT to_account_id AS id, template FROM mail WHERE data->>'loanId' = $1 ORDER BY template", [loan.id]);
  expect(told).toEqual([{ id: world.admin.accountId, template: 'jar-absent' }, { id: world.student.accountId, template: 'loan-cancelled' }]);
  const again = await as(world.test, world.student).post('/loans', { code: kit.code });
  expect(again.body).toMatchObject({ status: 409, code: 'kit_not_lendable' });
});

it('frees a kit at once when its loan is cancelled, and closes the payment page', async () => {
  const kit = await world.kit();
  const loan = await readyToPay(world, kit);
  await openPage(world, loan.id);
  const cancelled = ok<LoanView>(await as(world.test, world.student).post(`/loans/${loan.id}/cancel`));
  expect(cancelled).toMatchObject({ state: 'cancelled', cancelReason: 'by_student' });
  const other = await world.test.person(['student'], world.schoolId);
  expect((await as(world.test, other).post('/loans', { code: kit.code })).status).toBe(201);
  await world.jobs();
  expect(await paymentOf(world, loan.id)).toMatchObject({ state: 'cancelled' });
  await expect(payCard(world, loan.id)).resolves.not.toBe('done');
});

it('lets staff take out for a student who has no phone, and cancel for them', async () => {
  const kit = await world.kit();
  const loan = ok<LoanView>(await as(world.test, world.instructor).post('/loans', { kitId: kit.id, borrowerId: world.student.accountId }));
  const cancelled = ok<LoanView>(await as(world.test, world.instructor).post(`/loans/${loan.id}/cancel`, { reason: 'changed their mind' }));
  expect(cancelled).toMatchObject({ state: 'cancelled', cancelReason: 'by_staff' });
  const forOther = await as(world.test, world.student).post('/loans', { kitId: kit.id, borrowerId: world.instructor.accountId });
  expect(forOther.status).toBe(403);
});

it('refuses terms that are no longer the current ones', async () => {
  const loan = await reserve(world, await world.kit());
  await world.test.rows("INSERT INTO terms_version (school_id, version, text) VALUES ($1, 2, 'Newer words.')", [world.schoolId]);
  const old = await as(world.test, world.student).post(`/loans/${loan.id}/terms`, { termsVersionId: loan.terms.versionId });
  expect(old.body).toMatchObject({ status: 409, code: 'terms_changed' });
});

it('shows a student the kits to take out under neutral titles, and whether each is free', async () => {
  const [free, taken] = [await world.kit(), await world.kit()];
  await reserve(world, taken);
  const page = ok<Page<BrowseKit>>(await as(world.test, world.student).get('/browse/kits?limit=200'));
  expect(page.items.find((kit) => kit.id === free.id)).toMatchObject({ available: true, stoneCount: 2, depositMinor: 8000, currency: 'EUR' });
  expect(page.items.find((kit) => kit.id === taken.id)).toMatchObject({ available: false });
});

it('keeps one student out of another student’s loan', async () => {
  const loan = await reserve(world, await world.kit());
  const other = await world.test.person(['student'], world.schoolId);
  for (const path of [`/loans/${loan.id}`, `/loans/${loan.id}/statement`]) expect((await as(world.test, other).get(path)).status).toBe(404);
  for (const action of ['jars', 'terms', 'cancel', 'return', 'payment', 'payment/check', 'objection']) {
    const bodies: Record<string, object> = { terms: { termsVersionId: loan.terms.versionId }, objection: { text: 'No.' }, return: { stones: loan.jars.map((jar) => ({ stoneId: jar.stoneId, state: 'seen' })) } };
    expect((await as(world.test, other).post(`/loans/${loan.id}/${action}`, bodies[action])).status).toBe(404);
  }
});
