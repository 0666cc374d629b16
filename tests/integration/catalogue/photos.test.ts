import { mkdtemp, rm } from 'node:fs/promises';
import { readdirSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import supertest from 'supertest';
import type { ProblemDocument } from '@shared/api/common';
import type { PhotoView, StoneView } from '@shared/api/kits';
import { createFolderStorage } from '@/server/storage/folderStorage';
import { catalogueOf } from '../../support/catalogue';
import { as, createTestApp, type TestApp, type TestPerson } from '../../support/testApp';

let test: TestApp;
let folder: string;
let school: string;
let admin: TestPerson;
let student: TestPerson;
let stoneId: string;

beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'trayward-photos-'));
  test = await createTestApp({ dependencies: { storage: createFolderStorage(folder) } });
  school = await test.school();
  admin = await test.person(['admin'], school);
  student = await test.person(['student'], school);
  const catalogue = catalogueOf(test, admin);
  stoneId = (await catalogue.stone((await catalogue.kit('500')).id, 'A')).id;
});

afterAll(async () => {
  await test.close();
  await rm(folder, { recursive: true });
});

const form = () => supertest(test.app).post(`/api/v1/stones/${stoneId}/photos`).set('Authorization', `Bearer ${admin.token}`);
const upload = (bytes: Buffer, name: string, type = 'image/jpeg') =>
  form().attach('photo', bytes, { filename: name, contentType: type }).field('note', 'under the lamp');

/** A camera's picture lying on its side, with a place, a maker and a comment in its EXIF block. */
function camera(): Promise<Buffer> {
  return sharp({ create: { width: 2400, height: 1200, channels: 3, background: '#7aa0c4' } })
    .withExif({ IFD0: { Make: 'SecretCam', ImageDescription: 'topaz of kit 014' }, IFD3: { GPSLatitude: '53/1 20/1 0/1' } })
    .withMetadata({ orientation: 6 }).jpeg().toBuffer();
}

const stored = (): string[] => readdirSync(folder, { recursive: true, withFileTypes: true }).filter((entry) => entry.isFile()).map(({ name }) => name);

it('re-encodes a photo upright, within its limits, and keeps nothing the camera wrote into it', async () => {
  const original = await camera();
  expect(original.includes('SecretCam')).toBe(true);
  const photo = (await upload(original, 'topaz-kit-014.jpg').expect(201)).body as PhotoView;
  expect(photo).toMatchObject({ width: 800, height: 1600, note: 'under the lamp' });
  for (const [url, longest] of [[photo.url, 1600], [photo.thumbnailUrl, 320]] as const) {
    const answer = await as(test, admin).get(url.replace('/api/v1', '')).buffer(true).expect(200);
    expect(answer.headers).toMatchObject({ 'content-type': 'image/webp', 'cache-control': expect.stringContaining('private') as string });
    const bytes = answer.body as Buffer;
    const meta = await sharp(bytes).metadata();
    expect(Math.max(meta.width, meta.height)).toBe(longest);
    expect([meta.exif, meta.xmp, meta.iptc]).toEqual([undefined, undefined, undefined]);
    for (const trace of ['SecretCam', 'topaz', 'GPS']) expect(bytes.includes(trace)).toBe(false);
  }
  expect(stored().join(' ')).not.toMatch(/topaz|014/);
});

it.each([
  ['a text that calls itself a JPEG', Buffer.from('not a picture at all'), 'image/jpeg'],
  ['an SVG, which may hold scripts', Buffer.from('<svg xmlns="http://www.w3.org/2000/svg" width="10" height="10"><script>1</script></svg>'), 'image/png'],
  ['an empty file', Buffer.alloc(0), 'image/jpeg'],
  ['a file over 8 MB', Buffer.alloc(9 * 1024 * 1024, 1), 'image/jpeg'],
])('refuses %s, names the field and stores nothing', async (_what, bytes, type) => {
  const before = stored().length;
  const { body } = (await upload(bytes, 'photo.jpg', type).expect(422)) as { body: unknown };
  expect((body as ProblemDocument).errors.map(({ field }) => field)).toEqual(['photo']);
  expect(stored()).toHaveLength(before);
});

