import supertest from 'supertest';
import type { ProblemDocument } from '@shared/api/common';
import type { SpeciesSummary, VerdictResponse } from '@shared/api/evidence';
import { as, createTestApp, type TestApp, type TestPerson } from '../../support/testApp';

let test: TestApp;
let school: string;
let instructor: TestPerson;

beforeAll(async () => {
  test = await createTestApp();
  school = await test.school();
  instructor = await test.person(['instructor'], school);
});

afterAll(() => test.close());

/** The example of the product's own description of the request: a glass cabochon back in a topaz's jar. */
const recorded = {
  species: 'topaz', colour: 'blue', shape: 'oval', flags: [],
  values: {
    weight_ct: { value: 1.566, u: 0.004 }, length_mm: { value: 8.02, u: 0.012 }, width_mm: { value: 6.01, u: 0.012 },
    height_mm: { value: 3.52, u: 0.015 }, ri_spot: { value: 1.62, u: 0.006 }, polariscope: 'DR', optic_figure: 'biaxial',
  },
};
const swapped = [
  { attribute: 'weight_ct', value: 1.104, u: 0.004 },
  { attribute: 'ri_spot', value: 1.52, u: 0.006 },
  { attribute: 'polariscope', value: 'SR', observer: 'instructor' },
];

const send = (body: object) => as(test, instructor).post('/verdicts/trial', body);
const sendText = (text: string) => supertest(test.app).post('/api/v1/verdicts/trial')
  .set('Authorization', `Bearer ${instructor.token}`).type('application/json').send(text);
const fields = (body: unknown): string[] => (body as ProblemDocument).errors.map(({ field }) => field);

it('finds the swapped stone to be different, with reasons that sum to the whole', async () => {
  const answer = (await send({ recorded, readings: swapped }).expect(200)).body as VerdictResponse;
  expect(answer).toMatchObject({ verdict: 'different', supports: 'another_stone', engine: '1.0.0' });
  expect(answer.log10LR).toBeLessThan(-4);
  expect(answer.support).toMatch(/^(very|extremely) strong$/);
  expect(answer.contributions.reduce((sum, { log10LR }) => sum + log10LR, 0)).toBeCloseTo(answer.log10LR, 9);
  expect(answer.alternatives[0]?.species).toBe('glass');
  // From the example: (1.104 − 1.566) / √(0.004² + 0.004²) = −81.7, and E_n with U = 2u half of it.
  expect(answer.contributions.find(({ attribute }) => attribute === 'weight_ct')).toMatchObject({ z: expect.closeTo(-81.7, 1) as number, en: expect.closeTo(-40.8, 1) as number });
});

it('gives the same digits for the same request, and stores nothing', async () => {
  const before = await test.rows('SELECT (SELECT count(*) FROM verdict) AS v, (SELECT count(*) FROM reading) AS r, (SELECT count(*) FROM idempotency) AS i');
  const [one, two] = [await send({ recorded, readings: swapped }), await send({ recorded, readings: swapped })];
  expect(two.body).toEqual(one.body);
  expect(await test.rows('SELECT (SELECT count(*) FROM verdict) AS v, (SELECT count(*) FROM reading) AS r, (SELECT count(*) FROM idempotency) AS i')).toEqual(before);
});

it('needs neither an idempotency key nor colour, shape, flags, observer or the school’s header', async () => {
  const { species, values } = recorded;
  const answer = await as(test, instructor).post('/verdicts/trial', { recorded: { species, values }, readings: [{ attribute: 'polariscope', value: 'DR' }] })
    .unset('Idempotency-Key').expect(200);
  expect((answer.body as VerdictResponse).verdict).toBe('not_settled');
});

it('takes weighings for SG and an index over the limit as they are described', async () => {
  const readings = [{ attribute: 'sg', airCt: 1.566, waterCt: 1.127, waterC: 20, uCt: 0.006 }, { attribute: 'ri_spot', value: 'over_limit', limit: 1.81 }];
  const answer = (await send({ recorded, readings }).expect(200)).body as VerdictResponse;
  expect(answer.contributions.find(({ attribute }) => attribute === 'sg')).toMatchObject({ value: expect.closeTo(3.561, 2) as number, u: expect.closeTo(0.06, 1) as number });
  expect(answer.contributions.find(({ attribute }) => attribute === 'ri_spot')).toMatchObject({ value: 'over_limit', z: null, en: null });
});

