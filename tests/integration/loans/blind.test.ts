import { as, type TestPerson } from '@/tests/support/testApp';
import { makeWorld, ok, openPage, payCard, readyToPay, secrets, sessionOf, takeOut, type World, type WorldKit } from './world';

let world: World;
beforeAll(async () => { world = await makeWorld(); });
afterAll(() => world.close());

function expectBlind(what: string, said: unknown): void {
  const text = JSON.stringify(said).toLowerCase();
  for (const secret of secrets) expect({ what, holds: text.includes(secret.toLowerCase()) ? secret : null }).toEqual({ what, holds: null });
}

/** Everything a borrower can ask for or do, with what came back. */
async function everyAnswer(kit: WorldKit, who: TestPerson): Promise<Record<string, unknown>> {
  const me = as(world.test, who);
  const answers: Record<string, unknown> = {};
  const keep = async (name: string, answer: PromiseLike<{ status: number; body: unknown }>): Promise<void> => { answers[name] = (await answer).body; };
  await keep('browse', me.get('/browse/kits'));
  await keep('jar as kit', me.post('/loans', { code: kit.stones[0]?.code }));
  const loan = await readyToPay(world, kit, who);
  answers['reserved'] = loan;
  await keep('taken', me.post('/loans', { code: kit.code }));
  await keep('payment', me.post(`/loans/${loan.id}/payment`));
  await payCard(world, loan.id);
  await keep('check', me.post(`/loans/${loan.id}/payment/check`));
  await keep('return', me.post(`/loans/${loan.id}/return`, { stones: kit.stones.map((stone) => ({ stoneId: stone.id, state: 'seen' })) }));
  await keep('mine', me.get('/loans'));
  await keep('one', me.get(`/loans/${loan.id}`));
  await keep('statement', me.get(`/loans/${loan.id}/statement`));
  await keep('objection', me.post(`/loans/${loan.id}/objection`, { text: 'I object.' }));
  await keep('staff list', me.get('/staff/loans'));
  await keep('staff view', me.get(`/staff/loans/${loan.id}`));
  return answers;
}

it('answers a student on every route of lending without species, title, marks or source', async () => {
  const answers = await everyAnswer(await world.kit(), world.student);
  expect(Object.keys(answers)).toHaveLength(13);
  for (const [what, said] of Object.entries(answers)) expectBlind(what, said);
});

it('is as blind to an instructor who borrows, and refuses them their staff view', async () => {
  const kit = await world.kit();
  const answers = await everyAnswer(kit, world.instructor);
  for (const [what, said] of Object.entries(answers)) if (what !== 'staff list') expectBlind(what, said);
  expect(answers['staff view']).toMatchObject({ status: 403, code: 'own_loan' });
  const { items } = answers['staff list'] as { items: { kitId: string; title: string }[] };
  expectBlind('own row', items.filter((row) => row.kitId === kit.id));
});

it('hides an unlendable kit’s reasons from students, who might learn a stone from them', async () => {
  const kit = await world.kit();
  await world.test.rows("INSERT INTO reading_strike (reading_id, school_id, struck_by, reason, struck_at) SELECT id, school_id, $2, 'slip of the pen', now() FROM reading WHERE stone_id = $1 AND attribute = 'ri_spot'",
    [kit.stones[0]?.id, world.admin.accountId]);
  const student = await as(world.test, world.student).post('/loans', { code: kit.code });
  expect(student.body).toMatchObject({ code: 'kit_not_lendable', detail: `Kit ${kit.number} cannot go out just now. Pick another kit, or ask at the desk.` });
});

it('sends mail and payment pages whose every word is neutral', async () => {
  const loan = await takeOut(world, await world.kit());
  const other = await readyToPay(world, await world.kit());
  const { url } = await openPage(world, other.id);
  await world.jobs();
  expect(world.deps.mail.sent.length).toBeGreaterThan(0);
  for (const mail of world.deps.mail.sent) expectBlind('mail', [mail.subject, mail.text, mail.html]);
  const page = await (await fetch(url ?? '')).text();
  expect(page).toContain(`Deposit for kit ${other.kitNumber}`);
  expectBlind('payment page', page);
  expectBlind('session', await world.payments.readSession(await sessionOf(world, other.id)));
  expectBlind('statement', ok(await as(world.test, world.student).get(`/loans/${loan.id}/statement`)));
});
