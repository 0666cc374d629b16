import type { FieldError } from '@shared/api/evidence';
import type { InstrumentKind } from '@shared/api/instruments';

export interface InstrumentNumbers {
  readonly resolution: number | null;
  readonly standardUncertainty: number | null;
  readonly spotUncertainty: number | null;
  readonly liquidLimitRi: number | null;
}

type Field = keyof InstrumentNumbers;
interface Rule { readonly required: boolean; readonly min: number; readonly max: number; readonly unit: string }

const words: Readonly<Record<Field, string>> = {
  resolution: 'The smallest step it shows',
  standardUncertainty: 'The standard uncertainty of one reading',
  spotUncertainty: 'The standard uncertainty of a spot reading',
  liquidLimitRi: 'The highest index its contact liquid reads',
};

/** Which figures a kind has, and between what values they make sense on a school's bench. Common practice, no source. */
const rules: Readonly<Record<InstrumentKind, Partial<Record<Field, Rule>>>> = {
  balance: { resolution: { required: false, min: 0.0001, max: 1, unit: ' ct' }, standardUncertainty: { required: true, min: 0.0001, max: 1, unit: ' ct' } },
  caliper: { resolution: { required: false, min: 0.001, max: 1, unit: ' mm' }, standardUncertainty: { required: true, min: 0.001, max: 1, unit: ' mm' } },
  refractometer: {
    resolution: { required: false, min: 0.0001, max: 0.05, unit: '' },
    standardUncertainty: { required: true, min: 0.0001, max: 0.02, unit: '' },
    spotUncertainty: { required: true, min: 0.001, max: 0.05, unit: '' },
    liquidLimitRi: { required: true, min: 1.5, max: 2.2, unit: '' },
  },
  thermometer: { resolution: { required: false, min: 0.01, max: 5, unit: ' °C' }, standardUncertainty: { required: true, min: 0.01, max: 5, unit: ' °C' } },
  polariscope: {},
  uv_lamp: {},
};

/** What is wrong with the figures of an instrument of this kind, each fault naming its field. */
export function instrumentFaults(kind: InstrumentKind, numbers: InstrumentNumbers): FieldError[] {
  const fields: readonly Field[] = ['resolution', 'standardUncertainty', 'spotUncertainty', 'liquidLimitRi'];
  const faults = fields.flatMap((field) => fieldFault(rules[kind][field], field, numbers[field]));
  return faults.length > 0 ? faults : roundingFault(numbers);
}

function fieldFault(rule: Rule | undefined, field: Field, value: number | null): FieldError[] {
  if (rule === undefined) return value === null ? [] : [{ field, message: 'An instrument of this kind has no such figure. Leave it empty.' }];
  if (value === null) return rule.required ? [{ field, message: `${words[field]} is needed: readings take their uncertainty from it.` }] : [];
  if (value >= rule.min && value <= rule.max) return [];
  return [{ field, message: `${words[field]} lies between ${rule.min} and ${rule.max}${rule.unit}. Check what was typed.` }];
}

/** Rounding to the shown step alone gives resolution / √12 (GUM, 4.3.7); one half of the display's last digit is never beaten. */
function roundingFault({ resolution, standardUncertainty }: InstrumentNumbers): FieldError[] {
  if (resolution === null || standardUncertainty === null) return [];
  const rounding = resolution / Math.sqrt(12);
  if (standardUncertainty >= 0.99 * rounding) return [];
  return [{ field: 'standardUncertainty', message: `Rounding to steps of ${resolution} alone gives ${rounding.toPrecision(2)}. Enter that or more.` }];
}
