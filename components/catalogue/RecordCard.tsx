import { useState } from 'react';
import type { ReadingView, RecordedValueView, StoneView } from '@shared/api/kits';
import { attributeWords, categoryLabel } from '@/components/readings/attributes';
import { useClock } from '@/components/lending/useClock';
import { Button, Card, Dialog, Failed, formatMeasured, formatMoment, Mono, Row, Stack, Text, TextField } from '@/components/ui';
import { useStrikeMutation } from './queries';
import { recordedText } from './recordWords';

/** The record: each value with its uncertainty, and the readings it follows from. */
export function RecordCard({ stone }: { stone: StoneView }) {
  if (stone.values.length === 0 && stone.readings.length === 0) {
    return (
      <Card title="Record">
        <Text tone="soft">Nothing is recorded yet. Enter the first readings below: three of each, from fresh placements, make a good record.</Text>
      </Card>
    );
  }
  const left = stone.readings.filter((reading) => !stone.values.some((value) => value.attribute === reading.attribute));
  return (
    <Card title="Record">
      {stone.values.map((value) => (
        <RecordedValue key={value.attribute} value={value} readings={stone.readings.filter((reading) => reading.attribute === value.attribute)} />
      ))}
      {left.map((reading) => <ReadingRow key={reading.id} reading={reading} />)}
    </Card>
  );
}

function RecordedValue({ value, readings }: { value: RecordedValueView; readings: readonly ReadingView[] }) {
  const [open, setOpen] = useState(false);
  const { label } = attributeWords[value.attribute];
  const count = `${value.readingCount} ${value.readingCount === 1 ? 'reading' : 'readings'}`;
  return (
    <Stack gap="xs">
      <Row justify="space-between" wrap>
        <Text strong>{label}</Text>
        <Mono>{recordedText(value)}</Mono>
      </Row>
      <Button kind="quiet" label={open ? 'Hide the readings' : count} accessibleLabel={`${label}: ${open ? 'hide the readings' : count}`} expanded={open} onPress={() => setOpen(!open)} style={{ alignSelf: 'flex-start', paddingHorizontal: 0 }} />
      {open ? readings.map((reading) => <ReadingRow key={reading.id} reading={reading} />) : null}
    </Stack>
  );
}

function ReadingRow({ reading }: { reading: ReadingView }) {
  const clock = useClock();
  const { unit, label } = attributeWords[reading.attribute];
  const value = reading.value === 'over_limit' ? `over ${reading.limit ?? ''}` : typeof reading.value === 'string' ? categoryLabel(reading.attribute, reading.value) : formatMeasured({ value: reading.value, u: reading.u, unit });
  return (
    <Row justify="space-between" align="flex-start">
      <Stack gap="xxs" style={{ flex: 1 }}>
        <Mono size="quiet">{value}</Mono>
        <Text size="quiet" tone="soft">{[reading.reader.name, reading.instrument?.name, formatMoment(reading.takenAt, clock)].filter(Boolean).join(', ')}</Text>
        {reading.struck ? <Text size="quiet" tone="different">{`Struck by ${reading.struck.by.name}: ${reading.struck.reason}`}</Text> : null}
      </Stack>
      {reading.struck ? null : <Strike reading={reading} label={label.toLowerCase()} />}
    </Row>
  );
}

function Strike({ reading, label }: { reading: ReadingView; label: string }) {
  const [open, setOpen] = useState(false);
  const [reason, setReason] = useState('');
  const strike = useStrikeMutation();
  return (
    <>
      <Button kind="quiet" label="Strike" accessibleLabel={`Strike this ${label} reading`} haspopup="dialog" onPress={() => setOpen(true)} />
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        title={`Strike this ${label} reading?`}
        action={<Button label="Strike it" busy={strike.isPending} onPress={() => strike.mutate({ readingId: reading.id, reason }, { onSuccess: () => setOpen(false) })} />}
      >
        <Stack>
          <Text>It stays visible with your reason, and the record is computed without it.</Text>
          <TextField label="Reason" required value={reason} onChange={setReason} maxLength={300} />
          {strike.error ? <Failed error={strike.error} /> : null}
        </Stack>
      </Dialog>
    </>
  );
}
