import { useState } from 'react';
import { SHEET_PAGES, SHEET_SIZES, type SheetPage, type SheetSize } from '@shared/api/labels';
import { fieldError } from '@/components/api';
import { Button, Failed, Form, NumberField, parseNumber, SegmentedField, useAnnounce } from '@/components/ui';
import { useLabelSheetMutation } from './queries';

/** A printable sheet of the labels of one or several kits. */
export function SheetForm({ kitIds }: { kitIds: readonly string[] }) {
  const [page, setPage] = useState<SheetPage>('A4');
  const [size, setSize] = useState<SheetSize>('medium');
  const [startAt, setStartAt] = useState('1');
  const sheet = useLabelSheetMutation();
  const announce = useAnnounce();
  const print = () =>
    sheet.mutate({ kitIds: [...kitIds], page, size, startAt: parseNumber(startAt) ?? 0 }, { onSuccess: () => announce('The sheet is in your downloads') });
  return (
    <Form label="Sheet of labels" onSubmit={print}>
      <SegmentedField label="Paper" options={SHEET_PAGES.map((value) => ({ value, label: value }))} value={page} onChange={setPage} />
      <SegmentedField label="Label size" options={SHEET_SIZES.map((value) => ({ value, label: value }))} value={size} onChange={setSize} />
      <NumberField label="First free place on the sheet" hint="1 for a new sheet; count along the rows of a part-used one" value={startAt} onChange={setStartAt} error={fieldError(sheet.error, 'startAt')} />
      {sheet.error && !fieldError(sheet.error, 'startAt') ? <Failed error={sheet.error} /> : null}
      <Button label="Make the sheet (PDF)" submits busy={sheet.isPending} disabled={kitIds.length === 0} />
    </Form>
  );
}
