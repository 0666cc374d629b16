import { useSchoolQuery } from '@/components/api';
import { Card, Failed, formatMoment, Loading, Money, Row, Stack, Text } from '@/components/ui';
import { useStatementQuery } from './queries';

/** Every movement of one deposit, in words. */
export function StatementCard({ loanId }: { loanId: string }) {
  const statement = useStatementQuery(loanId);
  const school = useSchoolQuery();
  if (statement.isPending) return <Loading label="Fetching the statement" />;
  if (statement.isError) return <Failed error={statement.error} onRetry={() => void statement.refetch()} />;
  const { lines, currency } = statement.data;
  if (lines.length === 0) return null;
  return (
    <Card title="Statement">
      {lines.map((line) => (
        <Row key={line.id} justify="space-between" align="flex-start">
          <Stack gap="xxs" style={{ flex: 1 }}>
            <Text>{line.text}</Text>
            <Text size="quiet" tone="soft">{school.data ? `${formatMoment(line.at, { timeZone: school.data.timeZone })}, ${line.account}` : line.account}</Text>
          </Stack>
          <Money amountMinor={line.amountMinor} currency={currency} />
        </Row>
      ))}
    </Card>
  );
}
