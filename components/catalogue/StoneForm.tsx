import { useState } from 'react';
import { STONE_COLOURS, STONE_FLAGS, type StoneFlag } from '@shared/api/evidence';
import type { NewStoneRequest } from '@shared/api/kits';
import { fieldError } from '@/components/api';
import { Button, CheckboxField, Failed, Form, SegmentedField, SelectField, Stack, Text, TextField } from '@/components/ui';
import { useSpeciesQuery } from './queries';
import { stoneFields, type StoneDraft } from './stoneDraft';
import { flagHints, flagWords } from './words';

interface StoneFormProps {
  initial: StoneDraft;
  currency: string;
  submitLabel: string;
  busy: boolean;
  error: unknown;
  onSubmit: (stone: NewStoneRequest) => void;
}

const shapes = [{ value: 'oval', label: 'oval' }, { value: 'round', label: 'round' }, { value: 'cushion', label: 'cushion' }, { value: 'other', label: 'other' }] as const;
const colours = STONE_COLOURS.map((value) => ({ value, label: value }));
const named: readonly (keyof NewStoneRequest)[] = ['slot', 'species', 'colour', 'shape', 'nominalSize', 'neutralDescription', 'marks', 'source', 'replacementValueMinor', 'flags'];

/** What a stone is, what anyone can see of it, and what replacing it costs. Readings are entered separately, at the bench. */
export function StoneForm({ initial, currency, submitLabel, busy, error, onSubmit }: StoneFormProps) {
  const [draft, setDraft] = useState(initial);
  const [faults, setFaults] = useState<Partial<Record<keyof NewStoneRequest, string>>>({});
  const species = useSpeciesQuery();
  const set = <K extends keyof StoneDraft>(key: K) => (value: StoneDraft[K]) => setDraft((before) => ({ ...before, [key]: value }));
  const fault = (key: keyof NewStoneRequest) => faults[key] ?? fieldError(error, key);
  const submit = () => {
    const fields = stoneFields(draft, currency);
    setFaults(fields.ok ? {} : fields.faults);
    if (fields.ok) onSubmit(fields.stone);
  };
  const toggle = (flag: StoneFlag, on: boolean) => set('flags')(on ? [...draft.flags, flag] : draft.flags.filter((one) => one !== flag));
  return (
    <Form label="Stone" onSubmit={submit}>
      <TextField label="Jar" hint="One letter" required mono value={draft.slot} onChange={set('slot')} error={fault('slot')} maxLength={1} />
      <SelectField label="Species" options={(species.data ?? []).map((row) => ({ value: row.id, label: row.name }))} value={draft.species} onChange={set('species')} error={fault('species') ?? (species.isError ? 'The species table could not be fetched. Reload the page.' : undefined)} />
      <TextField label="What anyone can see" hint="Students read this, so it must not give the answer away: pale blue oval, 8×6" required value={draft.neutralDescription} onChange={set('neutralDescription')} error={fault('neutralDescription')} maxLength={200} />
      <SelectField label="Colour" options={colours} value={draft.colour} onChange={set('colour')} error={fault('colour')} placeholder="not noted" />
      <SegmentedField label="Shape" options={shapes} value={draft.shape} onChange={set('shape')} error={fault('shape')} />
      <TextField label="Nominal size" hint="As sold, for instance 8×6 mm" optional value={draft.nominalSize} onChange={set('nominalSize')} error={fault('nominalSize')} maxLength={40} />
      <TextField label="Marks and chips" optional lines={2} value={draft.marks} onChange={set('marks')} error={fault('marks')} maxLength={1000} />
      <TextField label="Where it came from" optional value={draft.source} onChange={set('source')} error={fault('source')} maxLength={500} />
      <TextField label={`Replacement value, ${currency}`} required mono inputMode="decimal" value={draft.value} onChange={set('value')} error={fault('replacementValueMinor')} />
      <Stack gap="xs">
        <Text strong>To be careful about</Text>
        {STONE_FLAGS.map((flag) => (
          <CheckboxField key={flag} label={flagWords[flag]} hint={flagHints[flag]} checked={draft.flags.includes(flag)} onChange={(on) => toggle(flag, on)} />
        ))}
      </Stack>
      {error && !named.some((key) => fieldError(error, key)) ? <Failed error={error} /> : null}
      <Button label={submitLabel} submits busy={busy} />
    </Form>
  );
}
