import { useState } from 'react';
import type { NewKitRequest } from '@shared/api/kits';
import { fieldError } from '@/components/api';
import { Button, Failed, Form, TextField } from '@/components/ui';

interface KitFormProps {
  initial?: NewKitRequest;
  submitLabel: string;
  busy: boolean;
  error: unknown;
  onSubmit: (kit: NewKitRequest) => void;
}

const fields = ['number', 'title', 'neutralTitle'] as const;

/** A kit's number and its two titles: the true one for staff, the neutral one for those who must stay blind. */
export function KitForm({ initial, submitLabel, busy, error, onSubmit }: KitFormProps) {
  const [kit, setKit] = useState<NewKitRequest>(initial ?? { number: '', title: '', neutralTitle: '' });
  const set = (key: keyof NewKitRequest) => (value: string) => setKit((before) => ({ ...before, [key]: value }));
  return (
    <Form label="Kit" onSubmit={() => onSubmit({ ...kit, number: kit.number.trim().toUpperCase() })}>
      {initial ? null : <TextField label="Number" hint="As on the box, for instance 014" required mono value={kit.number} onChange={set('number')} error={fieldError(error, 'number')} maxLength={12} />}
      <TextField label="Title for staff" hint="May say what the stones are" required value={kit.title} onChange={set('title')} error={fieldError(error, 'title')} maxLength={120} />
      <TextField label="Neutral title for students" hint="Must not give an answer away, for instance: Practice set 014" required value={kit.neutralTitle} onChange={set('neutralTitle')} error={fieldError(error, 'neutralTitle')} maxLength={120} />
      {error && !fields.some((field) => fieldError(error, field)) ? <Failed error={error} /> : null}
      <Button label={submitLabel} submits busy={busy} />
    </Form>
  );
}
