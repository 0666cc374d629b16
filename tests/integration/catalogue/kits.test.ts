import { randomUUID } from 'node:crypto';
import type { Page, ProblemDocument } from '@shared/api/common';
import type { KitRow, KitView, StoneView } from '@shared/api/kits';
import { catalogueOf, completeTopaz, type Catalogue } from '../../support/catalogue';
import { as, createTestApp, type TestApp, type TestPerson } from '../../support/testApp';

let test: TestApp;
let school: string;
let admin: TestPerson;
let instructor: TestPerson;
let student: TestPerson;
let catalogue: Catalogue;
let of: Awaited<ReturnType<Catalogue['instruments']>>;

const fields = (body: unknown): string[] => (body as ProblemDocument).errors.map(({ field }) => field);
const code = (body: unknown): string => (body as ProblemDocument).code;

async function lend(kitId: string, borrowerId: string, state = 'out'): Promise<string> {
  const id = randomUUID();
  await test.rows(
    `INSERT INTO loan (id, school_id, kit_id, borrower_id, state, reserved_at, reserved_until, out_at, due_at, deposit_minor, currency)
     VALUES ($1, $2, $3, $4, $5, now(), now(), now(), '2030-05-04T16:00:00Z', 0, 'EUR')`, [id, school, kitId, borrowerId, state]);
  return id;
}

async function lendableKit(number: string, body: object = {}): Promise<KitView> {
  const kit = await catalogue.kit(number, body);
  const stone = await catalogue.stone(kit.id, 'A');
  await catalogue.readings(stone.id, completeTopaz(of));
  return kit;
}

beforeAll(async () => {
  test = await createTestApp();
  school = await test.school();
  admin = await test.person(['admin'], school);
  instructor = await test.person(['instructor'], school);
  student = await test.person(['student'], school);
  catalogue = catalogueOf(test, admin);
  of = await catalogue.instruments();
});

afterAll(() => test.close());

it('refuses a number that is taken or not a kit number, by its field', async () => {
  await catalogue.kit('200');
  expect(fields((await catalogue.call.post('/kits', { number: '200', title: 'Twice', neutralTitle: 'Twice' }).expect(422)).body)).toEqual(['number']);
  expect(fields((await catalogue.call.post('/kits', { number: 'no. 7', title: 'x', neutralTitle: ' ' }).expect(422)).body)).toEqual(['number']);
});

it('refuses a slot that is taken, a species nobody knows and a value below nothing', async () => {
  const kit = await catalogue.kit('201');
  await catalogue.stone(kit.id, 'A');
  const stone = { slot: 'A', species: 'topaz', shape: 'oval', neutralDescription: 'blue', replacementValueMinor: 1 };
  expect(fields((await catalogue.call.post(`/kits/${kit.id}/stones`, stone).expect(422)).body)).toEqual(['slot']);
  const odd = { ...stone, slot: 'AA', species: 'unobtainium', replacementValueMinor: -1, flags: ['shiny'] };
  expect(fields((await catalogue.call.post(`/kits/${kit.id}/stones`, odd).expect(422)).body)).toEqual(['slot', 'species', 'replacementValueMinor', 'flags']);
});

it('frees the slot of a retired stone and keeps its number out of the deposit', async () => {
  const kit = await catalogue.kit('202');
  const old = await catalogue.stone(kit.id, 'A');
  await catalogue.call.patch(`/stones/${old.id}`, { version: 1, standing: 'retired' }).expect(200);
  const next = await catalogue.stone(kit.id, 'A', { replacementValueMinor: 500 });
  const view = (await catalogue.call.get(`/kits/${kit.id}`)).body as KitView;
  expect(view.stones.map(({ id }) => id)).toEqual([next.id]);
  expect(view.replacementValueMinor).toBe(500);
  expect(fields((await catalogue.call.patch(`/stones/${old.id}`, { version: 2, standing: 'in_kit' }).expect(422)).body)).toEqual(['slot']);
});

