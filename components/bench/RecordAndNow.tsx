import type { BenchVerdict } from '@shared/api/bench';
import type { Attribute, Contribution } from '@shared/api/evidence';
import type { RecordedValueView } from '@shared/api/kits';
import { attributeWords, categoryLabel, decimalsOf } from '@/components/readings/attributes';
import { Card, DataTable, Mono, Reading, Text } from '@/components/ui';

/** Recorded and now, side by side, with E_n and what each reading weighed. */
export function RecordAndNow({ verdict, record }: { verdict: BenchVerdict; record: readonly RecordedValueView[] }) {
  const read = verdict.result.contributions;
  const unread = record.filter((value) => !read.some((contribution) => contribution.attribute === value.attribute));
  return (
    <Card title="Recorded and now" padded={false}>
      <DataTable
        caption="Recorded and now"
        rows={read}
        rowKey={(row) => row.attribute}
        columns={[
          { key: 'attribute', header: 'Reading', cell: (row) => <Text strong>{nameOf(row.attribute)}</Text> },
          { key: 'recorded', header: 'Recorded', align: 'right', cell: (row) => <Value attribute={row.attribute} value={row.recorded} u={row.recordedU} /> },
          { key: 'now', header: 'Now', align: 'right', cell: (row) => <Value attribute={row.attribute} value={row.value} u={row.u} differs={differs(row)} /> },
          { key: 'en', header: 'Eₙ', align: 'right', cell: (row) => <Mono>{row.en === null ? '–' : row.en.toFixed(1)}</Mono> },
          { key: 'weight', header: 'Weighs', align: 'right', cell: (row) => <Mono>{signed(row.log10LR)}</Mono> },
        ]}
      />
      <Text size="quiet" tone="soft" style={{ padding: 18 }}>
        {`Within ±1, Eₙ is agreement within the expanded uncertainties (ISO 13528). "Weighs" is what each reading adds to the log₁₀ of the likelihood ratio: above 0 for the recorded stone, below for another.`}
        {unread.length > 0 ? ` Recorded but not read now: ${unread.map((value) => nameOf(value.attribute).toLowerCase()).join(', ')}.` : ''}
      </Text>
    </Card>
  );
}

function nameOf(attribute: Attribute): string {
  const { label, unit } = attributeWords[attribute];
  return unit ? `${label}, ${unit}` : label;
}

/** A reading that no longer agrees: by E_n, or by weighing clearly against the record where there is no E_n. */
const differs = (row: Contribution): boolean => (row.en === null ? row.log10LR <= -1 : Math.abs(row.en) > 1);

const signed = (value: number): string => (value >= 0 ? `+${value.toFixed(1)}` : `−${Math.abs(value).toFixed(1)}`);

function Value({ attribute, value, u, differs: off = false }: { attribute: Attribute; value: Contribution['value'] | null; u: number | null; differs?: boolean }) {
  const tone = off ? 'different' : 'ink';
  if (value === null) return <Mono tone="soft">–</Mono>;
  if (value === 'over_limit') return <Mono tone={tone}>over limit</Mono>;
  if (typeof value === 'string') return <Mono tone={tone} strong={off}>{categoryLabel(attribute, value)}</Mono>;
  return <Reading value={value} u={u} tone={tone} strong={off} {...(decimalsOf[attribute] === undefined ? {} : { decimals: decimalsOf[attribute] })} />;
}
