import { execFileSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import sharp from 'sharp';
import { groupLabelCode, labelUrl, LABEL_RANDOM_BYTES, makeLabelCode, parseLabelCode } from '@shared/codes';
import { SHEET_PAGES, SHEET_SIZES } from '@shared/api/labels';
import { makeLabelSheet, type SheetLabel } from '@/server/features/labels/label-sheet';
import { labelsPerSheet, placeOf, sheetLayout } from '@/server/features/labels/label-sheet.layout';
import { cutLabel, labelImage, rasterise, readQrCodes } from '@/tests/support/labelImage';

const publicUrl = 'https://lend.portellery.example'; // links of 46 characters

function someLabels(count: number): SheetLabel[] {
  return Array.from({ length: count }, (_, index) => ({
    code: makeLabelCode(randomBytes(LABEL_RANDOM_BYTES)), kitNumber: '014', line: 'Portellery School of Gemmology',
    ...(index % 7 === 0 ? {} : { slot: 'ABCDEF'.charAt((index % 7) - 1) }),
  }));
}

describe.each(SHEET_PAGES.flatMap((page) => SHEET_SIZES.map((size) => [page, size] as const)))('a sheet of %s, %s labels,', (page, size) => {
  const layout = sheetLayout(page, size);
  const perSheet = labelsPerSheet(layout);

  it('is read back label by label at 150 dpi by an independent reader, over two sheets', async () => {
    const startAt = Math.min(perSheet, 4);
    const labels = someLabels(perSheet);
    const pages = await rasterise(await makeLabelSheet({ labels: labels, page, size, startAt, publicUrl }), 150);
    expect(pages).toHaveLength(2);
    const checked = labels.map((label, index) => ({ label, place: placeOf(layout, index, startAt) })).filter((_, index) => index < 8 || index >= labels.length - 3);
    const pictures = await Promise.all(checked.map(({ place }) => cutLabel(pages[place.sheet] ?? Buffer.alloc(0), layout, place, 150)));
    expect(await readQrCodes(pictures)).toEqual(checked.map(({ label }) => labelUrl(publicUrl, label.code)));
  });

  it('carries each code in characters, and its fonts', async () => {
    const labels = someLabels(3);
    const pdf = await makeLabelSheet({ labels, page, size, startAt: 1, publicUrl });
    const text = execFileSync('pdftotext', ['-', '-'], { input: pdf, encoding: 'utf8' });
    for (const { code } of labels) expect(text).toContain(groupLabelCode(code));
    const fonts = execFileSync('pdffonts', ['-'], { input: pdf, encoding: 'utf8' }).trim().split('\n').slice(2);
    expect(fonts.length).toBeGreaterThanOrEqual(3);
    for (const font of fonts) expect(font).toMatch(/\byes yes yes\b/);
  });
});

it('a label’s picture for a fake camera is read back to its code', async () => {
  const code = makeLabelCode(randomBytes(LABEL_RANDOM_BYTES));
  const [text = ''] = await readQrCodes([await labelImage({ code, publicUrl: 'http://localhost:8080', slot: 'B' })]);
  expect(parseLabelCode(text)).toEqual({ code });
});

it('a label without a code is not read, so the reader above can fail', async () => {
  const code = makeLabelCode(randomBytes(LABEL_RANDOM_BYTES));
  const picture = await labelImage({ code, publicUrl });
  const { width, height } = await sharp(picture).metadata();
  const blanked = await sharp(picture).extract({ left: Math.floor(width / 2), top: 0, width: Math.floor(width / 2), height }).png().toBuffer();
  expect(await readQrCodes([blanked])).toEqual(['']);
});

it('the longest link that is accepted for small labels is still read at 150 dpi, and a longer one is refused', async () => {
  const longest = `https://${'a'.repeat(60)}.example`; // 75 characters and /l/ and the code: 90
  const image = await labelImage({ code: 'ABSRRWDKSWVN', publicUrl: longest, size: 'small', dpi: 150 });
  expect(await readQrCodes([image])).toEqual([labelUrl(longest, 'ABSRRWDKSWVN')]);
  const label = { code: 'ABSRRWDKSWVN', kitNumber: '014', line: '' };
  await expect(makeLabelSheet({ labels: [label], page: 'A4', size: 'small', startAt: 1, publicUrl: `https://${'a'.repeat(100)}.example` })).rejects.toMatchObject({ field: 'size' });
});
