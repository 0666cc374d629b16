import { StyleSheet, View } from 'react-native';
import type { BenchVerdict } from '@shared/api/bench';
import type { Attribute, Contribution } from '@shared/api/evidence';
import type { RecordedValueView } from '@shared/api/kits';
import { attributeWords, categoryLabel, decimalsOf } from '@/components/readings/attributes';
import { a, space, useTheme } from '@/components/theme';
import { Card, Mono, Reading, Text } from '@/components/ui';

/** Recorded and now, side by side, with E_n and what each reading weighed. A real table, narrow enough for a phone. */
export function RecordAndNow({ verdict, record }: { verdict: BenchVerdict; record: readonly RecordedValueView[] }) {
  const rows = verdict.result.contributions;
  const unread = record.filter((value) => !rows.some((row) => row.attribute === value.attribute));
  return (
    <Card title="Recorded and now">
      <table style={{ borderCollapse: 'collapse', width: '100%' }}>
        <thead>
          <tr>
            <Head label="Reading" />
            <Head label="recorded" right />
            <Head label="now" right />
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <Line key={row.attribute} row={row} />
          ))}
        </tbody>
      </table>
      <Text size="quiet" tone="soft">
        {`En within ±1 is agreement within the expanded uncertainties (ISO 13528). “Weighs” is what a reading adds to the log₁₀ of the likelihood ratio: above 0 for the recorded stone, below for another.`}
        {unread.length > 0 ? ` Recorded but not read now: ${unread.map((value) => attributeWords[value.attribute].label.toLowerCase()).join(', ')}.` : ''}
      </Text>
    </Card>
  );
}

function Head({ label, right = false }: { label: string; right?: boolean }) {
  return (
    <th scope="col" style={{ textAlign: right ? 'right' : 'left', padding: `${space.xs}px 0`, fontWeight: 'normal' }}>
      <Text size="quiet" tone="soft">{label}</Text>
    </th>
  );
}

function Line({ row }: { row: Contribution }) {
  const { colors } = useTheme();
  const { label, unit } = attributeWords[row.attribute];
  const cell = { padding: `${space.sm}px 0 ${space.sm}px ${space.sm}px`, borderTop: `1px solid ${colors.rule}`, textAlign: 'right', verticalAlign: 'top' } as const;
  return (
    <tr>
      <th scope="row" style={{ ...cell, textAlign: 'left', paddingLeft: 0, fontWeight: 'normal' }}>
        <Text strong>{unit ? `${label}, ${unit}` : label}</Text>
        <View style={styles.below}>
          <Text size="small" tone="soft">{`${row.en === null ? '' : `En ${row.en.toFixed(1)}, `}weighs ${signed(row.log10LR)}`}</Text>
        </View>
      </th>
      <td style={cell}>
        <Value attribute={row.attribute} value={row.recorded} u={row.recordedU} />
      </td>
      <td style={cell}>
        <Value attribute={row.attribute} value={row.value} u={row.u} off={differs(row)} />
      </td>
    </tr>
  );
}

/** A reading that no longer agrees: by E_n, or by weighing clearly against the record where there is no E_n. */
const differs = (row: Contribution): boolean => (row.en === null ? row.log10LR <= -1 : Math.abs(row.en) > 1);

const signed = (value: number): string => (value >= 0 ? `+${value.toFixed(1)}` : `−${Math.abs(value).toFixed(1)}`);

function Value({ attribute, value, u, off = false }: { attribute: Attribute; value: Contribution['value'] | null; u: number | null; off?: boolean }) {
  const tone = off ? 'different' : 'ink';
  if (value === null) return <Mono tone="soft">–</Mono>;
  if (value === 'over_limit') return <Mono tone={tone}>over limit</Mono>;
  if (typeof value === 'string') return <Mono tone={tone} strong={off}>{categoryLabel(attribute, value)}</Mono>;
  const decimals = decimalsOf[attribute];
  // The pane is narrow: the value and, under it, its uncertainty.
  if (u !== null && u > 0) {
    return (
      <View>
        <Mono tone={tone} strong={off} align="right">{value.toFixed(decimals ?? 3)}</Mono>
        <Mono size="small" tone="soft" align="right" style={a.right}>{`± ${u.toPrecision(1)}`}</Mono>
      </View>
    );
  }
  return <Reading value={value} u={u} tone={tone} strong={off} {...(decimals === undefined ? {} : { decimals })} />;
}

const styles = StyleSheet.create({ below: { marginTop: 2 } });
