import { openDatabase } from '@/server/database/data-source';
import { startRunner } from '@/server/jobs/runner';
import { until } from '@/tests/support/mail/school';
import { cuttable, decide, minuteMs, serviceBooks } from '../integration/deposits/support';
import { balances, makeWorld, reserve, takeOut, type World } from '../integration/loans/world';

let world: World;
const line = cuttable();
beforeAll(async () => { world = await makeWorld({ wrap: line.wrap }); });
afterAll(() => world.close());

const count = async (sql: string): Promise<number> => (await world.test.rows<{ count: string }>(sql)).map((row) => Number(row.count))[0] ?? 0;

it('does each thing once with two workers, calls that die under them, and the sweeps of two more', async () => {
  const keeps = [0, 1000, 8000, 0, 2500, 300];
  for (const keep of keeps) await decide(world, (await takeOut(world, await world.kit())).id, keep);
  line.cuts.push({ method: 'capture', when: 'after', left: 2 }, { method: 'cancelHold', when: 'before', left: 1 });
  const others = await openDatabase({ url: world.test.database.appUrl, poolSize: 6 });
  const deps = [world.deps, { ...world.deps, db: others }];
  const runners = await Promise.all(deps.map((one) => startRunner({ queueUrl: world.test.database.queueUrl, deps: one, concurrency: 3, pollIntervalMs: 100, sweeps: false })));
  try {
    await until('the first round of jobs', async () => line.cuts.every((cut) => cut.left === 0));
    world.later(2 * minuteMs);
    await Promise.all([1, 2].map(() => world.job('finish-payments', { schoolId: world.schoolId })));
    await until('all settlements done', async () => (await count("SELECT count(*) FROM settlement WHERE state = 'done'")) === keeps.length);
  } finally {
    await Promise.all(runners.map((runner) => runner.stop()));
    await others.close();
  }
  const kept = keeps.reduce((sum, keep) => sum + keep, 0);
  expect(serviceBooks(world)).toEqual({ heldMinor: 0, moneyMinor: kept });
  expect(await balances(world)).toMatchObject({ card_holds: 0, payment_service: kept, kept_deposits: -kept });
  expect(await count('SELECT count(*) FROM ledger_transfer')).toBe(2 * keeps.length);
  expect(await count("SELECT count(*) FROM payment_step WHERE state <> 'done'")).toBe(0);
});

it('gives each lapsed reservation back once when two workers sweep at the same moment', async () => {
  const loans = [];
  for (let index = 0; index < 4; index += 1) loans.push(await reserve(world, await world.kit()));
  world.later(60 * minuteMs);
  await Promise.all([1, 2, 3].map(() => world.job('expire-reservations', { schoolId: world.schoolId })));
  for (const loan of loans) {
    const events = await world.test.rows<{ kind: string }>("SELECT kind FROM custody_event WHERE loan_id = $1 AND kind = 'loan_cancelled'", [loan.id]);
    expect(events).toHaveLength(1);
  }
});
