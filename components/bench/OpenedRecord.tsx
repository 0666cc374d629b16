import type { BenchStone, OpenedStone } from '@shared/api/bench';
import { Card, Heading, Stack, Text } from '@/components/ui';
import { NextReadings } from './NextReadings';
import { ReadingsTaken } from './ReadingsTaken';
import { RecordAndNow } from './RecordAndNow';
import { RecordPicture } from './RecordPicture';
import { VerdictCard } from './VerdictCard';

/** What opens after the first entry: the newest verdict, the record beside the readings, the picture, what to read next. */
export function OpenedRecord({ loanId, stone, opened }: { loanId: string; stone: BenchStone; opened: OpenedStone }) {
  const verdict = opened.verdicts.at(-1);
  return (
    <Stack gap="lg">
      {verdict ? <VerdictCard verdict={verdict} slot={stone.slot} /> : null}
      {verdict ? <RecordAndNow verdict={verdict} record={opened.record} /> : null}
      {verdict ? <RecordPicture opened={opened} verdict={verdict} /> : null}
      {verdict && stone.ending === null ? <NextReadings next={verdict.result.next} verdict={verdict.verdict} /> : null}
      {opened.readings.length > 0 ? <ReadingsTaken loanId={loanId} stone={stone} readings={opened.readings} /> : null}
      {opened.acceptances.length > 0 ? (
        <Card title="Accepted by">
          {opened.acceptances.map((acceptance) => (
            <Stack key={acceptance.by.id} gap="xxs">
              <Heading level={3}>{acceptance.by.name}</Heading>
              <Text>{acceptance.reason}</Text>
            </Stack>
          ))}
        </Card>
      ) : null}
    </Stack>
  );
}