it('refuses a GIF and a form without a photo by the field', async () => {
  const gif = await sharp({ create: { width: 4, height: 4, channels: 3, background: 'red' } }).gif().toBuffer();
  for (const request of [upload(gif, 'a.png', 'image/png'), form().field('note', 'none')]) {
    const { body } = (await request.expect(422)) as { body: unknown };
    expect((body as ProblemDocument).errors.map(({ field }) => field)).toEqual(['photo']);
  }
});

it('shows no photo to students, other schools or the kit’s borrower on the staff', async () => {
  const photo = (await upload(await camera(), 'a.jpg').expect(201)).body as PhotoView;
  const stranger = await test.person(['admin'], await test.school('Elsewhere'));
  const borrower = await test.person(['instructor'], school);
  const [stone] = await test.rows<{ kit_id: string }>('SELECT kit_id FROM stone WHERE id = $1', [stoneId]);
  await test.rows(
    `INSERT INTO loan (school_id, kit_id, borrower_id, state, reserved_at, reserved_until, out_at, due_at, deposit_minor, currency)
     VALUES ($1, $2, $3, 'out', now(), now(), now(), now(), 0, 'EUR')`, [school, stone?.kit_id, borrower.accountId]);
  for (const person of [student, stranger, borrower]) {
    for (const suffix of ['', '/thumbnail']) await as(test, person).get(`/photos/${photo.id}${suffix}`).expect(404);
  }
  await as(test, student).delete(`/photos/${photo.id}`).expect(403);
  await as(test, stranger).delete(`/photos/${photo.id}`).expect(404);
  await as(test, undefined).get(`/photos/${photo.id}`).expect(401);
  await as(test, admin).get(`/photos/${photo.id}`).expect(200);
});

it('ties a photo of a return to a loan that holds the stone, and to no other', async () => {
  const catalogue = catalogueOf(test, admin);
  const [kit, other] = [await catalogue.kit('501'), await catalogue.kit('502')];
  const stone = await catalogue.stone(kit.id, 'A');
  const [mine, foreign] = await Promise.all([kit, other].map(async ({ id }) => (await test.rows<{ id: string }>(
    `INSERT INTO loan (school_id, kit_id, borrower_id, state, reserved_at, reserved_until, out_at, due_at, deposit_minor, currency)
     VALUES ($1, $2, $3, 'checking', now(), now(), now(), now(), 0, 'EUR') RETURNING id`, [school, id, student.accountId]))[0]?.id ?? ''));
  await test.rows('INSERT INTO loan_stone (school_id, loan_id, stone_id, slot) VALUES ($1, $2, $3, $4)', [school, mine, stone.id, 'A']);
  const send = async (loanId: string) => supertest(test.app).post(`/api/v1/stones/${stone.id}/photos`).set('Authorization', `Bearer ${admin.token}`)
    .attach('photo', await camera(), 'chip.jpg').field('loanId', loanId);
  expect((await send(mine ?? '')).status).toBe(201);
  const refused = await send(foreign ?? '');
  expect([refused.status, (refused.body as ProblemDocument).errors[0]?.field]).toEqual([422, 'loanId']);
  expect(await test.rows('SELECT loan_id FROM photo WHERE stone_id = $1', [stone.id])).toEqual([{ loan_id: mine }]);
});

it('takes a removed photo out of sight everywhere', async () => {
  const photo = (await upload(await camera(), 'a.jpg').expect(201)).body as PhotoView;
  const shown = async (): Promise<string[]> => ((await as(test, admin).get(`/stones/${stoneId}`)).body as StoneView).photos.map(({ id }) => id);
  expect(await shown()).toContain(photo.id);
  await as(test, admin).delete(`/photos/${photo.id}`).expect(204);
  expect(await shown()).not.toContain(photo.id);
  await as(test, admin).get(`/photos/${photo.id}`).expect(404);
  await as(test, admin).delete(`/photos/${photo.id}`).expect(404);
});
