import { View } from 'react-native';
import type { NextReading, VerdictWord } from '@shared/api/evidence';
import { attributeWords } from '@/components/readings/attributes';
import { radius, useTheme } from '@/components/theme';
import { Card, Mono, Row, Stack, Text } from '@/components/ui';

const shown = 3;

/** Which reading would settle it soonest, best first. */
export function NextReadings({ next, verdict }: { next: readonly NextReading[]; verdict: VerdictWord }) {
  if (verdict === 'same') return null;
  if (next.length === 0) {
    return (
      <Card title="No reading left">
        <Text>What the lab can read has been read. Two people decide about this stone, each with a reason.</Text>
      </Card>
    );
  }
  return (
    <Card title="Best next reading">
      {next.slice(0, shown).map((reading) => (
        <Suggestion key={`${reading.attribute}${String(reading.repeat)}`} reading={reading} />
      ))}
    </Card>
  );
}

function Suggestion({ reading }: { reading: NextReading }) {
  const { colors } = useTheme();
  const { label } = attributeWords[reading.attribute];
  const inTen = Math.round(reading.settles * 10);
  return (
    <Stack gap="xs">
      <Row justify="space-between" align="baseline">
        <Text strong>{reading.repeat ? `${label} again, fresh placement` : label}</Text>
        <Mono>{reading.settles.toFixed(2)}</Mono>
      </Row>
      <Text size="quiet" tone="soft">{`about ${duration(reading.seconds)}, settles it ${inTen} times in 10`}</Text>
      <View aria-hidden style={{ height: 6, borderRadius: radius.pill, backgroundColor: colors.actionGround }}>
        <View style={{ height: 6, borderRadius: radius.pill, width: `${Math.round(reading.settles * 100)}%`, backgroundColor: colors.action }} />
      </View>
    </Stack>
  );
}

const duration = (seconds: number): string => (seconds < 90 ? `${Math.round(seconds / 10) * 10} s` : `${Math.round(seconds / 60)} min`);
