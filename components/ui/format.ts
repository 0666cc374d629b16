/**
 * Money as people write it. Minor units by the currency's own number of decimals (yen have none).
 * @param amountMinor whole minor units
 * @param currency ISO 4217
 * @example formatMoney(6000, 'EUR') // "€60.00"
 */
export function formatMoney(amountMinor: number, currency: string, locale?: string): string {
  const format = new Intl.NumberFormat(locale, { style: 'currency', currency });
  const decimals = format.resolvedOptions().maximumFractionDigits ?? 2;
  return format.format(amountMinor / 10 ** decimals);
}

/** How many minor units one unit of a currency has, as a power of ten: 2 for EUR, 0 for JPY. */
export function currencyDecimals(currency: string): number {
  return new Intl.NumberFormat('en', { style: 'currency', currency }).resolvedOptions().maximumFractionDigits ?? 2;
}

export interface MeasuredText {
  value: number | string | null | undefined;
  u?: number | null | undefined;
  unit?: string | undefined;
  decimals?: number | undefined;
}

/**
 * A value and its standard uncertainty rounded to the same place; the uncertainty keeps one significant digit, two
 * where it begins with 1 (common practice after the GUM, 7.2.6).
 * @example formatMeasured({ value: 1.5661, u: 0.0042, unit: 'ct' }) // "1.566 ± 0.004 ct"
 */
export function formatMeasured({ value, u, unit, decimals }: MeasuredText): string {
  if (value === null || value === undefined) return '–';
  const tail = unit ? ` ${unit}` : '';
  if (typeof value === 'string') return value + tail;
  if (u === null || u === undefined || !(u > 0)) return (decimals === undefined ? String(value) : value.toFixed(decimals)) + tail;
  const places = uncertaintyPlaces(u);
  return `${value.toFixed(places)} ± ${u.toFixed(places)}${tail}`;
}

/** Decimal places to which a value with this standard uncertainty is shown; 0 to 8. */
export function uncertaintyPlaces(u: number): number {
  const [digits, power] = u.toExponential(1).split('e') as [string, string];
  const significant = digits.startsWith('1') ? 2 : 1;
  return Math.min(8, Math.max(0, significant - 1 - Number(power)));
}

/** "Friday", "Fri 11 Dec", "Fri 11 Dec 2026": the shortest that is not mistaken. */
export function formatDay(iso: string, { timeZone, now, locale = 'en-GB' }: { timeZone: string; now: Date; locale?: string }): string {
  const date = new Date(iso);
  const days = dayNumber(date, timeZone) - dayNumber(now, timeZone);
  if (days === 0) return 'today';
  if (days === 1) return 'tomorrow';
  if (days === -1) return 'yesterday';
  if (days > 1 && days < 7) return new Intl.DateTimeFormat(locale, { weekday: 'long', timeZone }).format(date);
  const sameYear = yearOf(date, timeZone) === yearOf(now, timeZone);
  const format = new Intl.DateTimeFormat(locale, { weekday: 'short', day: 'numeric', month: 'short', ...(sameYear ? {} : { year: 'numeric' }), timeZone });
  return format.format(date).replace(',', '');
}

/** "Fri 11 Dec, 17:00", in the school's time zone. */
export function formatMoment(iso: string, { timeZone, locale = 'en-GB' }: { timeZone: string; locale?: string }): string {
  const date = new Date(iso);
  const day = new Intl.DateTimeFormat(locale, { weekday: 'short', day: 'numeric', month: 'short', timeZone }).format(date).replace(',', '');
  return `${day}, ${formatTime(iso, { timeZone, locale })}`;
}

/** "17:00", in the school's time zone. */
export function formatTime(iso: string, { timeZone, locale = 'en-GB' }: { timeZone: string; locale?: string }): string {
  return new Intl.DateTimeFormat(locale, { hour: '2-digit', minute: '2-digit', hour12: false, timeZone }).format(new Date(iso));
}

/** Days since 1970 of the calendar day on which an instant falls in a time zone. */
function dayNumber(date: Date, timeZone: string): number {
  const parts = new Intl.DateTimeFormat('en-CA', { year: 'numeric', month: '2-digit', day: '2-digit', timeZone }).format(date);
  return Math.round(Date.parse(`${parts}T00:00:00Z`) / 86_400_000);
}

function yearOf(date: Date, timeZone: string): string {
  return new Intl.DateTimeFormat('en-CA', { year: 'numeric', timeZone }).format(date);
}
