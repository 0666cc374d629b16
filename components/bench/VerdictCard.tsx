import type { BenchVerdict } from '@shared/api/bench';
import { Card, Notice, Row, Stack, StateBadge, Text } from '@/components/ui';
import { basisWords, verdictBadge } from './words';

const edges = { same: 'same', different: 'different', not_settled: 'open' } as const;

/** The verdict in words, with its cautions. Support for a stone, never a word about a person. */
export function VerdictCard({ verdict, slot }: { verdict: BenchVerdict; slot: string }) {
  const spoken = verdict.headline.replace(/^(Same stone|Different stone|Not settled)\. /, '');
  return (
    <Card edge={edges[verdict.verdict]}>
      <Row justify="space-between" wrap>
        <StateBadge {...verdictBadge[verdict.verdict]} />
        <Text size="quiet" tone="soft">
          {basisWords[verdict.basis]}
        </Text>
      </Row>
      <Text strong>{spoken}</Text>
      <Text size="quiet" tone="soft">
        {`log₁₀ of the likelihood ratio: ${verdict.result.log10LR.toFixed(1)} (engine ${verdict.result.engine}). It weighs this jar's readings against the record of jar ${slot}; it says nothing about who did what.`}
      </Text>
      {verdict.result.cautions.length > 0 ? (
        <Stack gap="sm">
          {verdict.result.cautions.map((caution) => (
            <Notice key={`${caution.code}${caution.attribute ?? ''}`} kind="caution">
              {caution.message}
            </Notice>
          ))}
        </Stack>
      ) : null}
    </Card>
  );
}
