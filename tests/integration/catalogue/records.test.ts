import type { ProblemDocument } from '@shared/api/common';
import type { KitView, StoneView } from '@shared/api/kits';
import { DEFAULT_SETTINGS } from '@shared/evidence';
import { catalogueOf, completeTopaz, type Catalogue } from '../../support/catalogue';
import { as, createTestApp, type TestApp, type TestPerson } from '../../support/testApp';

let test: TestApp;
let admin: TestPerson;
let instructor: TestPerson;
let student: TestPerson;
let catalogue: Catalogue;
let of: Awaited<ReturnType<Catalogue['instruments']>>;
let number = 100;

const freshKit = (): Promise<KitView> => catalogue.kit(String((number += 1)));
const problem = (body: unknown): ProblemDocument => body as ProblemDocument;
const fields = (body: unknown): string[] => problem(body).errors.map(({ field }) => field);
const valueOf = (stone: StoneView, attribute: string) => stone.values.find((value) => value.attribute === attribute);

beforeAll(async () => {
  test = await createTestApp();
  const school = await test.school();
  admin = await test.person(['admin'], school, 'Maeve');
  instructor = await test.person(['instructor'], school, 'Tomas');
  student = await test.person(['student'], school);
  catalogue = catalogueOf(test, admin);
  of = await catalogue.instruments();
});

afterAll(() => test.close());

it('builds a recorded value from its readings: the mean, an uncertainty that shrinks, and how many there were', async () => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A');
  const one = await catalogue.readings(id, [{ attribute: 'weight_ct', value: 1.56, instrumentId: of.balance }]);
  expect(valueOf(one, 'weight_ct')).toMatchObject({ readingCount: 1, value: { value: 1.56, u: expect.closeTo(0.006, 9) as number } });
  const three = await catalogue.readings(id, [1.57, 1.58].map((value) => ({ attribute: 'weight_ct' as const, value, instrumentId: of.balance })));
  const weight = valueOf(three, 'weight_ct');
  expect(weight).toMatchObject({ readingCount: 3, value: { value: expect.closeTo(1.57, 9) as number, n: 3, instrument: of.balance } });
  // GUM 4.2, 5.1: scatter s = 0.01 over √3 beside the instrument's own share of u, which repeats do not reduce.
  expect(weight?.value).toMatchObject({ u: expect.closeTo(Math.hypot(0.01 / Math.sqrt(3), 0.006 * DEFAULT_SETTINGS.instrumentShare), 6) as number });
});

it('derives the specific gravity from weighings, with the computed uncertainty', async () => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A');
  const stone = await catalogue.readings(id, [{ attribute: 'sg', airCt: 4.02, waterCt: 3.02, waterC: 20, instrumentId: of.balance }]);
  // 4.02/(4.02−3.02) = 4.02 (Wade 1918) times the density of water at 20 °C, 0.998232 (Tanaka 2001).
  expect(valueOf(stone, 'sg')?.value).toMatchObject({ value: expect.closeTo(4.0129, 3) as number, u: expect.closeTo(0.0302, 3) as number });
  expect(stone.readings[0]).toMatchObject({ attribute: 'sg', weighing: { airCt: 4.02, waterCt: 3.02, waterC: 20 }, u: expect.closeTo(0.0302, 3) as number });
});

it('keeps an index over the limit as the limit of the liquid it was read with', async () => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A', { species: 'cubic-zirconia', colour: 'colourless' });
  const stone = await catalogue.readings(id, [{ attribute: 'ri_spot', overLimit: true, instrumentId: of.refractometer }]);
  expect(valueOf(stone, 'ri_spot')?.value).toMatchObject({ value: 'over_limit', limit: 1.81 });
  expect(stone.readings[0]).toMatchObject({ value: 'over_limit', limit: 1.81, u: null });
});

