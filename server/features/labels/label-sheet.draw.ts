import { groupLabelCode, labelUrl } from '@shared/codes';
import { create } from 'qrcode';
import type { SheetLayout } from './label-sheet.layout';

/** What stands on one label. Nothing on it may tell the species: it travels with the student. */
export interface SheetLabel {
  readonly code: string;
  readonly kitNumber: string;
  /** The jar's letter; a kit's own label has none. */
  readonly slot?: string;
  /** A short neutral line, for instance the school's name. */
  readonly line: string;
}

const labelFonts = {
  code: require.resolve('@expo-google-fonts/spline-sans-mono/500Medium/SplineSansMono_500Medium.ttf'),
  strong: require.resolve('@expo-google-fonts/atkinson-hyperlegible-next/700Bold/AtkinsonHyperlegibleNext_700Bold.ttf'),
  plain: require.resolve('@expo-google-fonts/atkinson-hyperlegible-next/400Regular/AtkinsonHyperlegibleNext_400Regular.ttf'),
} as const;

const quietModules = 4; // ISO/IEC 18004: four modules of white on every side
const ptPerMm = 72 / 25.4;
/** Smallest module that office printers and phone cameras manage: two dots at 150 dpi. */
const minModuleMm = 0.33;

/** How a label of this size is divided. Lengths in mm. */
interface Division {
  readonly paddingMm: number;
  readonly codeMm: number;
  /** Side of the code's square, quiet zone included. */
  readonly squareMm: number;
}

function divide({ labelHeightMm, labelWidthMm }: SheetLayout): Division {
  const paddingMm = labelHeightMm < 30 ? 1 : 2;
  const codeMm = Math.min(labelHeightMm * 0.14, 6);
  const squareMm = Math.min(labelHeightMm - 2 * paddingMm - codeMm, labelWidthMm * 0.5);
  return { paddingMm, codeMm, squareMm };
}

/** The QR code's modules at error correction M. */
function modulesOf(url: string): { count: number; isDark: (row: number, column: number) => boolean } {
  const { modules } = create(url, { errorCorrectionLevel: 'M' });
  return { count: modules.size, isDark: (row, column) => modules.get(row, column) === 1 };
}

/** Width of one module in mm, or null where the link is too long to be printed legibly at this size. */
export function moduleMm(layout: SheetLayout, publicUrl: string, code: string): number | null {
  const width = divide(layout).squareMm / (modulesOf(labelUrl(publicUrl, code)).count + 2 * quietModules);
  return width >= minModuleMm ? width : null;
}

/** Draws one label with its top left corner at the given place. */
export function drawLabel(doc: PDFKit.PDFDocument, layout: SheetLayout, at: { leftMm: number; topMm: number }, label: SheetLabel, publicUrl: string): void {
  const division = divide(layout);
  doc.save().translate(at.leftMm * ptPerMm, at.topMm * ptPerMm).scale(ptPerMm); // from here on everything is in mm
  doc.lineWidth(0.1).strokeColor('#CFD5DA').rect(0, 0, layout.labelWidthMm, layout.labelHeightMm).stroke();
  const codeLeftMm = drawCode(doc, division, labelUrl(publicUrl, label.code));
  drawWords(doc, layout, { ...division, codeLeftMm }, label);
  doc.restore();
}

/**
 * One path for the whole code, each row's dark runs as one rectangle: no seams, whatever the printer's resolution.
 * @returns where its dark part begins, mm from the label's left
 */
function drawCode(doc: PDFKit.PDFDocument, { paddingMm, squareMm }: Division, url: string): number {
  const { count, isDark } = modulesOf(url);
  const module = squareMm / (count + 2 * quietModules);
  const origin = paddingMm + quietModules * module;
  for (let row = 0; row < count; row += 1) {
    for (let from = 0; from < count; from += 1) {
      if (!isDark(row, from)) continue;
      let to = from;
      while (to < count && isDark(row, to)) to += 1;
      doc.rect(origin + from * module, origin + row * module, (to - from) * module, module);
      from = to;
    }
  }
  doc.fill('#000000');
  return origin;
}

function drawWords(doc: PDFKit.PDFDocument, layout: SheetLayout, division: Division & { codeLeftMm: number }, label: SheetLabel): void {
  const { paddingMm, codeMm, squareMm, codeLeftMm } = division;
  fit(doc, labelFonts.code, groupLabelCode(label.code), {
    left: codeLeftMm, top: paddingMm + squareMm - codeMm * 0.15, width: layout.labelWidthMm - codeLeftMm - paddingMm, height: codeMm, color: '#000000',
  });

  const left = paddingMm + squareMm;
  const width = layout.labelWidthMm - left - paddingMm;
  const lineMm = Math.min(squareMm * 0.16, 4);
  const kitMm = Math.min(squareMm * 0.26, 7);
  const top = paddingMm + squareMm * 0.1;
  fit(doc, labelFonts.strong, `Kit ${label.kitNumber}`, { left, top, width, height: kitMm, color: '#16141D' });
  if (label.slot !== undefined) fit(doc, labelFonts.strong, label.slot, { left, top: top + kitMm, width, height: squareMm * 0.42, color: '#16141D' });
  fit(doc, labelFonts.plain, label.line, { left, top: paddingMm + squareMm - lineMm - squareMm * 0.08, width, height: lineMm, color: '#565B66' });
}

interface Box {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
  readonly color: string;
}

/** One line of text as large as the box allows; below a readable size it ends in an ellipsis. */
function fit(doc: PDFKit.PDFDocument, font: string, text: string, box: Box): void {
  const smallest = 1.6; // mm; about 4.5 pt
  doc.font(font).fontSize(box.height / 1.25);
  const natural = doc.widthOfString(text);
  if (natural > box.width) doc.fontSize(Math.max(smallest, (box.height / 1.25) * (box.width / natural)));
  let shown = text;
  while (shown.length > 1 && doc.widthOfString(shown) > box.width + 0.01) shown = `${shown.replace(/…$/, '').slice(0, -1).trimEnd()}…`;
  doc.fillColor(box.color).text(shown, box.left, box.top, { lineBreak: false });
}
