import { useState } from 'react';
import { useBreakpoints } from '@/components/theme';
import { Field, Labelled, Stack } from '@/components/ui';
import { NumberPad, typed } from './NumberPad';

export interface ReadingInputProps {
  label: string;
  unit?: string | undefined;
  value: string;
  error?: string | undefined;
  onChange: (value: string) => void;
}

/** A number read off an instrument. On a phone the bench's own large keys open under it while it is being filled. */
export function ReadingInput({ label, unit, value, error, onChange }: ReadingInputProps) {
  const { phone } = useBreakpoints();
  const [active, setActive] = useState(false);
  const clean = (text: string) => onChange(text.replace(/[^\d.,]/g, ''));
  return (
    <div data-reading onFocus={() => setActive(true)} onBlur={() => setActive(false)}>
      <Stack gap="sm">
        <Labelled label={label} error={error}>
          <Field.Input {...(unit === undefined ? {} : { unit })} mono inputMode={phone ? 'none' : 'decimal'} autoComplete="off" value={value} onChangeText={clean} />
        </Labelled>
        {phone && active ? <NumberPad label={label} onKey={(key) => clean(typed(value, key))} onNext={focusNextReading} /> : null}
      </Stack>
    </div>
  );
}

/** Moves the focus to the next field of the entry form; false where the focus is in the last one. */
export function focusNextReading(): boolean {
  const current = document.activeElement;
  const form = current?.closest('form');
  if (!form || !(current instanceof HTMLElement)) return false;
  const fields = Array.from(form.querySelectorAll<HTMLInputElement>('[data-reading] input')).filter((field) => field.type !== 'checkbox');
  const next = fields.find((field) => (current.compareDocumentPosition(field) & Node.DOCUMENT_POSITION_FOLLOWING) !== 0 && field.name !== (current as HTMLInputElement).name) ?? null;
  next?.focus();
  return next !== null;
}
