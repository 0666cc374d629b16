import { useId, useRef, useState, type KeyboardEvent } from 'react';
import type { Attribute, StoneFlag } from '@shared/api/evidence';
import { INSTRUMENT_FOR } from '@shared/api/instruments';
import type { InstrumentView } from '@shared/api/instruments';
import type { ReadingEntry } from '@shared/api/kits';
import { ApiProblem } from '@/components/api';
import { Button, Failed, Form, Notice, Stack, Text } from '@/components/ui';
import { AddReading } from './AddReading';
import { cautionFor } from './cautions';
import { draftFaults, emptyDraft, faultsOfServer, isBlank, toEntries, type DraftFaults, type DraftReading } from './draft';
import { useChosenInstruments } from './instruments';
import { InstrumentLine } from './InstrumentLine';
import { focusNextReading } from './ReadingInput';
import { ReadingLine } from './ReadingLine';

export interface ReadingFormProps {
  /** Lines to begin with. */
  attributes: readonly Attribute[];
  flags: readonly StoneFlag[];
  register: readonly InstrumentView[];
  submitLabel: string;
  busy: boolean;
  error: unknown;
  onSubmit: (entries: ReadingEntry[]) => void;
}

/**
 * Entry of readings for one stone: lines for what is usually read, more at will, the instrument of each kind remembered.
 * Blank lines are left out. Enter goes to the next line and hands in from the last. Remount (by `key`) for another stone.
 */
export function ReadingForm({ attributes, flags, register, submitLabel, busy, error, onSubmit }: ReadingFormProps) {
  const formId = useId();
  const serial = useRef(attributes.length);
  const [drafts, setDrafts] = useState<DraftReading[]>(() => attributes.map((attribute, index) => emptyDraft(attribute, `${index}`)));
  const [faults, setFaults] = useState<DraftFaults>({});
  const [sentKeys, setSentKeys] = useState<string[]>([]);
  const [nothing, setNothing] = useState(false);
  const { chosen, choose } = useChosenInstruments(register);

  const change = (key: string, part: Partial<DraftReading>) => {
    setNothing(false);
    setFaults({});
    setDrafts((before) => before.map((draft) => (draft.key === key ? { ...draft, ...part } : draft)));
  };
  const add = (attribute: Attribute) => {
    const key = String(serial.current++);
    setDrafts((before) => [...before, emptyDraft(attribute, key)]);
  };
  const submit = () => {
    const found = draftFaults(drafts);
    setFaults(found);
    setNothing(drafts.every(isBlank));
    if (Object.keys(found).length > 0 || drafts.every(isBlank)) return;
    const { entries, keys } = toEntries(drafts, chosen);
    setSentKeys(keys);
    onSubmit(entries);
  };

  const serverFaults = error instanceof ApiProblem ? faultsOfServer(error.errors, sentKeys) : {};
  const shown = Object.keys(faults).length > 0 ? faults : serverFaults;
  const kinds = [...new Set(drafts.map((draft) => INSTRUMENT_FOR[draft.attribute]))].filter((kind) => kind !== null);
  const caution = drafts.map((draft) => cautionFor(draft.attribute, flags)).find((one) => one !== null);

  return (
    <Form onSubmit={submit} label="Readings">
      {caution ? <Notice kind="caution" title={caution.title}>{caution.text}</Notice> : null}
      {flags.includes('fragile') ? <Notice kind="caution" title="Fragile stone">It cleaves or chips easily: no drop, no shock, no tweezers at the girdle.</Notice> : null}
      <div onKeyDown={enterGoesOn}>
        <Stack gap="md">
          {drafts.map((draft, index) => (
            <ReadingLine
              key={draft.key}
              id={`${formId}${draft.key}`}
              draft={draft}
              again={drafts.slice(0, index).some((one) => one.attribute === draft.attribute)}
              faults={shown}
              onChange={(part) => change(draft.key, part)}
            />
          ))}
        </Stack>
      </div>
      <AddReading drafts={drafts} onAdd={add} />
      <InstrumentLine kinds={kinds} register={register} chosen={chosen} onChoose={choose} />
      {nothing ? <Text tone="different" role="alert">Enter at least one reading, then hand it in.</Text> : null}
      {error && Object.keys(serverFaults).length === 0 ? <Failed error={error} /> : null}
      <Button label={submitLabel} submits busy={busy} />
    </Form>
  );
}

/** Enter in a field goes to the next one; in the last it hands the entry in, as forms do. */
function enterGoesOn(event: KeyboardEvent<HTMLElement>): void {
  if (event.key === 'Enter' && focusNextReading()) event.preventDefault();
}
