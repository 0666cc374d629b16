import { useState } from 'react';
import type { BenchStone, OpenedStone } from '@shared/api/bench';
import { useSchoolQuery, useSession } from '@/components/api';
import { attributeWords, categoryLabel, decimalsOf } from '@/components/readings/attributes';
import { Button, Card, Dialog, Failed, formatMoment, Reading, Row, Stack, Text, TextField } from '@/components/ui';
import { useBenchStrikeMutation } from './queries';

type Taken = OpenedStone['readings'][number];

/** Every reading of this check, struck ones included; one's own can be struck with a reason. */
export function ReadingsTaken({ loanId, stone, readings }: { loanId: string; stone: BenchStone; readings: readonly Taken[] }) {
  const { account } = useSession();
  const school = useSchoolQuery();
  return (
    <Card title="Readings taken">
      {readings.map((reading) => (
        <Row key={reading.id} justify="space-between" align="flex-start" gap="md">
          <Stack gap="xxs" style={{ flex: 1 }}>
            <Text strong>{attributeWords[reading.attribute].label}</Text>
            <Text size="quiet" tone="soft">
              {[reading.reader.name, reading.instrument?.name, school.data ? formatMoment(reading.takenAt, { timeZone: school.data.timeZone }) : null].filter(Boolean).join(', ')}
            </Text>
            {reading.struck ? <Text size="quiet" tone="different">{`Struck: ${reading.struck.reason}`}</Text> : null}
          </Stack>
          <Shown reading={reading} />
          {stone.ending === null && reading.struck === null && reading.reader.id === account?.id ? <Strike loanId={loanId} reading={reading} /> : null}
        </Row>
      ))}
    </Card>
  );
}

function Shown({ reading }: { reading: Taken }) {
  const { attribute, value, u } = reading;
  const decimals = decimalsOf[attribute];
  if (value === 'over_limit') return <Reading value={`over ${reading.limit ?? ''}`} />;
  return <Reading value={typeof value === 'string' ? categoryLabel(attribute, value) : value} u={u} {...(decimals === undefined ? {} : { decimals })} />;
}

function Strike({ loanId, reading }: { loanId: string; reading: Taken }) {
  const [open, setOpen] = useState(false);
  const [reason, setReason] = useState('');
  const strike = useBenchStrikeMutation(loanId);
  const label = attributeWords[reading.attribute].label.toLowerCase();
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
          <Text>It stays visible, with your reason, and no longer counts. Use it for a slip of typing, not for a reading that surprises.</Text>
          <TextField label="Reason" required value={reason} onChange={setReason} maxLength={300} />
          {strike.error ? <Failed error={strike.error} /> : null}
        </Stack>
      </Dialog>
    </>
  );
}
