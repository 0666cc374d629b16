import { StyleSheet, View } from 'react-native';
import { space, useBreakpoints } from '@/components/theme';
import { CheckboxField, SegmentedField, SelectField, Stack, Text } from '@/components/ui';
import { attributeWords, categoryOptions, isCategory } from './attributes';
import type { DraftFaults, DraftReading } from './draft';
import { ReadingInput } from './ReadingInput';

export interface ReadingLineProps {
  id: string;
  draft: DraftReading;
  /** The attribute stands above already: this is a repeat, from a fresh placement. */
  again: boolean;
  faults: DraftFaults;
  onChange: (part: Partial<DraftReading>) => void;
}

/** One line of the entry form: a number with its unit, an index that may be over the limit, two weighings, or a choice. */
export function ReadingLine({ draft, again, faults, onChange }: ReadingLineProps) {
  const words = attributeWords[draft.attribute];
  const label = again ? `${words.label} again` : words.label;
  const fault = (field: string) => faults[`${draft.key}.${field}`] ?? faults[`${draft.key}.instrumentId`];
  if (words.entry === 'category') return <CategoryLine draft={draft} label={label} error={fault('value')} onChange={onChange} />;
  if (words.entry === 'weighing') return <WeighingLine draft={draft} label={label} fault={fault} onChange={onChange} />;
  return (
    <Stack gap="xs">
      <ReadingInput
        label={label}
        unit={words.unit}
        value={draft.overLimit ? '' : draft.value}
        error={fault('value')}
        onChange={(value) => onChange({ value, overLimit: false })}
      />
      {words.entry === 'index' ? (
        <CheckboxField label="Over the liquid’s limit" checked={draft.overLimit} onChange={(overLimit) => onChange({ overLimit, value: '' })} />
      ) : null}
    </Stack>
  );
}

function CategoryLine({ draft, label, error, onChange }: Pick<ReadingLineProps, 'draft' | 'onChange'> & { label: string; error: string | undefined }) {
  const { phone } = useBreakpoints();
  if (!isCategory(draft.attribute)) return null;
  const options = categoryOptions(draft.attribute);
  const long = options.length > 4 && phone;
  const field = { label, options, value: draft.value, error, onChange: (value: string) => onChange({ value }) };
  return <div data-reading>{long ? <SelectField {...field} placeholder="not looked at" /> : <SegmentedField {...field} />}</div>;
}

function WeighingLine({ draft, label, fault, onChange }: Pick<ReadingLineProps, 'draft' | 'onChange'> & { label: string; fault: (field: string) => string | undefined }) {
  return (
    <View role="group" aria-label={label} style={styles.group}>
      <Text strong>{label}</Text>
      <Text size="quiet" tone="soft">
        Hydrostatic: the same stone in air and hanging in water. The server works out SG and its uncertainty.
      </Text>
      <View style={styles.three}>
        <View style={styles.part}>
          <ReadingInput label="In air" unit="ct" value={draft.airCt} error={fault('airCt')} onChange={(airCt) => onChange({ airCt })} />
        </View>
        <View style={styles.part}>
          <ReadingInput label="In water" unit="ct" value={draft.waterCt} error={fault('waterCt')} onChange={(waterCt) => onChange({ waterCt })} />
        </View>
        <View style={styles.part}>
          <ReadingInput label="Water" unit="°C" value={draft.waterC} error={fault('waterC')} onChange={(waterC) => onChange({ waterC })} />
        </View>
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  group: { gap: space.xs },
  three: { flexDirection: 'row', flexWrap: 'wrap', gap: space.md },
  part: { flexGrow: 1, flexBasis: 120 },
});
