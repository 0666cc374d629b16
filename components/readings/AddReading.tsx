import { View } from 'react-native';
import { SelectField } from '@/components/ui';
import type { Attribute } from '@shared/api/evidence';
import { attributeFrom, attributeWords, benchOrder } from './attributes';
import type { DraftReading } from './draft';

/** Adds a line: something not on the list yet, or a repeat from a fresh placement. */
export function AddReading({ drafts, onAdd }: { drafts: readonly DraftReading[]; onAdd: (attribute: Attribute) => void }) {
  const listed = new Set(drafts.map((draft) => draft.attribute));
  const options = benchOrder.map((attribute) => ({
    value: attribute,
    label: listed.has(attribute) ? `${attributeWords[attribute].label} again` : attributeWords[attribute].label,
  }));
  return (
    <View>
      <SelectField
        label="Another test or a repeat"
        options={options}
        value=""
        placeholder="Choose what else you read …"
        onChange={(value) => {
          const attribute = attributeFrom(value);
          if (attribute) onAdd(attribute);
        }}
      />
    </View>
  );
}
