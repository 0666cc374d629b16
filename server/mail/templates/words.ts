import { formatMoney } from '@shared/money';
import { DateTime } from 'luxon';
import type { Amount, NeutralKit } from '../mailData';

/** "Friday 4 December 2026, 17:00 (Europe/Dublin)": as people say it, with the exact time and whose clock it is. */
export function sayTime(iso: string, timeZone: string): string {
  const time = DateTime.fromISO(iso, { zone: timeZone }).setLocale('en-GB');
  if (!time.isValid) throw new RangeError('a mail carries a time that is not ISO 8601, or its school has no such time zone');
  return `${time.toFormat('cccc d LLLL yyyy, HH:mm')} (${timeZone})`;
}

/** "Friday 4 December", for headings. */
export function sayDay(iso: string, timeZone: string): string {
  return DateTime.fromISO(iso, { zone: timeZone }).setLocale('en-GB').toFormat('cccc d LLLL');
}

export function sayAmount({ amountMinor, currency }: Amount): string {
  return formatMoney(amountMinor, currency);
}

export function sayKit({ kitNumber, neutralTitle }: NeutralKit): string {
  return `Kit ${kitNumber}, ${neutralTitle}`;
}

/** "jar B", "jars B and D", "jars A, B and D". */
export function sayJars(slots: readonly string[]): string {
  const letters = [...slots].sort();
  if (letters.length <= 1) return `jar ${letters.join('')}`;
  return `jars ${letters.slice(0, -1).join(', ')} and ${letters[letters.length - 1] ?? ''}`;
}
