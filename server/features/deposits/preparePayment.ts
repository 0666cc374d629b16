import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { lendingRules } from '@/server/features/loans/lendingRules';
import { Loan, LoanStone } from '@/server/features/loans/loan.entity';
import { cannotMove } from '@/server/features/loans/loans.errors';
import { takeOut } from '@/server/features/loans/takeOut';
import { refused } from '@/server/http/problem';
import { checkTransition } from '@shared/lending';
import { plannedMode } from './depositView';
import { openKey } from './openPage';
import { Payment } from './payment.entity';
import { intendStep, lockLivePayment } from './paymentRows';

const minuteMs = 60_000;
/** Whoever opens the page gets this long to pay, even at the end of the reservation. */
const leastToPayMs = 15 * minuteMs;
/** The service wants at least 30 minutes; the margin lets a retry with the same key stay inside. We close it sooner ourselves. */
const leastPageMs = 40 * minuteMs;
const longestPageMs = 23 * 60 * minuteMs;

export type Prepared =
  /** No deposit was due: the kit is out. */
  | { kind: 'out' }
  /** A page has to be opened, or one that is being opened to be found again. */
  | { kind: 'opening'; paymentId: string }
  | { kind: 'open'; paymentId: string; url: string };

/**
 * What paying for a loan comes to now; writes the payment and the step intended at the service before anything is asked
 * of it. The loan is locked by the caller.
 * @throws Refused while jars or terms are missing, and when the loan is no longer reserved
 */
export async function preparePayment(tx: EntityManager, loan: Loan, by: { actorId: string; now: Date }): Promise<Prepared> {
  await refuseUnready(tx, loan, by.now);
  if (loan.depositMinor === 0) {
    await takeOut(tx, loan, { actorId: by.actorId, mode: null, now: by.now });
    return { kind: 'out' };
  }
  const live = await lockLivePayment(tx, loan.id);
  if (live?.state === 'open' && live.sessionUrl !== null) return { kind: 'open', paymentId: live.id, url: live.sessionUrl };
  if (live?.state === 'opening') return { kind: 'opening', paymentId: live.id };
  if (live !== null) throw refused('deposit_paid', 'The deposit of this loan is paid already. Reload the loan.');
  return { kind: 'opening', paymentId: await intendPage(tx, loan, by.now) };
}

async function refuseUnready(tx: EntityManager, loan: Loan, now: Date): Promise<void> {
  const transition = checkTransition(loan.state, 'out');
  if (!transition.ok) throw cannotMove(transition);
  const jars = await tx.findBy(LoanStone, { loanId: loan.id });
  const unseen = jars.filter((jar) => jar.outSeenAt === null).map((jar) => jar.slot).sort();
  if (unseen.length > 0) throw refused('jars_unseen', `Scan jar ${unseen.join(', ')} first, so that it is clear what goes out.`);
  if (loan.termsAcceptedAt === null) throw refused('terms_open', 'Read and accept the terms first, then pay.');
  if (loan.reservedUntil <= now) throw refused('reservation_over', 'The time to take this kit out is over. Start again by scanning the kit.');
}

async function intendPage(tx: EntityManager, loan: Loan, now: Date): Promise<string> {
  const mode = plannedMode(loan, await lendingRules(tx), now);
  const pageMs = Math.min(Math.max(loan.reservedUntil.getTime() - now.getTime(), leastPageMs), longestPageMs);
  const payment = tx.create(Payment, {
    id: randomUUID(), schoolId: loan.schoolId, loanId: loan.id, mode: mode === 'hold' ? 'hold' : 'charge', state: 'opening',
    amountMinor: loan.depositMinor, currency: loan.currency, sessionExpiresAt: wholeSecond(now.getTime() + pageMs), createdAt: now, version: 1,
  });
  await tx.insert(Payment, payment);
  await intendStep(tx, { payment, kind: 'open', key: openKey(payment.id), amountMinor: loan.depositMinor, now });
  const payUntil = new Date(now.getTime() + leastToPayMs);
  const isFirst = (await tx.countBy(Payment, { loanId: loan.id })) === 1;
  if (isFirst && loan.reservedUntil < payUntil) await tx.update(Loan, { id: loan.id }, { reservedUntil: payUntil, version: () => 'version + 1' });
  return payment.id;
}

/** The service counts in seconds, and a retry must name the same moment. */
const wholeSecond = (ms: number): Date => new Date(Math.floor(ms / 1000) * 1000);
