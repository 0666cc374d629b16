import fc from 'fast-check';
import { depositMinor, dueAt, planCall, type DepositGoal, type SeenPayment } from '@shared/lending';
import { DateTime } from 'luxon';

/** What the service does with a call, as its documentation has it: one capture of a hold, the rest released; refunds up to what was taken. */
function serve(seen: SeenPayment, goal: DepositGoal): SeenPayment {
  const plan = planCall(seen, goal);
  switch (plan.call) {
    case 'cancel_hold':
      return { ...seen, status: 'cancelled' };
    case 'capture':
      return { ...seen, status: 'charged', receivedMinor: plan.amountMinor };
    case 'refund':
      return { ...seen, refundedMinor: seen.refundedMinor + plan.amountMinor };
    default:
      return seen;
  }
}

const start = fc.record({ amountMinor: fc.integer({ min: 1, max: 1_000_000 }), held: fc.boolean(), share: fc.double({ min: 0, max: 1, noNaN: true }), secureFirst: fc.boolean(), repeats: fc.integer({ min: 1, max: 4 }) });

it('keeps exactly what was decided and gives back the rest, however often each step is taken again', () => {
  fc.assert(fc.property(start, ({ amountMinor, held, share, secureFirst, repeats }) => {
    const keepMinor = Math.round(amountMinor * share);
    let seen: SeenPayment = { status: held ? 'held' : 'charged', amountMinor, receivedMinor: held ? 0 : amountMinor, refundedMinor: 0 };
    const goals: DepositGoal[] = [...(secureFirst ? [{ kind: 'secure' } as const] : []), { kind: 'settle', keepMinor }];
    for (const goal of goals) for (let time = 0; time < repeats; time += 1) seen = serve(seen, goal);
    expect(seen.receivedMinor - seen.refundedMinor).toBe(keepMinor);
    expect(planCall(seen, { kind: 'settle', keepMinor })).toEqual({ call: 'none' });
  }));
});

it('asks a deposit of whole minor units within its limits for any value', () => {
  fc.assert(fc.property(fc.integer({ min: 0, max: 1_000_000_000 }), fc.integer({ min: 1, max: 100 }), fc.integer({ min: 0, max: 5000 }), fc.integer({ min: 0, max: 100_000 }), (value, percent, minimumMinor, above) => {
    const maximumMinor = minimumMinor + above;
    const asked = depositMinor({ kind: 'share', percent, minimumMinor, maximumMinor }, value);
    expect(Number.isSafeInteger(asked)).toBe(true);
    expect(asked).toBeGreaterThanOrEqual(minimumMinor);
    expect(asked).toBeLessThanOrEqual(maximumMinor);
  }));
});

it('is due in the future, at the closing time of the wall clock there, in any zone', () => {
  const zones = fc.constantFrom('Europe/Dublin', 'America/New_York', 'Pacific/Auckland', 'Asia/Kathmandu', 'America/St_Johns');
  const when = fc.date({ min: new Date('2025-01-01T00:00:00Z'), max: new Date('2035-01-01T00:00:00Z'), noInvalidDate: true });
  fc.assert(fc.property(when, fc.integer({ min: 1, max: 180 }), zones, (now, loanDays, timeZone) => {
    const due = dueAt(now, loanDays, { timeZone, closingTime: '17:00' });
    expect(due > now).toBe(true);
    expect(DateTime.fromJSDate(due, { zone: timeZone }).toFormat('HH:mm')).toBe('17:00');
    expect(Math.round(DateTime.fromJSDate(due, { zone: timeZone }).startOf('day').diff(DateTime.fromJSDate(now, { zone: timeZone }).startOf('day'), 'days').days)).toBe(loanDays);
  }));
});
