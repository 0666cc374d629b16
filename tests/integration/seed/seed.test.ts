import { openDatabase, type Database } from '@/server/database/data-source';
import { portElleryKits } from '@/server/database/seed/demoKits';
import { demoPassword, demoPeople } from '@/server/database/seed/demoPeople';
import { seedDemo } from '@/server/database/seed/seedDemo';
import { trueWeightCt } from '@/server/database/seed/demoReadings';
import { withSchool, type SchoolActor } from '@/server/database/school';
import { Kit } from '@/server/features/kits/kit.entity';
import { listKits, getKit } from '@/server/features/kits/kits.service';
import { lendability } from '@/server/features/kits/lendability';
import { passwordMatches } from '@/server/features/sessions/passwords';
import { recordOf } from '@/server/features/stones/record';
import { computeVerdict } from '@shared/evidence';
import { STONE_COLOURS, type ReadingInput } from '@shared/api/evidence';
import { findSpecies, indexExtent } from '@shared/gem';
import { createTestDatabase, type TestDatabase } from '../../support/database';

let database: TestDatabase;
let owner: Database;
let app: Database;
const counted = ['school', 'account', 'membership', 'terms_version', 'instrument', 'kit', 'stone', 'reading', 'label', 'custody_event'];

async function counts(): Promise<Record<string, number>> {
  const rows = await Promise.all(counted.map((table) => owner.dataSource.query<{ n: number }[]>(`SELECT count(*)::int AS n FROM ${table}`)));
  return Object.fromEntries(counted.map((table, i) => [table, rows[i]?.[0]?.n ?? 0]));
}

async function actorOf(email: string): Promise<SchoolActor> {
  const [row] = await owner.dataSource.query<{ accountId: string; schoolId: string }[]>(
    'SELECT m.account_id AS "accountId", m.school_id AS "schoolId" FROM membership m JOIN account a ON a.id = m.account_id WHERE a.email = $1', [email]);
  if (row === undefined) throw new Error(`nobody has ${email}`);
  return row;
}

beforeAll(async () => {
  database = await createTestDatabase();
  owner = await openDatabase({ url: database.ownerUrl, poolSize: 1 });
  app = await openDatabase({ url: database.appUrl, poolSize: 2 });
  await seedDemo({ owner, app }, new Date());
});

afterAll(async () => {
  await app.close();
  await owner.close();
  await database.drop();
});

it('adds nothing when it runs again', async () => {
  const before = await counts();
  await seedDemo({ owner, app }, new Date());
  expect(await counts()).toEqual(before);
  expect(before).toMatchObject({ school: 2, account: 7, kit: 5, instrument: 12 });
});

it('goes on from where a broken-off start left the school without a catalogue', async () => {
  const fresh = await createTestDatabase();
  const own = await openDatabase({ url: fresh.ownerUrl, poolSize: 1 });
  try {
    const { seedSchool } = await import('@/server/database/seed/seedSchool');
    const { portEllery } = await import('@/server/database/seed/demoSchools');
    await seedSchool(own, { ...portEllery, people: portEllery.people.slice(0, 1) }, new Date());
    const application = await openDatabase({ url: fresh.appUrl, poolSize: 2 });
    await seedDemo({ owner: own, app: application }, new Date()).finally(() => application.close());
    const [{ n } = { n: 0 }] = await own.dataSource.query<{ n: number }[]>('SELECT count(*)::int AS n FROM kit');
    expect(n).toBe(5);
  } finally {
    await own.close();
    await fresh.drop();
  }
});

it('lets every demo person sign in with the one password', async () => {
  for (const { email } of [...demoPeople.portEllery, ...demoPeople.saltpan]) {
    const [row] = await owner.dataSource.query<{ password_hash: string }[]>('SELECT password_hash FROM account WHERE email = $1', [email]);
    expect(await passwordMatches(row?.password_hash, demoPassword)).toBe(true);
  }
});

