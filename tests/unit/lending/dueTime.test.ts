import { dueAt } from '@shared/lending';

// Changes of clock, from the IANA time zone database: Europe/Dublin 2026-03-29 01:00 UTC forward, 2026-10-25 01:00 UTC back;
// America/New_York 2026-03-08 07:00 UTC forward, 2026-11-01 06:00 UTC back.
const dublin = { timeZone: 'Europe/Dublin', closingTime: '17:00' };
const newYork = { timeZone: 'America/New_York', closingTime: '17:00' };

it.each([
  ['Dublin, summer time begins meanwhile', '2026-03-27T10:00:00Z', 3, dublin, '2026-03-30T16:00:00.000Z'],
  ['Dublin, summer time ends meanwhile', '2026-10-23T10:00:00Z', 3, dublin, '2026-10-26T17:00:00.000Z'],
  ['New York, summer time begins meanwhile', '2026-03-06T15:00:00Z', 3, newYork, '2026-03-09T21:00:00.000Z'],
  ['New York, summer time ends meanwhile', '2026-10-30T15:00:00Z', 3, newYork, '2026-11-02T22:00:00.000Z'],
])('is due at closing time on the wall of the school, whatever the clocks do: %s', (_, from, days, calendar, due) => {
  expect(dueAt(new Date(from), days, calendar).toISOString()).toBe(due);
});

it.each([
  ['late evening in Dublin is still that day there', '2026-07-10T22:30:00Z', dublin, '2026-07-13T16:00:00.000Z'],
  ['after midnight in Dublin is the next day there, though UTC has the day before', '2026-07-10T23:30:00Z', dublin, '2026-07-14T16:00:00.000Z'],
  ['evening in New York is that day there, though UTC has the next', '2026-07-11T01:00:00Z', newYork, '2026-07-13T21:00:00.000Z'],
])('counts days by the school’s own calendar: %s', (_, from, calendar, due) => {
  expect(dueAt(new Date(from), 3, calendar).toISOString()).toBe(due);
});

it('takes the next valid time when the change of clocks skips the closing time', () => {
  const due = dueAt(new Date('2026-03-28T10:00:00Z'), 1, { timeZone: 'Europe/Dublin', closingTime: '01:30' });
  expect(due.toISOString()).toBe('2026-03-29T01:30:00.000Z');
});

it('keeps the date across the end of a month and a leap day', () => {
  expect(dueAt(new Date('2028-02-27T12:00:00Z'), 3, dublin).toISOString()).toBe('2028-03-01T17:00:00.000Z');
});
