import fc from 'fast-check';
import { addPostings, noBalances, overdrawn, postingsFor, reversalOf, sumOf, type Balances, type Movement } from '@shared/money';

const amount = fc.integer({ min: 1, max: 10_000_000 });

const movement: fc.Arbitrary<Movement> = fc.oneof(
  fc.record({
    kind: fc.constantFrom('hold_placed' as const, 'hold_released' as const, 'hold_secured' as const, 'deposit_charged' as const, 'deposit_refunded' as const, 'deposit_kept' as const),
    amountMinor: amount,
  }),
  fc.tuple(amount, amount).map(([a, b]) => ({ kind: 'hold_captured_kept' as const, amountMinor: Math.max(a, b), keptMinor: Math.min(a, b) })),
);

/** One deposit's life with its own amount, so that allowed sequences are common: any order, any split. */
const movementsOfOne = amount.chain((whole) => {
  const part = fc.integer({ min: 1, max: whole });
  return fc.record({
    whole: fc.constant(whole),
    tries: fc.array(fc.oneof(
      fc.record({ kind: fc.constantFrom('hold_placed' as const, 'hold_released' as const, 'hold_secured' as const, 'deposit_charged' as const), amountMinor: fc.constant(whole) }),
      fc.record({ kind: fc.constantFrom('deposit_refunded' as const, 'deposit_kept' as const), amountMinor: fc.oneof(part, fc.constant(whole)) }),
      part.map((keptMinor) => ({ kind: 'hold_captured_kept' as const, amountMinor: whole, keptMinor })),
    ), { maxLength: 14 }),
  });
});

/** What the ledger does: a movement that would overdraw an account is not posted. */
function run(tries: readonly Movement[]): { balances: Balances; posted: Movement[] } {
  let balances = noBalances;
  const posted: Movement[] = [];
  for (const one of tries) {
    const after = addPostings(balances, postingsFor(one));
    if (overdrawn(after).length > 0) continue;
    balances = after;
    posted.push(one);
  }
  return { balances, posted };
}

it('sums to zero for every movement of any amount', () => {
  fc.assert(fc.property(movement, (one) => sumOf(addPostings(noBalances, postingsFor(one))) === 0));
});

it('sums to zero after any sequence of movements, and leaves no account on its wrong side', () => {
  fc.assert(fc.property(fc.array(movement, { maxLength: 20 }), (tries) => {
    const { balances } = run(tries);
    expect(sumOf(balances)).toBe(0);
    expect(overdrawn(balances)).toEqual([]);
  }));
});

it('never gives out more of a deposit than came in: what was released, paid back and kept is at most what was placed or charged', () => {
  fc.assert(fc.property(movementsOfOne, ({ tries }) => {
    const { posted } = run(tries);
    let inMinor = 0;
    let outMinor = 0;
    for (const one of posted) {
      if (one.kind === 'hold_placed' || one.kind === 'deposit_charged') inMinor += one.amountMinor;
      // Capturing a part releases the rest with it, so the whole of the hold is given out.
      if (one.kind === 'hold_released' || one.kind === 'hold_captured_kept' || one.kind === 'deposit_refunded' || one.kind === 'deposit_kept') outMinor += one.amountMinor;
    }
    expect(outMinor).toBeLessThanOrEqual(inMinor);
  }));
});

it('never both releases and keeps one hold', () => {
  fc.assert(fc.property(movementsOfOne, ({ tries }) => {
    const { posted } = run(tries);
    const count = (kinds: readonly string[]): number => posted.filter((one) => kinds.includes(one.kind)).length;
    expect(count(['hold_released', 'hold_captured_kept', 'hold_secured'])).toBeLessThanOrEqual(count(['hold_placed']));
  }));
});

it('is where it was after a movement and its reversal', () => {
  fc.assert(fc.property(movement, (one) => {
    const there = addPostings(noBalances, postingsFor(one));
    expect(addPostings(there, reversalOf(postingsFor(one)))).toEqual(noBalances);
  }));
});
