import { useState } from 'react';
import { INSTRUMENT_KINDS, type InstrumentKind } from '@shared/api/instruments';
import { fieldError } from '@/components/api';
import { Button, Failed, Form, NumberField, SelectField, TextField } from '@/components/ui';
import { kindWords, usualFigures, type InstrumentDraft } from './instrumentDraft';

interface InstrumentFormProps {
  initial: InstrumentDraft;
  /** A new entry chooses its kind; an old one keeps it. */
  isNew: boolean;
  busy: boolean;
  error: unknown;
  onSubmit: (draft: InstrumentDraft) => void;
}

const fields = ['kind', 'name', 'resolution', 'standardUncertainty', 'spotUncertainty', 'liquidLimitRi'] as const;

/** One entry of the register. Readings take their uncertainty from here. */
export function InstrumentForm({ initial, isNew, busy, error, onSubmit }: InstrumentFormProps) {
  const [draft, setDraft] = useState(initial);
  const set = (key: keyof InstrumentDraft) => (value: string) => setDraft((before) => ({ ...before, [key]: value }));
  const { unit } = kindWords[draft.kind];
  const choose = (kind: InstrumentKind) => setDraft({ kind, name: draft.name, ...usualFigures[kind] });
  return (
    <Form label="Instrument" onSubmit={() => onSubmit(draft)}>
      {isNew ? <SelectField label="Kind" options={INSTRUMENT_KINDS.map((value) => ({ value, label: kindWords[value].label }))} value={draft.kind} onChange={choose} error={fieldError(error, 'kind')} /> : null}
      <TextField label="Name" hint="As people at the bench call it, for instance: Balance 1" required value={draft.name} onChange={set('name')} error={fieldError(error, 'name')} maxLength={80} />
      {unit ? (
        <>
          <NumberField label="Resolution" unit={unit} hint="The smallest step it shows" value={draft.resolution} onChange={set('resolution')} error={fieldError(error, 'resolution')} />
          <NumberField label="Standard uncertainty of one reading" unit={unit} hint="k = 1: about two thirds of readings lie within it" value={draft.standardUncertainty} onChange={set('standardUncertainty')} error={fieldError(error, 'standardUncertainty')} />
        </>
      ) : null}
      {draft.kind === 'refractometer' ? (
        <>
          <NumberField label="Standard uncertainty of a spot reading" unit="RI" value={draft.spotUncertainty} onChange={set('spotUncertainty')} error={fieldError(error, 'spotUncertainty')} />
          <NumberField label="Limit of the contact liquid" unit="RI" hint="Stones above it read as over the limit" value={draft.liquidLimitRi} onChange={set('liquidLimitRi')} error={fieldError(error, 'liquidLimitRi')} />
        </>
      ) : null}
      {error && !fields.some((field) => fieldError(error, field)) ? <Failed error={error} /> : null}
      <Button label={isNew ? 'Add the instrument' : 'Save'} submits busy={busy} />
    </Form>
  );
}
