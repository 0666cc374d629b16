import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import sharp from 'sharp';
import type { SheetSize } from '@shared/api/labels';
import { makeLabelSheet } from '@/server/features/labels/label-sheet';
import { placeOf, sheetLayout, type SheetLayout } from '@/server/features/labels/label-sheet.layout';

const run = promisify(execFile);
const px = (mm: number, dpi: number): number => Math.round((mm / 25.4) * dpi);

/** Rasterises every page of a PDF with poppler (an independent reader of PDF) to PNG. */
export async function rasterise(pdf: Buffer, dpi: number): Promise<Buffer[]> {
  const folder = await mkdtemp(path.join(tmpdir(), 'trayward-label-'));
  try {
    await writeFile(path.join(folder, 'sheet.pdf'), pdf);
    await run('pdftoppm', ['-r', String(dpi), '-png', path.join(folder, 'sheet.pdf'), path.join(folder, 'page')]);
    const { stdout } = await run('ls', [folder]);
    const pages = stdout.split('\n').filter((name) => name.startsWith('page')).sort();
    return await Promise.all(pages.map((name) => readFile(path.join(folder, name))));
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

/** Cuts one label out of its rasterised page, as scissors would. */
export function cutLabel(page: Buffer, layout: SheetLayout, at: { leftMm: number; topMm: number }, dpi: number): Promise<Buffer> {
  return sharp(page)
    .extract({ left: px(at.leftMm, dpi), top: px(at.topMm, dpi), width: px(layout.labelWidthMm, dpi), height: px(layout.labelHeightMm, dpi) })
    .png()
    .toBuffer();
}

/**
 * The picture of one printed label, made from the real sheet: for a fake camera's feed.
 *
 * @returns PNG; a large label at the default 200 dpi is 780 × 533 px
 */
export async function labelImage(options: { code: string; publicUrl: string; kitNumber?: string; slot?: string; size?: SheetSize; dpi?: number }): Promise<Buffer> {
  const { code, publicUrl, kitNumber = '014', size = 'large', dpi = 200 } = options;
  const label = { code, kitNumber, line: 'Portellery School', ...(options.slot === undefined ? {} : { slot: options.slot }) };
  const [page] = await rasterise(await makeLabelSheet({ labels: [label], page: 'A4', size, startAt: 1, publicUrl }), dpi);
  if (!page) throw new Error('the sheet has no page');
  const layout = sheetLayout('A4', size);
  return cutLabel(page, layout, placeOf(layout, 0, 1), dpi);
}

/** Reads the QR code of each picture with zbarimg (a reader that shares nothing with our writer); '' where it finds none. */
export async function readQrCodes(pictures: readonly Buffer[]): Promise<string[]> {
  const folder = await mkdtemp(path.join(tmpdir(), 'trayward-zbar-'));
  try {
    const texts: string[] = [];
    for (const [index, picture] of pictures.entries()) {
      const file = path.join(folder, `${index}.png`);
      await writeFile(file, picture);
      texts.push(await run('zbarimg', ['-q', '--raw', '--nodbus', '-Sdisable', '-Sqrcode.enable', file]).then(({ stdout }) => stdout.trim(), () => ''));
    }
    return texts;
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
