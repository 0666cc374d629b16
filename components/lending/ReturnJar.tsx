import { useState } from 'react';
import type { LoanJar } from '@shared/api/loans';
import { Button, Dialog, ListRow, Mono, RadioField, Stack, StateBadge, TextField } from '@/components/ui';
import type { Said } from './ReturnScreen';

const badges = {
  seen: { state: 'same', label: 'seen' },
  missing: { state: 'different', label: 'missing' },
  damaged: { state: 'different', label: 'damaged' },
} as const;

/** One jar at return: seen by its scan, or said to be missing or damaged. */
export function ReturnJar({ jar, said, last, onSay }: { jar: LoanJar; said: Said | null; last: boolean; onSay: (said: Said) => void }) {
  const [open, setOpen] = useState(false);
  return (
    <ListRow
      inset
      rule={!last}
      before={<Mono strong>{jar.slot}</Mono>}
      title={jar.neutralDescription}
      detail={said?.condition || jar.outCondition || 'no marks noted'}
      after={said ? <StateBadge {...badges[said.state]} /> : <StateBadge state="neutral" label="not yet" />}
    >
      <Button
        kind="quiet"
        label="Something is wrong"
        accessibleLabel={`Something is wrong with jar ${jar.slot}`}
        haspopup="dialog"
        onPress={() => setOpen(true)}
        style={{ alignSelf: 'flex-start', paddingHorizontal: 0 }}
      />
      {open ? <SayDialog jar={jar} said={said} onClose={() => setOpen(false)} onSay={onSay} /> : null}
    </ListRow>
  );
}

function SayDialog({ jar, said, onClose, onSay }: { jar: LoanJar; said: Said | null; onClose: () => void; onSay: (said: Said) => void }) {
  const [state, setState] = useState<Said['state']>(said?.state ?? 'damaged');
  const [condition, setCondition] = useState(said?.condition ?? '');
  const [missing, setMissing] = useState(false);
  const save = () => {
    const needsWords = state === 'damaged' && condition.trim() === '';
    setMissing(needsWords);
    if (needsWords) return;
    onSay({ state, condition: condition.trim() });
    onClose();
  };
  return (
    <Dialog open onClose={onClose} title={`Jar ${jar.slot}`} action={<Button label="Save" onPress={save} />}>
      <Stack gap="lg">
        <RadioField
          label="What is it?"
          options={[
            { value: 'damaged', label: 'Damaged', hint: 'chipped, cracked or broken' },
            { value: 'missing', label: 'Missing', hint: 'the stone or its jar is not here' },
            { value: 'seen', label: 'Here, but its label cannot be scanned' },
          ]}
          value={state}
          onChange={setState}
        />
        <TextField label="In a few words" lines={2} value={condition} onChange={setCondition} error={missing && condition.trim() === '' ? 'Say in a few words what is damaged.' : undefined} maxLength={300} />
      </Stack>
    </Dialog>
  );
}
