import { ATTRIBUTES, CATEGORY_VALUES, type Attribute, type CategoryAttribute, type NumericAttribute, type RefractiveAttribute } from '@shared/api/evidence';

/** What an attribute is called on screen and how it is entered. */
export interface AttributeWords {
  label: string;
  unit?: string;
  entry: 'number' | 'index' | 'weighing' | 'category';
}

export const attributeWords: Readonly<Record<Attribute, AttributeWords>> = {
  weight_ct: { label: 'Weight', unit: 'ct', entry: 'number' },
  length_mm: { label: 'Length', unit: 'mm', entry: 'number' },
  width_mm: { label: 'Width', unit: 'mm', entry: 'number' },
  height_mm: { label: 'Height', unit: 'mm', entry: 'number' },
  polariscope: { label: 'Polariscope', entry: 'category' },
  optic_figure: { label: 'Optic figure', entry: 'category' },
  optic_sign: { label: 'Optic sign', entry: 'category' },
  ri_spot: { label: 'Spot reading', entry: 'index' },
  ri_low: { label: 'Flat reading, lower', entry: 'index' },
  ri_high: { label: 'Flat reading, higher', entry: 'index' },
  sg: { label: 'Specific gravity', entry: 'weighing' },
  uv_long: { label: 'Long-wave UV', entry: 'category' },
  uv_short: { label: 'Short-wave UV', entry: 'category' },
  pleochroism: { label: 'Pleochroism', entry: 'category' },
};

/** The order in which a bench usually works (common practice, no source): what is quick and harmless first. */
export const benchOrder: readonly Attribute[] = [
  'weight_ct', 'length_mm', 'width_mm', 'height_mm', 'polariscope', 'optic_figure', 'optic_sign',
  'ri_spot', 'ri_low', 'ri_high', 'sg', 'pleochroism', 'uv_long', 'uv_short',
];

const categoryWords: Readonly<Record<string, string>> = {
  'optic_figure.uniaxial': 'uniaxial',
  'optic_figure.quartz': 'quartz, open centre',
  'optic_figure.spiral': 'spiral',
  'optic_figure.biaxial': 'biaxial',
  'optic_figure.not_found': 'not found',
  'optic_sign.+': 'positive +',
  'optic_sign.-': 'negative −',
};

export function categoryLabel(attribute: Attribute, value: string): string {
  return categoryWords[`${attribute}.${value}`] ?? value;
}

export function categoryOptions(attribute: CategoryAttribute): { value: string; label: string }[] {
  return CATEGORY_VALUES[attribute].map((value) => ({ value, label: categoryLabel(attribute, value) }));
}

export const isCategory = (attribute: Attribute): attribute is CategoryAttribute => attribute in CATEGORY_VALUES;
export const isRefractive = (attribute: Attribute): attribute is RefractiveAttribute => attribute.startsWith('ri_');
export const isNumeric = (attribute: Attribute): attribute is NumericAttribute => !isCategory(attribute);

export function attributeFrom(text: string): Attribute | undefined {
  return ATTRIBUTES.find((attribute) => attribute === text);
}

/** Decimal places that a bench instrument of the usual resolution gives. */
export const decimalsOf: Readonly<Partial<Record<Attribute, number>>> = {
  weight_ct: 3, length_mm: 2, width_mm: 2, height_mm: 2, ri_spot: 2, ri_low: 3, ri_high: 3, sg: 2,
};
