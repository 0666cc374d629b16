import type { DepositView } from '@shared/api/loans';
import { Card, Heading, Money, Row, Text } from '@/components/ui';

/** The deposit, and in plain words what happens with it. */
export function DepositCard({ deposit }: { deposit: DepositView }) {
  return (
    <Card>
      <Row justify="space-between" align="baseline">
        <Heading level={2} look="section">Deposit</Heading>
        {deposit.amountMinor > 0 ? <Money amountMinor={deposit.amountMinor} currency={deposit.currency} strong /> : <Text>none</Text>}
      </Row>
      <Text size="quiet" tone="soft">{deposit.explanation}</Text>
    </Card>
  );
}