it('uses the school’s own settings of the engine', async () => {
  const strict = await test.school('Strict');
  const person = await test.person(['admin'], strict);
  const readings = [{ attribute: 'weight_ct', value: 1.566, u: 0.006 }, { attribute: 'length_mm', value: 8.02, u: 0.014 },
    { attribute: 'width_mm', value: 6.01, u: 0.014 }, { attribute: 'height_mm', value: 3.52, u: 0.014 }, { attribute: 'polariscope', value: 'DR' }];
  const ask = async (who: TestPerson) => (await as(test, who).post('/verdicts/trial', { recorded, readings }).expect(200)).body as VerdictResponse;
  expect((await ask(person)).verdict).toBe('same');
  await test.rows(`UPDATE school SET engine_settings = '{"rule": {"sameLR": 1e30}}' WHERE id = $1`, [strict]);
  expect((await ask(person)).verdict).toBe('not_settled');
  expect((await ask(instructor)).verdict).toBe('same');
});

const one = (reading: object) => ({ recorded, readings: [reading] });
it.each([
  ['a negative weight', one({ attribute: 'weight_ct', value: -1, u: 0.004 }), 'readings[0].value'],
  ['no weight', one({ attribute: 'weight_ct', value: 0, u: 0.004 }), 'readings[0].value'],
  ['an index below 1.3', one({ attribute: 'ri_spot', value: 1.2, u: 0.006 }), 'readings[0].value'],
  ['an index above 2.7', one({ attribute: 'ri_high', value: 2.8, u: 0.002 }), 'readings[0].value'],
  ['water not below air', one({ attribute: 'sg', airCt: 1.5, waterCt: 1.5, waterC: 20, uCt: 0.006 }), 'readings[0].waterCt'],
  ['water above 40 °C', one({ attribute: 'sg', airCt: 1.5, waterCt: 1, waterC: 41, uCt: 0.006 }), 'readings[0].waterC'],
  ['an unknown attribute', one({ attribute: 'lustre', value: 1, u: 1 }), 'readings[0].attribute'],
  ['an unknown category', one({ attribute: 'polariscope', value: 'MAYBE' }), 'readings[0].value'],
  ['a missing uncertainty', one({ attribute: 'weight_ct', value: 1.5 }), 'readings[0].u'],
  ['a number as text', one({ attribute: 'weight_ct', value: '1.5', u: 0.004 }), 'readings[0].value'],
  ['an unknown species', { recorded: { ...recorded, species: 'unobtainium' }, readings: swapped }, 'recorded.species'],
  ['an unknown flag', { recorded: { ...recorded, flags: ['shiny'] }, readings: swapped }, 'recorded.flags[0]'],
  ['no readings', { recorded }, 'readings'],
  ['no record', { readings: swapped }, 'recorded'],
])('refuses %s with 422 and the field', async (_what, body, field) => {
  const answer = await send(body).expect(422);
  expect(answer.headers['content-type']).toContain('application/problem+json');
  expect(fields(answer.body)).toContain(field);
});

it.each(['NaN', '-Infinity', 'null', '1e999'])('refuses %s as a number of its field', async (word) => {
  const text = JSON.stringify(one({ attribute: 'weight_ct', value: 'HERE', u: 0.004 })).replace('"HERE"', word);
  expect(fields((await sendText(text).expect(422)).body)).toEqual(['readings[0].value']);
});

it('leaves the word NaN alone inside text, and refuses what is not JSON or no object', async () => {
  const named = one({ attribute: 'weight_ct', value: 1.5, u: 0.004, instrument: 'balance "NaN" of Infinity' });
  await send(named).expect(200);
  for (const text of ['{', 'NaN NaN', '{"recorded": NaN,}']) expect((await sendText(text).expect(400)).body).toMatchObject({ code: 'unreadable_body' });
  for (const text of ['', '[]', '3', 'NaN', '"x"']) await sendText(text).expect(422);
});

it('is for staff only, while the table of species is for everybody signed in', async () => {
  const student = await test.person(['student'], school);
  await as(test, student).post('/verdicts/trial', { recorded, readings: swapped }).expect(403);
  await as(test, undefined).post('/verdicts/trial', { recorded, readings: swapped }).expect(401);
  const species = (await as(test, student).get('/species').expect(200)).body as SpeciesSummary[];
  expect(species.find(({ id }) => id === 'topaz')).toMatchObject({ name: expect.stringContaining('topaz') as string, opticSign: '+', sg: [3.53, 3.57], sourceKind: 'memory' });
  await as(test, undefined).get('/species').expect(401);
});
