import { DateTime } from 'luxon';

export interface LendingCalendar {
  /** IANA time zone of the school. */
  readonly timeZone: string;
  /** HH:MM, the end of a lending day there. */
  readonly closingTime: string;
}

/**
 * When a loan of `loanDays` days that begins at `now` is due: closing time of its last day in the school's time zone,
 * the same wall-clock time on either side of a daylight-saving change.
 * A closing time that a spring change skips becomes the next valid time, as the calendar library has it.
 */
export function dueAt(now: Date, loanDays: number, calendar: LendingCalendar): Date {
  const [hour, minute] = calendar.closingTime.split(':').map(Number);
  const lastDay = DateTime.fromJSDate(now, { zone: calendar.timeZone }).plus({ days: loanDays });
  return lastDay.set({ hour: hour ?? 17, minute: minute ?? 0, second: 0, millisecond: 0 }).toJSDate();
}