it('says what a record lacks and holds the kit back until it is complete', async () => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A');
  const bare = (await catalogue.call.get(`/kits/${kit.id}`).expect(200)).body as KitView;
  expect(bare.place).toBe('incomplete');
  expect(bare.stones[0]?.gaps.map(({ attribute }) => attribute)).toEqual(['weight_ct', 'length_mm', 'width_mm', 'height_mm', 'polariscope', 'ri_spot']);
  await catalogue.readings(id, completeTopaz(of));
  const ready = (await catalogue.call.get(`/kits/${kit.id}`).expect(200)).body as KitView;
  expect(ready).toMatchObject({ place: 'shelf', gapCount: 0, replacementValueMinor: 7000, depositMinor: 8000, currency: 'EUR' });
});

it('counts a kit without stones as incomplete', async () => {
  expect(await freshKit()).toMatchObject({ place: 'incomplete', stoneCount: 0 });
});

it('refuses an instrument that cannot read the attribute, by its field', async () => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A');
  const wrong = { readings: [
    { attribute: 'weight_ct', value: 1.5, instrumentId: of.caliper },
    { attribute: 'length_mm', value: 8, instrumentId: of.balance },
    { attribute: 'polariscope', category: 'DR', instrumentId: of.refractometer },
    { attribute: 'pleochroism', category: 'none', instrumentId: of.polariscope },
    { attribute: 'ri_spot', value: 1.62 },
  ] };
  const { body } = (await catalogue.call.post(`/stones/${id}/readings`, wrong).expect(422)) as { body: unknown };
  expect(fields(body)).toEqual([0, 1, 2, 3, 4].map((i) => `readings[${i}].instrumentId`));
  expect(((await catalogue.call.get(`/stones/${id}`)).body as StoneView).readings).toEqual([]);
});

it('refuses another school’s instrument and one that is retired', async () => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A');
  const other = catalogueOf(test, await test.person(['admin'], await test.school('Other')));
  const theirs = await other.instruments();
  const spare = (await catalogue.call.post('/instruments', { kind: 'balance', name: 'Old balance', standardUncertainty: 0.01 }).expect(201)).body as { id: string };
  await catalogue.call.patch(`/instruments/${spare.id}`, { version: 1, retired: true }).expect(200);
  for (const [instrumentId, words] of [[theirs.balance, 'register'], [spare.id, 'retired']] as const) {
    const { body } = (await catalogue.call.post(`/stones/${id}/readings`, { readings: [{ attribute: 'weight_ct', value: 1.5, instrumentId }] }).expect(422)) as { body: unknown };
    expect(problem(body).errors).toEqual([{ field: 'readings[0].instrumentId', message: expect.stringContaining(words) as string }]);
  }
});

it.each([
  ['no weight', { attribute: 'weight_ct', value: 0 }, 'value'],
  ['a negative weight', { attribute: 'weight_ct', value: -1 }, 'value'],
  ['a weight no stone has', { attribute: 'weight_ct', value: 5000 }, 'value'],
  ['an index below 1.3', { attribute: 'ri_spot', value: 1.2 }, 'value'],
  ['an index above the liquid', { attribute: 'ri_spot', value: 1.95 }, 'value'],
  ['a word for a number', { attribute: 'weight_ct', category: 'DR' }, 'value'],
  ['a number for a reaction', { attribute: 'polariscope', value: 1 }, 'category'],
  ['a figure for a reaction', { attribute: 'polariscope', category: 'quartz' }, 'category'],
  ['two ways of saying it', { attribute: 'ri_spot', value: 1.6, overLimit: true }, 'value'],
  ['a weight over the limit', { attribute: 'weight_ct', overLimit: true }, 'overLimit'],
  ['an SG without weighings', { attribute: 'sg', value: 3.5 }, 'airCt'],
  ['water heavier than air', { attribute: 'sg', airCt: 2, waterCt: 2.1, waterC: 20 }, 'waterCt'],
  ['an SG beyond any stone', { attribute: 'sg', airCt: 2, waterCt: 1.95, waterC: 20 }, 'waterCt'],
  ['boiling water', { attribute: 'sg', airCt: 2, waterCt: 1.4, waterC: 99 }, 'waterC'],
])('refuses %s and names the field', async (_what, entry, field) => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A');
  const instrumentId = entry.attribute === 'polariscope' ? of.polariscope : entry.attribute.startsWith('ri') ? of.refractometer : of.balance;
  const good = { attribute: 'weight_ct', value: 1.5, instrumentId: of.balance };
  const { body } = (await catalogue.call.post(`/stones/${id}/readings`, { readings: [good, { ...entry, instrumentId }] }).expect(422)) as { body: unknown };
  expect(fields(body)).toEqual([`readings[1].${field}`]);
});

