import type { Attribute } from '@shared/api/evidence';
import type { RecordedValueView } from '@shared/api/kits';
import { formatMeasured } from '@/components/ui';
import { attributeWords, categoryLabel } from '@/components/readings/attributes';

/** "1.63 · 3.06 · 2.563 ct": index, SG and weight in one line, as far as they are recorded. */
export function summaryOf(values: readonly RecordedValueView[]): string {
  const wanted: Attribute[] = ['ri_spot', 'sg', 'weight_ct'];
  const said = wanted.flatMap((attribute) => {
    const found = values.find((one) => one.attribute === attribute);
    return found ? [shortValue(found)] : [];
  });
  return said.length === 0 ? 'nothing recorded' : said.join(' · ');
}

function shortValue({ attribute, value }: RecordedValueView): string {
  if (typeof value === 'string') return categoryLabel(attribute, value);
  if (value.value === 'over_limit') return `over ${'limit' in value ? value.limit : ''}`;
  const decimals = attribute === 'weight_ct' ? 3 : 2;
  return `${value.value.toFixed(decimals)}${attribute === 'weight_ct' ? ' ct' : ''}`;
}

/** A recorded value with its uncertainty and unit. */
export function recordedText({ attribute, value }: RecordedValueView): string {
  const unit = attributeWords[attribute].unit;
  if (typeof value === 'string') return categoryLabel(attribute, value);
  if (value.value === 'over_limit') return `over ${'limit' in value ? value.limit : ''}`;
  return formatMeasured({ value: value.value, u: 'u' in value ? value.u : null, unit });
}
