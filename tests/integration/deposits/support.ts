import { withSchoolSystem } from '@/server/database/school';
import { settleDeposit } from '@/server/features/deposits/settle';
import type { PaymentPort } from '@/server/payments/payments.port';
import type { World } from '../loans/world';

export const minuteMs = 60_000;
export const dayMs = 24 * 60 * minuteMs;

/**
 * Decides a deposit as the settlement does: the settlement's row first, then the money, in one transaction.
 * The loan is moved to its end by SQL, because the bench is not what is tried here.
 */
export async function decide(world: World, loanId: string, keepMinor: number): Promise<void> {
  await withSchoolSystem(world.test.db, world.schoolId, async (tx) => {
    await tx.query(
      `INSERT INTO settlement (loan_id, school_id, state, kept_minor, released_minor, currency, decided_at)
       SELECT id, school_id, 'decided', $2::bigint, deposit_minor - $2::bigint, currency, $3 FROM loan WHERE id = $1 ON CONFLICT DO NOTHING`,
      [loanId, keepMinor, world.test.clock.now]);
    await tx.query("UPDATE loan SET state = 'settled' WHERE id = $1", [loanId]);
    await settleDeposit(tx, loanId, { keepMinor, actorId: world.admin.accountId, now: world.test.clock.now });
  });
}

export async function settlementState(world: World, loanId: string): Promise<string | undefined> {
  return (await world.test.rows<{ state: string }>('SELECT state FROM settlement WHERE loan_id = $1', [loanId]))[0]?.state;
}

/** Makes the school's loans so long that a card cannot hold their deposits. */
export async function lendForWeeks(world: World, days = 21): Promise<void> {
  await world.test.rows('UPDATE school SET loan_days = $2 WHERE id = $1', [world.schoolId, days]);
}

/** What the service's own books say, in the ledger's terms: held on cards, and money it has for the school, fees apart. */
export function serviceBooks(world: World): { heldMinor: number; moneyMinor: number } {
  const books = world.fake.control.books().find((one) => one.currency === 'eur');
  return { heldMinor: books?.heldMinor ?? 0, moneyMinor: (books?.capturedMinor ?? 0) - (books?.refundedMinor ?? 0) };
}

export type Cut = { method: keyof PaymentPort; when: 'before' | 'after'; left: number };

/** A port whose line can be cut before a call reaches the service, or after it was done and before the answer is back. */
export function cuttable(): { wrap: (payments: PaymentPort) => PaymentPort; cuts: Cut[]; calls: string[] } {
  const cuts: Cut[] = [];
  const calls: string[] = [];
  const wrap = (payments: PaymentPort): PaymentPort => new Proxy(payments, {
    get(target, name: keyof PaymentPort) {
      if (name === 'parseWebhook') return target[name].bind(target);
      const method = target[name] as (...args: unknown[]) => unknown;
      return async (...args: unknown[]): Promise<unknown> => {
        const cut = cuts.find((one) => one.method === name && one.left > 0);
        if (cut !== undefined) cut.left -= 1;
        if (cut?.when === 'before') throw new ProcessKilled(name);
        calls.push(name);
        const answer = await method.apply(target, args);
        if (cut?.when === 'after') throw new ProcessKilled(name);
        return answer;
      };
    },
  });
  return { wrap, cuts, calls };
}

/** Nobody handles this: like a kill, it ends the work where it stands. */
export class ProcessKilled extends Error {
  constructor(method: string) {
    super(`killed at ${method}`);
  }
}
