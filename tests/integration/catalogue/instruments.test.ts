import type { ProblemDocument } from '@shared/api/common';
import type { InstrumentView } from '@shared/api/instruments';
import { as, createTestApp, type TestApp } from '../../support/testApp';

let test: TestApp;
let admin: ReturnType<typeof as>;

beforeAll(async () => {
  test = await createTestApp();
  admin = as(test, await test.person(['admin'], await test.school()));
});

afterAll(() => test.close());

const fields = (body: unknown): string[] => (body as ProblemDocument).errors.map(({ field }) => field);

it.each([
  ['a balance without its uncertainty', { kind: 'balance' }, 'standardUncertainty'],
  ['a caliper without its uncertainty', { kind: 'caliper', resolution: 0.01 }, 'standardUncertainty'],
  ['a refractometer without a spot uncertainty', { kind: 'refractometer', standardUncertainty: 0.0015, liquidLimitRi: 1.81 }, 'spotUncertainty'],
  ['a refractometer without its liquid’s limit', { kind: 'refractometer', standardUncertainty: 0.0015, spotUncertainty: 0.006 }, 'liquidLimitRi'],
  ['an uncertainty in the wrong unit', { kind: 'balance', standardUncertainty: 6 }, 'standardUncertainty'],
  ['an uncertainty below what rounding alone gives', { kind: 'balance', resolution: 0.01, standardUncertainty: 0.001 }, 'standardUncertainty'],
  ['a liquid no school has', { kind: 'refractometer', standardUncertainty: 0.0015, spotUncertainty: 0.006, liquidLimitRi: 2.5 }, 'liquidLimitRi'],
  ['a polariscope with an uncertainty', { kind: 'polariscope', standardUncertainty: 0.1 }, 'standardUncertainty'],
  ['a kind the register does not know', { kind: 'microscope' }, 'kind'],
])('refuses %s by its field', async (_what, body, field) => {
  expect(fields((await admin.post('/instruments', { name: 'X', ...body }).expect(422)).body)).toEqual([field]);
});

it('lists instruments in use before retired ones, and takes one back into use', async () => {
  const made = (await admin.post('/instruments', { kind: 'thermometer', name: 'Glass thermometer', standardUncertainty: 0.5 }).expect(201)).body as InstrumentView;
  await admin.post('/instruments', { kind: 'uv_lamp', name: 'Lamp' }).expect(201);
  await admin.patch(`/instruments/${made.id}`, { version: 1, retired: true }).expect(200);
  expect(((await admin.get('/instruments')).body as InstrumentView[]).map(({ name, retired }) => [name, retired])).toEqual([['Lamp', false], ['Glass thermometer', true]]);
  const back = (await admin.patch(`/instruments/${made.id}`, { version: 2, retired: false, name: 'Thermometer' }).expect(200)).body as InstrumentView;
  expect(back).toMatchObject({ retired: false, name: 'Thermometer', standardUncertainty: 0.5, version: 3 });
});

it('refuses a name that is taken, a stale version, and taking away a figure that readings need', async () => {
  const one = (await admin.post('/instruments', { kind: 'balance', name: 'One', standardUncertainty: 0.006 }).expect(201)).body as InstrumentView;
  expect(fields((await admin.post('/instruments', { kind: 'balance', name: 'One', standardUncertainty: 0.006 }).expect(422)).body)).toEqual(['name']);
  await admin.patch(`/instruments/${one.id}`, { version: 9, name: 'Two' }).expect(409);
  expect(fields((await admin.patch(`/instruments/${one.id}`, { version: 1, standardUncertainty: null }).expect(422)).body)).toEqual(['standardUncertainty']);
});
