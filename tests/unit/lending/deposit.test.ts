import { depositMinor, depositMode, depositWords, planCall, type SeenPayment } from '@shared/lending';

const seen = (change: Partial<SeenPayment>): SeenPayment => ({ status: 'held', amountMinor: 6000, receivedMinor: 0, refundedMinor: 0, ...change });

it('asks a share of the replacement value, rounded up, between its limits', () => {
  const rule = { kind: 'share', percent: 33, minimumMinor: 2000, maximumMinor: 10_000 } as const;
  expect([1, 6061, 10_001, 99_999_999].map((value) => depositMinor(rule, value))).toEqual([2000, 2001, 3301, 10_000]);
  expect(depositMinor({ kind: 'fixed', amountMinor: 6000 }, 1)).toBe(6000);
});

it('holds only where due time, grace and checking end before the hold does, to the millisecond', () => {
  const dueAt = new Date('2026-05-04T16:00:00Z');
  const rules = { dueAt, lateGraceHours: 24, checkingDays: 2 };
  const settledBy = Date.parse('2026-05-07T16:00:00Z');
  expect(depositMode({ ...rules, holdUntil: new Date(settledBy + 1) })).toBe('hold');
  expect(depositMode({ ...rules, holdUntil: new Date(settledBy) })).toBe('charge');
});

it.each([
  ['releases a hold of which nothing is kept', seen({}), 0, { call: 'cancel_hold' }],
  ['captures only what is kept of a hold', seen({}), 2500, { call: 'capture', amountMinor: 2500 }],
  ['pays back the rest of what was charged', seen({ status: 'charged', receivedMinor: 6000 }), 2500, { call: 'refund', amountMinor: 3500 }],
  ['does nothing when the rest went back already', seen({ status: 'charged', receivedMinor: 6000, refundedMinor: 3500 }), 2500, { call: 'none' }],
  ['pays back only what is missing of the rest', seen({ status: 'charged', receivedMinor: 6000, refundedMinor: 1000 }), 0, { call: 'refund', amountMinor: 5000 }],
  ['does nothing when the kept part was captured already', seen({ status: 'charged', receivedMinor: 2500 }), 2500, { call: 'none' }],
  ['does nothing when the hold was cancelled already', seen({ status: 'cancelled' }), 0, { call: 'none' }],
  ['says that nothing can be kept of a hold that ended', seen({ status: 'cancelled' }), 1, { call: 'lost', reason: 'hold_ended' }],
  ['says so when more went back than should have', seen({ status: 'charged', receivedMinor: 6000, refundedMinor: 6000 }), 1, { call: 'lost', reason: 'already_paid_back' }],
  ['says that an unpaid payment has nothing to settle', seen({ status: 'pending' }), 0, { call: 'lost', reason: 'not_paid' }],
] as const)('%s', (_, payment, keepMinor, plan) => {
  expect(planCall(payment, { kind: 'settle', keepMinor })).toEqual(plan);
});

it('secures a hold by capturing the whole of it, once', () => {
  expect(planCall(seen({}), { kind: 'secure' })).toEqual({ call: 'capture', amountMinor: 6000 });
  expect(planCall(seen({ status: 'charged', receivedMinor: 6000 }), { kind: 'secure' })).toEqual({ call: 'none' });
  expect(planCall(seen({ status: 'cancelled' }), { kind: 'secure' })).toEqual({ call: 'lost', reason: 'hold_ended' });
});

it('explains before paying whether the card is held or charged, and why', () => {
  const about = { amountMinor: 6000, currency: 'EUR', state: 'none', keptMinor: 0, returnedMinor: 0, secured: false } as const;
  expect(depositWords({ ...about, mode: 'hold' })).toContain('€60.00 will be held on your card, not taken');
  expect(depositWords({ ...about, mode: 'charge' })).toContain('€60.00 will be charged to your card and paid back');
  expect(depositWords({ ...about, mode: 'charge' })).toContain('about a week');
  expect(depositWords({ ...about, mode: 'none' })).toBe('No deposit is due for this kit.');
});
