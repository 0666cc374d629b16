import { formatMeasured, formatMoney } from './format';
import { Mono, type TextProps } from './Text';

type Look = Pick<TextProps, 'size' | 'tone' | 'strong' | 'align'>;

/** An amount in whole minor units, written as its currency is. */
export function Money({ amountMinor, currency, ...look }: { amountMinor: number; currency: string } & Look) {
  return <Mono {...look}>{formatMoney(amountMinor, currency)}</Mono>;
}

export interface ReadingProps extends Look {
  value: number | string | null | undefined;
  /** Standard uncertainty (k = 1), in the value's unit. Without one, `decimals` places are shown. */
  u?: number | null | undefined;
  unit?: string;
  decimals?: number;
}

/** A measured value with its standard uncertainty, both rounded to the same place: `1.566 ± 0.004 ct`. Words stay words. */
export function Reading({ value, u, unit, decimals, ...look }: ReadingProps) {
  return <Mono {...look}>{formatMeasured({ value, u, unit, decimals })}</Mono>;
}

/** A label's code in groups of four, in the face that tells 1 l I and 0 O apart. */
export function CodeText({ code, ...look }: { code: string } & Look) {
  return <Mono {...look}>{code.replace(/[^0-9A-Za-z]/g, '').replace(/(.{4})(?=.)/g, '$1 ')}</Mono>;
}
