import { randomUUID } from 'node:crypto';
import { withSchoolSystem } from '@/server/database/school';
import { balancesOf, ledgerSum, LedgerRefusal, post, reverse, type NewTransfer } from '@/server/ledger/ledger.service';
import { as } from '@/tests/support/testApp';
import type { MoneyView, StatementView } from '@shared/api/money';
import type { Movement } from '@shared/money';
import { balances, makeWorld, ok, paymentOf, takeOut, transfers, type World } from '../loans/world';
import { decide, lendForWeeks, serviceBooks } from '../deposits/support';

let world: World;
beforeAll(async () => { world = await makeWorld(); });
afterAll(() => world.close());

async function about(): Promise<Omit<NewTransfer, 'movement' | 'key'>> {
  const loan = await takeOut(world, await world.kit());
  return { schoolId: world.schoolId, loanId: loan.id, paymentId: (await paymentOf(world, loan.id)).id, currency: 'EUR', at: world.test.clock.now };
}
const inSchool = <T>(work: Parameters<typeof withSchoolSystem<T>>[2]): Promise<T> => withSchoolSystem(world.test.db, world.schoolId, work);
const posting = (of: Omit<NewTransfer, 'movement' | 'key'>, movement: Movement, key: string = randomUUID()): Promise<boolean> =>
  inSchool((tx) => post(tx, { ...of, movement, key }));

it('posts a key once, however often and however many at a time it is tried', async () => {
  const of = await about();
  const tries = await Promise.all(Array.from({ length: 8 }, () => posting(of, { kind: 'hold_released', amountMinor: 8000 }, 'one key')));
  expect(tries.filter(Boolean)).toHaveLength(1);
  expect(await transfers(world, of.loanId)).toEqual(['hold_placed', 'hold_released']);
});

it('refuses to both release and keep the same money, and leaves nothing of the attempt', async () => {
  const of = await about();
  await posting(of, { kind: 'hold_released', amountMinor: 8000 });
  for (const movement of [
    { kind: 'hold_captured_kept', amountMinor: 8000, keptMinor: 10 }, { kind: 'hold_released', amountMinor: 8000 },
    { kind: 'deposit_kept', amountMinor: 1 }, { kind: 'deposit_refunded', amountMinor: 1 }, { kind: 'hold_secured', amountMinor: 8000 },
  ] as const) await expect(posting(of, movement)).rejects.toBeInstanceOf(LedgerRefusal);
  expect(await transfers(world, of.loanId)).toEqual(['hold_placed', 'hold_released']);
});

it('corrects a transfer by another that undoes it, once', async () => {
  const of = await about();
  await posting(of, { kind: 'hold_released', amountMinor: 8000 }, `slip:${of.paymentId}`);
  const [slip] = await world.test.rows<{ id: string }>('SELECT id FROM ledger_transfer WHERE key = $1', [`slip:${of.paymentId}`]);
  const undo = () => inSchool((tx) => reverse(tx, { transferId: slip?.id ?? '', memo: 'posted to the wrong loan', at: world.test.clock.now }));
  expect(await undo()).toBe(true);
  expect(await undo()).toBe(false);
  expect(await inSchool((tx) => balancesOf(tx, { paymentId: of.paymentId }))).toMatchObject({ card_holds: 8000, holds_for_students: -8000 });
});

it('cannot be changed or removed by the application, nor by the owner by mistake', async () => {
  await about();
  for (const sql of ['UPDATE ledger_posting SET amount_minor = 1', 'DELETE FROM ledger_transfer', 'UPDATE ledger_account SET kind = kind']) {
    await expect(inSchool((tx) => tx.query(sql))).rejects.toThrow(/permission denied/);
  }
  await expect(world.test.rows('UPDATE ledger_posting SET amount_minor = 1')).rejects.toThrow(/append-only/);
  await expect(world.test.rows('DELETE FROM ledger_transfer')).rejects.toThrow(/append-only/);
});

it('refuses to commit a transfer that does not sum to zero, even by hand', async () => {
  const of = await about();
  const lopsided = inSchool(async (tx) => {
    const [account]: { id: string }[] = await tx.query("SELECT id FROM ledger_account WHERE kind = 'card_holds'");
    const id = randomUUID();
    await tx.query("INSERT INTO ledger_transfer (id, school_id, loan_id, payment_id, kind, key, at) VALUES ($1, $2, $3, $4, 'hold_placed', 'by hand', now())", [id, of.schoolId, of.loanId, of.paymentId]);
    for (const amount of [5, -4]) await tx.query("INSERT INTO ledger_posting (school_id, transfer_id, account_id, amount_minor, currency) VALUES ($1, $2, $3, $4, 'EUR')", [of.schoolId, id, account?.id, amount]);
  });
  await expect(lopsided).rejects.toThrow(/does not sum to zero/);
});

it('shows a school nothing of another school’s books', async () => {
  const elsewhere = await world.test.school('Saltpan School');
  expect(await withSchoolSystem(world.test.db, elsewhere, (tx) => balancesOf(tx, { currency: 'EUR' }))).toEqual({
    card_holds: 0, holds_for_students: 0, payment_service: 0, deposits_of_students: 0, kept_deposits: 0,
  });
});

it('sums to zero and equals the service’s books after a mixed day, and says so on the money screen', async () => {
  const clean = await makeWorld();
  try {
    const loans = [];
    for (const keep of [0, 2500, 8000]) {
      const loan = await takeOut(clean, await clean.kit());
      loans.push(loan);
      await decide(clean, loan.id, keep);
    }
    await lendForWeeks(clean);
    for (const keep of [0, 1500]) await decide(clean, (await takeOut(clean, await clean.kit())).id, keep);
    await takeOut(clean, await clean.kit());
    await clean.test.rows('UPDATE school SET loan_days = 3');
    await takeOut(clean, await clean.kit());
    await clean.jobs();
    const books = await balances(clean);
    expect(serviceBooks(clean)).toEqual({ heldMinor: books['card_holds'], moneyMinor: books['payment_service'] });
    const money = ok<MoneyView>(await as(clean.test, clean.admin).get('/money'));
    expect(money).toMatchObject({ currency: 'EUR', heldMinor: 8000, chargedMinor: 8000, keptMinor: 12_000, unfinishedSteps: 0, ledgerSumMinor: 0 });
    expect(money.deposits).toHaveLength(7);
    expect(await withSchoolSystem(clean.test.db, clean.schoolId, ledgerSum)).toBe(0);
    const statement = ok<StatementView>(await as(clean.test, clean.student).get(`/loans/${loans[1]?.id ?? ''}/statement`));
    expect(statement.lines.reduce((sum, one) => sum + one.amountMinor, 0)).toBe(0);
    expect(statement.balances).toEqual([{ account: 'With the payment service', amountMinor: 2500 }, { account: 'Kept by the school', amountMinor: -2500 }]);
    expect((await as(clean.test, clean.student).get('/money')).status).toBe(403);
  } finally {
    await clean.close();
  }
});
