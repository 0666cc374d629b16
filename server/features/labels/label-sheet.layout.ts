import type { SheetPage, SheetSize } from '@shared/api/labels';

/** Where the labels of a sheet are, in mm. The grid stands in the middle of the page. */
export interface SheetLayout {
  readonly pageWidthMm: number;
  readonly pageHeightMm: number;
  readonly columns: number;
  readonly rows: number;
  readonly labelWidthMm: number;
  readonly labelHeightMm: number;
  readonly columnGapMm: number;
  readonly rowGapMm: number;
}

const a4 = { pageWidthMm: 210, pageHeightMm: 297 };
const letter = { pageWidthMm: 215.9, pageHeightMm: 279.4 };

// Grids of ordinary self-adhesive sheets (common practice, from memory), so that a bought sheet fits; on plain paper the
// outlines are for the scissors.
const layouts: Readonly<Record<SheetPage, Readonly<Record<SheetSize, SheetLayout>>>> = {
  A4: {
    small: { ...a4, columns: 5, rows: 13, labelWidthMm: 38.1, labelHeightMm: 21.2, columnGapMm: 2.5, rowGapMm: 0 },
    medium: { ...a4, columns: 3, rows: 7, labelWidthMm: 63.5, labelHeightMm: 38.1, columnGapMm: 2.5, rowGapMm: 0 },
    large: { ...a4, columns: 2, rows: 4, labelWidthMm: 99.1, labelHeightMm: 67.7, columnGapMm: 2.5, rowGapMm: 0 },
  },
  Letter: {
    small: { ...letter, columns: 3, rows: 10, labelWidthMm: 66.675, labelHeightMm: 25.4, columnGapMm: 3.175, rowGapMm: 0 },
    medium: { ...letter, columns: 2, rows: 5, labelWidthMm: 101.6, labelHeightMm: 50.8, columnGapMm: 4.7625, rowGapMm: 0 },
    large: { ...letter, columns: 2, rows: 3, labelWidthMm: 101.6, labelHeightMm: 84.667, columnGapMm: 4.7625, rowGapMm: 0 },
  },
};

export function sheetLayout(page: SheetPage, size: SheetSize): SheetLayout {
  return layouts[page][size];
}

export function labelsPerSheet({ columns, rows }: SheetLayout): number {
  return columns * rows;
}

export interface Place {
  /** Counts sheets from 0. */
  readonly sheet: number;
  readonly leftMm: number;
  readonly topMm: number;
}

/**
 * The place of the label at `index` (from 0) when the first sheet's places before `startAt` (from 1) are used up.
 * Places run along the rows, from the top left.
 */
export function placeOf(layout: SheetLayout, index: number, startAt: number): Place {
  const position = index + startAt - 1;
  const perSheet = labelsPerSheet(layout);
  const onSheet = position % perSheet;
  const column = onSheet % layout.columns;
  const row = Math.floor(onSheet / layout.columns);
  return {
    sheet: Math.floor(position / perSheet),
    leftMm: marginMm(layout.pageWidthMm, layout.columns, layout.labelWidthMm, layout.columnGapMm) + column * (layout.labelWidthMm + layout.columnGapMm),
    topMm: marginMm(layout.pageHeightMm, layout.rows, layout.labelHeightMm, layout.rowGapMm) + row * (layout.labelHeightMm + layout.rowGapMm),
  };
}

function marginMm(pageMm: number, count: number, labelMm: number, gapMm: number): number {
  return (pageMm - count * labelMm - (count - 1) * gapMm) / 2;
}
