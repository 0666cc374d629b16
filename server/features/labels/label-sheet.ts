import type { SheetPage, SheetSize } from '@shared/api/labels';
import PDFDocument from 'pdfkit';
import { drawLabel, moduleMm, type SheetLabel } from './label-sheet.draw';
import { labelsPerSheet, placeOf, sheetLayout } from './label-sheet.layout';

export type { SheetLabel } from './label-sheet.draw';

export interface LabelSheetInput {
  /** 1 to 1500, in the order in which they are printed. */
  readonly labels: readonly SheetLabel[];
  readonly page: SheetPage;
  readonly size: SheetSize;
  /** First free place of a part-used sheet, 1 for a fresh one; counted along the rows from the top left. */
  readonly startAt: number;
  /** Origin the labels' links lead to. */
  readonly publicUrl: string;
}

/** Why a sheet cannot be made, with the field to blame; `message` is for people. */
export class LabelSheetRefused extends Error {
  override readonly name = 'LabelSheetRefused';
  constructor(readonly field: 'labels' | 'startAt' | 'size', message: string) {
    super(message);
  }
}

const maxLabels = 1500;
const ptPerMm = 72 / 25.4;

/**
 * Makes printable sheets of labels: for each a vector QR code of `<publicUrl>/l/<code>`, the code in characters beneath
 * it, and the kit's number and jar's letter. Fonts are embedded.
 *
 * @throws LabelSheetRefused
 */
export async function makeLabelSheet(input: LabelSheetInput): Promise<Buffer> {
  check(input);
  const { labels, page, size, startAt, publicUrl } = input;
  const layout = sheetLayout(page, size);
  const doc = new PDFDocument({ autoFirstPage: false, margin: 0, info: { Title: 'Labels', Creator: 'Trayward' }, lang: 'en' });
  const whole = collect(doc);
  let sheet = -1;
  labels.forEach((label, index) => {
    const place = placeOf(layout, index, startAt);
    if (place.sheet > sheet) {
      doc.addPage({ size: [layout.pageWidthMm * ptPerMm, layout.pageHeightMm * ptPerMm], margin: 0 });
      sheet = place.sheet;
    }
    drawLabel(doc, layout, place, label, publicUrl);
  });
  doc.end();
  return whole;
}

function check({ labels, page, size, startAt, publicUrl }: LabelSheetInput): void {
  const layout = sheetLayout(page, size);
  const perSheet = labelsPerSheet(layout);
  const [first] = labels;
  if (first === undefined) throw new LabelSheetRefused('labels', 'There is nothing to print. Pick a kit with labels.');
  if (labels.length > maxLabels) throw new LabelSheetRefused('labels', `At most ${maxLabels} labels go into one print. Pick fewer kits.`);
  if (!Number.isInteger(startAt) || startAt < 1 || startAt > perSheet) {
    throw new LabelSheetRefused('startAt', `This sheet has places 1 to ${perSheet}. Give the first free one.`);
  }
  if (moduleMm(layout, publicUrl, first.code) === null) {
    throw new LabelSheetRefused('size', 'The address of this site is too long for labels of this size. Pick a larger size.');
  }
}

function collect(doc: PDFKit.PDFDocument): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    const parts: Buffer[] = [];
    doc.on('data', (part: Buffer) => parts.push(part));
    doc.on('end', () => resolve(Buffer.concat(parts)));
    doc.on('error', reject);
  });
}
