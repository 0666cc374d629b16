import type { ProblemDocument } from '@shared/api/common';
import type { KitView } from '@shared/api/kits';
import type { IssuedLabels, ScannedLabel } from '@shared/api/labels';
import { groupLabelCode, labelUrl, LABEL_RANDOM_BYTES, makeLabelCode, parseLabelCode } from '@shared/codes';
import { randomBytes, randomUUID } from 'node:crypto';
import { withSchool } from '@/server/database/school';
import { resolveLabel } from '@/server/features/labels/resolve';
import { catalogueOf, completeTopaz, type Catalogue } from '../../support/catalogue';
import { as, createTestApp, type TestApp, type TestPerson } from '../../support/testApp';

let test: TestApp;
let school: string;
let admin: TestPerson;
let student: TestPerson;
let catalogue: Catalogue;
let of: Awaited<ReturnType<Catalogue['instruments']>>;

const problem = (body: unknown): ProblemDocument => body as ProblemDocument;
const issue = async (body: object): Promise<IssuedLabels> => (await catalogue.call.post('/labels', body).expect(201)).body as IssuedLabels;
const scan = async (who: TestPerson, code: string): Promise<ScannedLabel> => (await as(test, who).get(`/labels/${encodeURIComponent(code)}`).expect(200)).body as ScannedLabel;

async function kitOfTwo(number: string): Promise<{ kit: KitView; stones: string[] }> {
  const kit = await catalogue.kit(number);
  const stones = [await catalogue.stone(kit.id, 'A'), await catalogue.stone(kit.id, 'B')].map(({ id }) => id);
  return { kit, stones };
}

beforeAll(async () => {
  test = await createTestApp();
  school = await test.school('Port Test');
  admin = await test.person(['admin'], school);
  student = await test.person(['student'], school);
  catalogue = catalogueOf(test, admin);
  of = await catalogue.instruments();
});

afterAll(() => test.close());

it('issues a random code with a good check character for the kit and each jar, and records it', async () => {
  const { kit } = await kitOfTwo('600');
  const { labels, voidedCount } = await issue({ kitId: kit.id });
  expect(labels.map(({ kitNumber, slot }) => [kitNumber, slot])).toEqual([['600', null], ['600', 'A'], ['600', 'B']]);
  expect(voidedCount).toBe(0);
  for (const { code } of labels) expect(parseLabelCode(code)).toEqual({ code });
  expect(new Set(labels.map(({ code }) => code)).size).toBe(3);
  const events = (await catalogue.call.get(`/kits/${kit.id}/custody`)).body as { kind: string }[];
  expect(events.filter(({ kind }) => kind === 'label_issued')).toHaveLength(3);
});

it('voids the earlier label at once; scanned, the old one says that it is void and nothing more', async () => {
  const { kit } = await kitOfTwo('601');
  const first = await issue({ kitId: kit.id });
  const second = await issue({ kitId: kit.id });
  expect(second.voidedCount).toBe(3);
  const old = await scan(student, first.labels[1]?.code ?? '');
  expect(old).toEqual({ kind: 'void', valid: false, kitNumber: '601', slot: 'A', voidedAt: expect.any(String) as string });
  expect(await scan(student, second.labels[1]?.code ?? '')).toMatchObject({ kind: 'jar', valid: true, slot: 'A' });
  const actor = { accountId: admin.accountId, schoolId: school };
  await expect(withSchool(test.db, actor, (tx) => resolveLabel(tx, first.labels[0]?.code ?? ''))).rejects.toMatchObject({ code: 'label_void' });
});

it('reprints one lost jar’s label and leaves the others valid', async () => {
  const { kit, stones } = await kitOfTwo('602');
  const first = await issue({ kitId: kit.id });
  const again = await issue({ kitId: kit.id, stoneIds: [stones[1]] });
  expect(again).toMatchObject({ voidedCount: 1, labels: [{ slot: 'B' }] });
  expect(await scan(student, first.labels[0]?.code ?? '')).toMatchObject({ kind: 'kit', valid: true });
  expect(await scan(student, first.labels[2]?.code ?? '')).toMatchObject({ kind: 'void' });
});

it('reprints once for a retried request', async () => {
  const { kit } = await kitOfTwo('603');
  const key = randomUUID();
  const send = () => catalogue.call.post('/labels', { kitId: kit.id }).set('Idempotency-Key', key).expect(201);
  const [one, two] = [await send(), await send()];
  expect(two.body).toEqual(one.body);
});

it('refuses a jar of another kit by its field, and a request for nothing', async () => {
  const [one, two] = [await kitOfTwo('604'), await kitOfTwo('605')];
  const wrong = await catalogue.call.post('/labels', { kitId: one.kit.id, stoneIds: [one.stones[0], two.stones[0]] }).expect(422);
  expect(problem(wrong.body).errors.map(({ field }) => field)).toEqual(['stoneIds[1]']);
  await catalogue.call.post('/labels', { kitId: one.kit.id, stoneIds: [] }).expect(422);
});

it('reads a code however it was typed or scanned', async () => {
  const { kit } = await kitOfTwo('606');
  const code = (await issue({ kitId: kit.id })).labels[0]?.code ?? '';
  for (const typed of [code, code.toLowerCase(), groupLabelCode(code), ` ${code} `]) expect(await scan(student, typed)).toMatchObject({ kitNumber: '606' });
  const actor = { accountId: admin.accountId, schoolId: school };
  const link = labelUrl('https://lend.example.org', code);
  expect(await withSchool(test.db, actor, (tx) => resolveLabel(tx, link))).toMatchObject({ kitId: kit.id, stoneId: null });
});