it('strikes a slip with a reason: it stays visible, no longer counts, and cannot be struck twice', async () => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A');
  const before = await catalogue.readings(id, [1.57, 15.7].map((value) => ({ attribute: 'weight_ct' as const, value, instrumentId: of.balance })));
  const slip = before.readings.find(({ value }) => value === 15.7);
  await as(test, instructor).post(`/readings/${slip?.id}/strike`, { reason: ' ' }).expect(422);
  const after = (await as(test, instructor).post(`/readings/${slip?.id}/strike`, { reason: 'decimal point slipped' }).expect(200)).body as StoneView;
  expect(valueOf(after, 'weight_ct')).toMatchObject({ readingCount: 1, value: { value: 1.57 } });
  expect(after.readings.find((reading) => reading.id === slip?.id)).toMatchObject({ value: 15.7, struck: { reason: 'decimal point slipped', by: { name: 'Tomas' } } });
  const { body } = (await as(test, instructor).post(`/readings/${slip?.id}/strike`, { reason: 'once more' }).expect(409)) as { body: unknown };
  expect(problem(body).code).toBe('struck_already');
});

it('leaves what an instrument’s register entry said at the time with each reading', async () => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A');
  const balance = (await catalogue.call.post('/instruments', { kind: 'balance', name: `Balance ${kit.number}`, standardUncertainty: 0.006 }).expect(201)).body as { id: string };
  await catalogue.readings(id, [{ attribute: 'weight_ct', value: 1.57, instrumentId: balance.id }]);
  await catalogue.call.patch(`/instruments/${balance.id}`, { version: 1, standardUncertainty: 0.05 }).expect(200);
  const stone = (await catalogue.call.get(`/stones/${id}`)).body as StoneView;
  expect(stone.readings[0]?.u).toBe(0.006);
});

it('takes a retried entry of readings once', async () => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A');
  const body = { readings: [{ attribute: 'weight_ct', value: 1.57, instrumentId: of.balance }] };
  const send = () => catalogue.call.post(`/stones/${id}/readings`, body).set('Idempotency-Key', `entry-${id}`);
  await send().expect(201);
  const again = await send().expect(201);
  expect((again.body as StoneView).readings).toHaveLength(1);
});

it('tells what happened to a stone, newest first, and keeps it from students', async () => {
  const kit = await freshKit();
  const { id } = await catalogue.stone(kit.id, 'A');
  await catalogue.readings(id, [{ attribute: 'weight_ct', value: 1.57, instrumentId: of.balance }]);
  const events = (await catalogue.call.get(`/stones/${id}/custody`).expect(200)).body as { text: string; slot: string }[];
  expect(events.map(({ text }) => text)).toEqual(['Readings recorded at the bench by Maeve', 'Stone catalogued by Maeve']);
  const ofKit = (await catalogue.call.get(`/kits/${kit.id}/custody`).expect(200)).body as { kind: string }[];
  expect(ofKit.at(-1)?.kind).toBe('kit_catalogued');
  for (const path of [`/stones/${id}/custody`, `/kits/${kit.id}/custody`, `/kits/${kit.id}`, `/stones/${id}`, '/kits', '/instruments']) {
    await as(test, student).get(path).expect(403);
  }
});
