/** Decimal places of a currency as ISO 4217 gives them (JPY 0, EUR 2, BHD 3), from the runtime's own table. */
export function minorDigits(currency: string): number {
  return new Intl.NumberFormat('en', { style: 'currency', currency }).resolvedOptions().maximumFractionDigits ?? 2;
}

/** "€60.00" for 6000 EUR, in the reader's language. */
export function formatMoney(amountMinor: number, currency: string, locale = 'en-IE'): string {
  const digits = minorDigits(currency);
  return new Intl.NumberFormat(locale, { style: 'currency', currency }).format(amountMinor / 10 ** digits);
}

export type ParsedMoney = { ok: true; amountMinor: number } | { ok: false; reason: 'not_a_number' | 'too_many_digits' | 'too_large' };

/** Reads what a person typed ("60", "60.5", "60,50") as minor units; digits are never rounded away. */
export function parseMoney(text: string, currency: string): ParsedMoney {
  const match = /^(\d{1,12})(?:[.,](\d+))?$/.exec(text.trim());
  if (!match) return { ok: false, reason: 'not_a_number' };
  const digits = minorDigits(currency);
  const fraction = match[2] ?? '';
  if (fraction.length > digits) return { ok: false, reason: 'too_many_digits' };
  const amountMinor = Number(`${match[1] ?? '0'}${fraction.padEnd(digits, '0')}`);
  return Number.isSafeInteger(amountMinor) ? { ok: true, amountMinor } : { ok: false, reason: 'too_large' };
}

/** "60.00" for 6000 EUR: the amount alone, as it is typed back into a field. */
export function formatMinor(amountMinor: number, currency: string): string {
  const digits = minorDigits(currency);
  return (amountMinor / 10 ** digits).toFixed(digits);
}