it('leaves one kit incomplete and every other one ready to lend', async () => {
  const admin = await actorOf('admin@portellery.example');
  const { items } = await withSchool(app, admin, (tx) => listKits(tx, admin.accountId, {}));
  expect(items.map(({ number, place }) => [number, place])).toEqual([['009', 'shelf'], ['014', 'shelf'], ['021', 'shelf'], ['030', 'incomplete']]);
  const other = await actorOf('admin@saltpan.example');
  const saltpan = await withSchool(app, other, (tx) => listKits(tx, other.accountId, {}));
  expect(saltpan.items.map(({ number, place }) => [number, place])).toEqual([['001', 'shelf']]);
});

it('says in words what the incomplete kit lacks', async () => {
  const admin = await actorOf('admin@portellery.example');
  const answer = await withSchool(app, admin, async (tx) => lendability(tx, (await tx.findOneByOrFail(Kit, { number: '030' })).id));
  expect(answer.lendable).toBe(false);
  expect(answer.reasons.join(' ')).toMatch(/Stone B: .*polariscope.*Stone B: .*refractive index.*Stone C: /s);
});

it('gives every kit and jar a label', async () => {
  const admin = await actorOf('admin@portellery.example');
  await withSchool(app, admin, async (tx) => {
    for (const kit of await tx.find(Kit)) {
      const view = await getKit(tx, admin.accountId, kit.id);
      expect([view.label, ...view.stones.map(({ label }) => label)].every((label) => label !== null)).toBe(true);
    }
  });
});

const isColour = (word: string): boolean => STONE_COLOURS.some((colour) => colour === word);

it('describes no stone to students by its species, group or a title that gives it away', () => {
  for (const { neutralTitle, stones } of portElleryKits) {
    for (const { species, neutralDescription } of stones) {
      const row = findSpecies(species);
      const words = [species, ...(row?.name ?? '').split(/\W+/), row?.group ?? species].filter((word) => word.length > 3 && !isColour(word));
      for (const word of words) expect(`${neutralTitle} ${neutralDescription}`.toLowerCase()).not.toContain(word.toLowerCase());
    }
  }
});

it('keeps every true stone inside the printed ranges of its species', () => {
  for (const { stones } of portElleryKits) {
    for (const { species, sg, spot, flat, colour } of stones) {
      const row = findSpecies(species);
      if (row === undefined) throw new Error(species);
      const { low, high } = indexExtent(row);
      expect(row.colours).toContain(colour);
      expect(sg).toBeGreaterThanOrEqual(row.sg[0]);
      expect(sg).toBeLessThanOrEqual(row.sg[1]);
      for (const index of [typeof spot === 'number' ? spot : high[1], ...(flat ?? [])]) {
        expect(index).toBeGreaterThanOrEqual(low[0] - 0.005);
        expect(index).toBeLessThanOrEqual(high[1] + 0.005);
      }
    }
  }
});

describe('kit 014 on a clean return', () => {
  const cheap = (truth: (typeof portElleryKits)[number]['stones'][number]): ReadingInput[] => [
    { attribute: 'weight_ct', value: Number(trueWeightCt(truth).toFixed(2)), u: 0.006 },
    ...(['length_mm', 'width_mm', 'height_mm'] as const).map((attribute, i): ReadingInput => ({ attribute, value: truth.sizeMm[i] ?? 0, u: 0.014 })),
    { attribute: 'polariscope', value: truth.polariscope ?? 'DR' },
  ];

  it.each(portElleryKits[0]?.stones.map((truth, i) => [String.fromCharCode(65 + i), truth] as const) ?? [])(
    'finds stone %s to be the same by weight, calipers and polariscope alone', async (slot, truth) => {
      const admin = await actorOf('admin@portellery.example');
      const [stone] = await owner.dataSource.query<{ id: string }[]>(
        `SELECT s.id FROM stone s JOIN kit k ON k.id = s.kit_id WHERE k.number = '014' AND s.slot = $1`, [slot]);
      const { recorded, gaps } = await withSchool(app, admin, (tx) => recordOf(tx, stone?.id ?? ''));
      expect(gaps).toEqual([]);
      expect(computeVerdict({ recorded, readings: cheap(truth) }).verdict).toBe('same');
    });
});
