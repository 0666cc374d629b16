import { Card, EmptyState, Failed, formatMoment, Loading, Stack, Text } from '@/components/ui';
import { useClock } from '@/components/lending/useClock';
import { useCustodyQuery } from './queries';

/** The chain of events of a kit or a stone, newest first. Events are never changed or removed. */
export function CustodyList({ of }: { of: { kitId: string } | { stoneId: string } }) {
  const custody = useCustodyQuery(of);
  const clock = useClock();
  if (custody.isPending) return <Loading label="Fetching the chain of events" />;
  if (custody.isError) return <Failed error={custody.error} onRetry={() => void custody.refetch()} />;
  if (custody.data.length === 0) return <EmptyState title="Nothing has happened yet" />;
  return (
    <Card title="Custody">
      {custody.data.map((event) => (
        <Stack key={event.id} gap="xxs">
          <Text>{event.slot ? `Jar ${event.slot}: ${event.text}` : event.text}</Text>
          <Text size="quiet" tone="soft">{formatMoment(event.at, clock)}</Text>
        </Stack>
      ))}
    </Card>
  );
}