it('lets exactly one of two changes made from the same version through', async () => {
  const kit = await catalogue.kit('203');
  const stone = await catalogue.stone(kit.id, 'A');
  const change = (marks: string) => catalogue.call.patch(`/stones/${stone.id}`, { version: 1, marks });
  const answers = await Promise.all([change('one'), change('two')]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  const titles = await Promise.all(['x', 'y'].map((title) => catalogue.call.patch(`/kits/${kit.id}`, { version: 1, title })));
  expect(titles.map(({ status }) => status).sort()).toEqual([200, 409]);
  expect(((await catalogue.call.get(`/stones/${stone.id}`)).body as StoneView).version).toBe(2);
});

it('lends a kit again after it was set aside only with a reason, and tells who did it', async () => {
  const kit = await lendableKit('204');
  expect(fields((await catalogue.call.patch(`/kits/${kit.id}`, { version: 1, standing: 'set_aside' }).expect(422)).body)).toEqual(['standingReason']);
  const aside = (await catalogue.call.patch(`/kits/${kit.id}`, { version: 1, standing: 'set_aside', standingReason: 'box broken' }).expect(200)).body as KitView;
  expect(aside).toMatchObject({ place: 'set_aside', standingReason: 'box broken', version: 2 });
  expect(fields((await catalogue.call.patch(`/kits/${kit.id}`, { version: 2, standing: 'lendable' }).expect(422)).body)).toEqual(['standingReason']);
  const again = (await catalogue.call.patch(`/kits/${kit.id}`, { version: 2, standing: 'lendable', standingReason: 'new box' }).expect(200)).body as KitView;
  expect(again.place).toBe('shelf');
  const events = (await catalogue.call.get(`/kits/${kit.id}/custody`)).body as { text: string }[];
  expect(events.map(({ text }) => text).slice(0, 2)).toEqual(['Kit lent again by Ada Test: new box', 'Kit set aside: box broken']);
});

it('holds standing, record and what a verdict rests on still while somebody has the kit', async () => {
  const kit = await lendableKit('205');
  await lend(kit.id, student.accountId);
  const [row] = ((await catalogue.call.get(`/kits/${kit.id}`)).body as KitView).stones;
  const stone = (await catalogue.call.get(`/stones/${row?.id}`)).body as StoneView;
  const tries = [
    catalogue.call.patch(`/kits/${kit.id}`, { version: 1, standing: 'retired' }),
    catalogue.call.post(`/kits/${kit.id}/stones`, { slot: 'B', species: 'glass', shape: 'oval', neutralDescription: 'x', replacementValueMinor: 1 }),
    catalogue.call.patch(`/stones/${stone.id}`, { version: stone.version, species: 'glass' }),
    catalogue.call.post(`/stones/${stone.id}/readings`, { readings: [{ attribute: 'weight_ct', value: 1.1, instrumentId: of.balance }] }),
    catalogue.call.post(`/readings/${stone.readings[0]?.id}/strike`, { reason: 'does not suit me' }),
  ];
  for (const answer of await Promise.all(tries)) expect([answer.status, code(answer.body)]).toEqual([409, 'kit_has_open_loan']);
  await catalogue.call.patch(`/stones/${stone.id}`, { version: stone.version, marks: 'scratch on the back' }).expect(200);
});

it('is as blind to a kit for staff who borrow it as for a student', async () => {
  const kit = await lendableKit('206', { title: 'Telling title' });
  const [row] = ((await catalogue.call.get(`/kits/${kit.id}`)).body as KitView).stones;
  await lend(kit.id, instructor.accountId);
  const borrower = as(test, instructor);
  for (const path of [`/kits/${kit.id}`, `/stones/${row?.id}`, `/kits/${kit.id}/custody`, `/stones/${row?.id}/custody`]) {
    expect(code((await borrower.get(path).expect(403)).body)).toBe('own_loan');
  }
  const { items } = (await borrower.get('/kits?q=206').expect(200)).body as Page<KitRow>;
  expect(items).toEqual([expect.objectContaining({ number: '206', title: 'Practice set 206', place: 'out' })]);
  expect(((await borrower.get('/kits?q=telling')).body as Page<KitRow>).items).toEqual([]);
  expect(((await catalogue.call.get('/kits?q=telling')).body as Page<KitRow>).items).toHaveLength(1);
});

it('finds kits by number, title and label, by place, and page by page', async () => {
  const kit = await lendableKit('3A7', { title: 'Needle 100%_set' });
  const search = async (query: string): Promise<string[]> =>
    ((await catalogue.call.get(`/kits?${query}`).expect(200)).body as Page<KitRow>).items.map(({ number }) => number);
  expect(await search('q=3A7')).toEqual(['3A7']);
  expect(await search('q=needle')).toEqual(['3A7']);
  expect(await search(`q=${encodeURIComponent('100%_s')}`)).toEqual(['3A7']);
  expect(await search('q=%25_%25')).toEqual([]);
  const issued = (await catalogue.call.post('/labels', { kitId: kit.id }).expect(201)).body as { labels: { code: string }[] };
  expect(await search(`q=${issued.labels[1]?.code}`)).toEqual(['3A7']);
  expect(await search('place=shelf')).toEqual(expect.arrayContaining(['204', '3A7']));
  expect(await search('place=out')).toEqual(['205', '206']);
  expect(await search('place=incomplete')).not.toContain('3A7');
  await catalogue.call.get('/kits?place=lost').expect(422);
  expect(fields((await catalogue.call.get('/kits?cursor=rubbish').expect(422)).body)).toEqual(['cursor']);

  const all = await search('limit=200');
  const walked: string[] = [];
  for (let cursor: string | null = ''; cursor !== null;) {
    const page: Page<KitRow> = (await catalogue.call.get(`/kits?limit=2${cursor === '' ? '' : `&cursor=${cursor}`}`).expect(200)).body as Page<KitRow>;
    expect(page.items.length).toBeLessThanOrEqual(2);
    walked.push(...page.items.map(({ number }) => number));
    cursor = page.nextCursor;
  }
  expect(walked).toEqual(all);
});

it('shows nothing of another school', async () => {
  const kit = await lendableKit('207');
  const [row] = ((await catalogue.call.get(`/kits/${kit.id}`)).body as KitView).stones;
  const stranger = as(test, await test.person(['admin'], await test.school('Elsewhere')));
  for (const path of [`/kits/${kit.id}`, `/stones/${row?.id}`, `/kits/${kit.id}/custody`, `/stones/${row?.id}/custody`]) await stranger.get(path).expect(404);
  await stranger.patch(`/kits/${kit.id}`, { version: 1, title: 'mine' }).expect(404);
  await stranger.post(`/stones/${row?.id}/readings`, { readings: [{ attribute: 'polariscope', category: 'SR' }] }).expect(404);
  expect(((await stranger.get('/kits')).body as Page<KitRow>).items).toEqual([]);
});