it('answers blind: nothing of what a stone is, to whoever scans', async () => {
  const { kit } = await kitOfTwo('607');
  const { labels } = await issue({ kitId: kit.id });
  for (const who of [student, admin]) {
    for (const { code } of labels) {
      const text = JSON.stringify(await scan(who, code));
      expect(text).not.toMatch(/topaz|True title|replacement|species/i);
    }
  }
  expect(await scan(student, labels[1]?.code ?? '')).toMatchObject({ neutralDescription: 'pale blue oval, 8×6', openLoanId: null, mine: false });
});

it('says whether the kit can be taken, and whose loan it is only to staff and the borrower', async () => {
  const kit = await catalogue.kit('608');
  const code = (await issue({ kitId: kit.id })).labels[0]?.code ?? '';
  expect(await scan(student, code)).toMatchObject({ lendable: false });
  await catalogue.readings((await catalogue.stone(kit.id, 'A')).id, completeTopaz(of));
  expect(await scan(student, code)).toMatchObject({ lendable: true, openLoanId: null });
  const [loan] = await test.rows<{ id: string }>(
    `INSERT INTO loan (school_id, kit_id, borrower_id, state, reserved_at, reserved_until, due_at, deposit_minor, currency)
     VALUES ($1, $2, $3, 'reserved', now(), now(), now(), 0, 'EUR') RETURNING id`, [school, kit.id, student.accountId]);
  const rival = await test.person(['student'], school);
  expect(await scan(student, code)).toMatchObject({ lendable: false, mine: true, openLoanId: loan?.id });
  expect(await scan(rival, code)).toMatchObject({ lendable: false, mine: false, openLoanId: null });
  expect(await scan(admin, code)).toMatchObject({ mine: false, openLoanId: loan?.id });
});

it('gives the same answer for another school’s label as for a code nobody printed', async () => {
  const { kit } = await kitOfTwo('609');
  const code = (await issue({ kitId: kit.id })).labels[0]?.code ?? '';
  const stranger = await test.person(['admin'], await test.school('Elsewhere'));
  const nobody = await test.person(['student'], undefined);
  const answer = async (who: TestPerson, asked: string): Promise<object> => {
    const { body } = (await as(test, who).get(`/labels/${asked}`).expect(404)) as { body: unknown };
    return { ...problem(body), requestId: '' };
  };
  const unknown = await answer(student, makeLabelCode(randomBytes(LABEL_RANDOM_BYTES)));
  expect(await answer(stranger, code)).toEqual(unknown);
  expect(await answer(nobody, code)).toEqual(unknown);
  await test.rows('UPDATE membership SET ended_at = now() WHERE account_id = $1', [student.accountId]);
  expect(await answer(student, code)).toEqual(unknown);
  await test.rows('UPDATE membership SET ended_at = NULL WHERE account_id = $1', [student.accountId]);
});

it('finds labels of each school a person belongs to, whichever is current', async () => {
  const other = await test.school('Second');
  const both = await test.person(['student'], school);
  await test.rows(`INSERT INTO membership (school_id, account_id, roles) VALUES ($1, $2, '{student}')`, [other, both.accountId]);
  const { kit } = await kitOfTwo('610');
  const code = (await issue({ kitId: kit.id })).labels[0]?.code ?? '';
  for (const current of [school, other, undefined]) await as(test, both, current).get(`/labels/${code}`).expect(200);
});

it('says what is wrong with a mistyped code, and never fails on rubbish', async () => {
  const { body } = (await as(test, student).get('/labels/ABCDEFGH').expect(422)) as { body: unknown };
  expect(problem(body).errors).toEqual([{ field: 'code', message: 'A label code has 12 characters. Check it and try again.' }]);
  for (const rubbish of ['%20', '%F0%9F%92%8E', 'x'.repeat(200), "'--", '0000-0000-0000']) {
    expect((await as(test, student).get(`/labels/${rubbish}`)).status).toBeLessThan(500);
  }
});

it('prints the valid labels as a PDF, and says which kit has none', async () => {
  const [with_, without] = [await kitOfTwo('611'), await kitOfTwo('612')];
  await issue({ kitId: with_.kit.id });
  const sheet = (kitIds: string[], rest: object = {}) => catalogue.call.post('/labels/sheet', { kitIds, page: 'A4', size: 'small', startAt: 1, ...rest });
  const pdf = await sheet([with_.kit.id]).buffer(true).expect(200);
  expect(pdf.headers).toMatchObject({ 'content-type': 'application/pdf', 'content-disposition': expect.stringContaining('labels.pdf') as string });
  expect((pdf.body as Buffer).subarray(0, 5).toString()).toBe('%PDF-');
  const bare = await sheet([with_.kit.id, without.kit.id]).expect(422);
  expect(problem(bare.body).errors.map(({ field }) => field)).toEqual(['kitIds[1]']);
  const far = await sheet([with_.kit.id], { startAt: 66 }).expect(422);
  expect(problem(far.body).errors.map(({ field }) => field)).toEqual(['startAt']);
});

it('voids the label of a stone that is retired', async () => {
  const { kit, stones } = await kitOfTwo('613');
  const { labels } = await issue({ kitId: kit.id });
  await catalogue.call.patch(`/stones/${stones[0]}`, { version: 1, standing: 'retired' }).expect(200);
  expect(await scan(student, labels[1]?.code ?? '')).toMatchObject({ kind: 'void' });
});

it('lets only staff issue and print', async () => {
  const { kit } = await kitOfTwo('614');
  await as(test, student).post('/labels', { kitId: kit.id }).expect(403);
  await as(test, student).post('/labels/sheet', { kitIds: [kit.id], page: 'A4', size: 'small', startAt: 1 }).expect(403);
});
