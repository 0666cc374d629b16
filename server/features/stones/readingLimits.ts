import type { NumericAttribute } from '@shared/api/evidence';

export { INSTRUMENT_FOR } from '@shared/api/instruments';

interface Limits { readonly min: number; readonly max: number; readonly unit: string; readonly what: string }

/** Outside these a number is a slip of the finger, not a stone of a teaching set. Common practice, no source. */
export const PLAUSIBLE: Readonly<Record<NumericAttribute, Limits>> = {
  length_mm: { min: 0.5, max: 150, unit: ' mm', what: 'A length' },
  width_mm: { min: 0.5, max: 150, unit: ' mm', what: 'A width' },
  height_mm: { min: 0.3, max: 100, unit: ' mm', what: 'A height' },
  sg: { min: 0.9, max: 8, unit: '', what: 'A specific gravity' },
  weight_ct: { min: 0.01, max: 1000, unit: ' ct', what: 'A weight' },
  ri_spot: { min: 1.3, max: 2.7, unit: '', what: 'A refractive index' },
  ri_low: { min: 1.3, max: 2.7, unit: '', what: 'A refractive index' },
  ri_high: { min: 1.3, max: 2.7, unit: '', what: 'A refractive index' },
};

/** What is wrong with a number of this attribute, or undefined. */
export function implausible(attribute: NumericAttribute, value: number): string | undefined {
  const { min, max, unit, what } = PLAUSIBLE[attribute];
  if (Number.isFinite(value) && value >= min && value <= max) return undefined;
  return `${what} lies between ${min} and ${max}${unit}. Check what was typed.`;
}
