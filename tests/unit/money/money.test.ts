import { formatMoney, parseMoney, postingsFor, reversalOf } from '@shared/money';

it('shows minor units with the decimal places of the currency (ISO 4217: EUR 2, JPY 0, BHD 3)', () => {
  expect(formatMoney(6000, 'EUR')).toBe('€60.00');
  expect(formatMoney(6000, 'JPY')).toMatch(/6,000$/);
  expect(formatMoney(1234, 'BHD')).toMatch(/1\.234$/);
});

it('reads what a person typed without ever rounding a digit away', () => {
  expect(parseMoney('60,5', 'EUR')).toEqual({ ok: true, amountMinor: 6050 });
  expect(parseMoney('60.505', 'EUR')).toEqual({ ok: false, reason: 'too_many_digits' });
  expect(parseMoney('-1', 'EUR')).toEqual({ ok: false, reason: 'not_a_number' });
  expect(parseMoney('1e3', 'EUR')).toEqual({ ok: false, reason: 'not_a_number' });
});

it('posts a part kept of a hold as the hold ended and the part kept', () => {
  expect(postingsFor({ kind: 'hold_captured_kept', amountMinor: 6000, keptMinor: 2500 })).toEqual([
    { account: 'holds_for_students', amountMinor: 6000 }, { account: 'card_holds', amountMinor: -6000 },
    { account: 'payment_service', amountMinor: 2500 }, { account: 'kept_deposits', amountMinor: -2500 },
  ]);
});

it.each([0, -1, 0.5, Number.NaN, Number.POSITIVE_INFINITY, 2 ** 53])('refuses %p as an amount to move', (amountMinor) => {
  expect(() => postingsFor({ kind: 'hold_placed', amountMinor })).toThrow(RangeError);
});

it('refuses to keep more than the hold', () => {
  expect(() => postingsFor({ kind: 'hold_captured_kept', amountMinor: 10, keptMinor: 11 })).toThrow(RangeError);
});

it('undoes a transfer line by line', () => {
  expect(reversalOf(postingsFor({ kind: 'deposit_charged', amountMinor: 5 }))).toEqual([
    { account: 'payment_service', amountMinor: -5 }, { account: 'deposits_of_students', amountMinor: 5 },
  ]);
});
