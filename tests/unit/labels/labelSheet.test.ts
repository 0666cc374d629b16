import { create } from 'qrcode';
import { SHEET_PAGES, SHEET_SIZES } from '@shared/api/labels';
import { labelUrl } from '@shared/codes';
import { LabelSheetRefused, makeLabelSheet } from '@/server/features/labels/label-sheet';
import { moduleMm } from '@/server/features/labels/label-sheet.draw';
import { labelsPerSheet, placeOf, sheetLayout } from '@/server/features/labels/label-sheet.layout';

const everySheet = SHEET_PAGES.flatMap((page) => SHEET_SIZES.map((size) => [page, size] as const));
const label = { code: 'ABSRRWDKSWVN', kitNumber: '014', line: 'Portellery School' };

describe.each(everySheet)('the grid of %s, %s', (page, size) => {
  const layout = sheetLayout(page, size);
  const places = Array.from({ length: labelsPerSheet(layout) }, (_, index) => placeOf(layout, index, 1));

  it('lies on the page, and no two labels overlap', () => {
    for (const { leftMm, topMm } of places) {
      expect(leftMm).toBeGreaterThan(0);
      expect(topMm).toBeGreaterThan(0);
      expect(leftMm + layout.labelWidthMm).toBeLessThan(layout.pageWidthMm);
      expect(topMm + layout.labelHeightMm).toBeLessThan(layout.pageHeightMm);
    }
    const overlaps = places.some((a, i) => places.some((b, j) => i < j
      && Math.abs(a.leftMm - b.leftMm) < layout.labelWidthMm - 1e-6 && Math.abs(a.topMm - b.topMm) < layout.labelHeightMm - 1e-6));
    expect(overlaps).toBe(false);
  });

  it('has a code of a 44-character link at least 12 mm wide', () => {
    const origin = 'https://lends.portellery.test';
    const url = labelUrl(origin, label.code);
    expect(url).toHaveLength(44);
    const { size: modules } = create(url, { errorCorrectionLevel: 'M' }).modules;
    expect(modules * (moduleMm(layout, origin, label.code) ?? 0)).toBeGreaterThanOrEqual(12);
  });

  it('begins where a part-used sheet is free, and goes on with a fresh one', () => {
    const perSheet = labelsPerSheet(layout);
    expect(placeOf(layout, 0, perSheet)).toEqual({ ...places[perSheet - 1], sheet: 0 });
    expect(placeOf(layout, 1, perSheet)).toEqual({ ...places[0], sheet: 1 });
  });

  it.each([0, -1, 1.5, Number.NaN, labelsPerSheet(layout) + 1])('refuses to begin at %p, and says which places there are', async (startAt) => {
    const making = makeLabelSheet({ labels: [label], page, size, startAt, publicUrl: 'http://localhost:8080' });
    await expect(making).rejects.toThrow(LabelSheetRefused);
    await expect(making).rejects.toMatchObject({ field: 'startAt', message: expect.stringContaining(`1 to ${labelsPerSheet(layout)}`) as string });
  });
});

it('refuses an empty sheet', async () => {
  await expect(makeLabelSheet({ labels: [], page: 'A4', size: 'small', startAt: 1, publicUrl: 'http://localhost' })).rejects.toMatchObject({ field: 'labels' });
});
