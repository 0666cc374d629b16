import type { EntityManager } from 'typeorm';
import { withSchoolSystem } from '@/server/database/school';
import { neutralKit } from '@/server/features/loans/lendingRules';
import { lockLoan } from '@/server/features/loans/loanState';
import type { Loan } from '@/server/features/loans/loan.entity';
import { queueMail } from '@/server/mail/queueMail';
import type { Payment as SeenPayment } from '@/server/payments/payments.port';
import type { DepositGoal } from '@shared/lending';
import { bookPayment } from './books';
import { finishSettlement } from './finishSettlement';
import { type Payment, PaymentStep } from './payment.entity';
import { changePayment, lockPayment } from './paymentRows';
import type { PaymentWork } from './work';

interface Taken {
  readonly payment: Payment;
  readonly step: PaymentStep;
}

/**
 * Records that a step reached its goal, once: payment, ledger, settlement and mail in one transaction. A second worker,
 * or the same one after it was killed, finds the step done and changes nothing.
 */
export function recordReached(work: PaymentWork, taken: Taken, goal: DepositGoal, seen: SeenPayment): Promise<void> {
  return whileIntended(work, taken, async (tx, loan, payment) => {
    const now = work.now();
    await bookHoldTaken(tx, payment, goal, seen, now);
    if (goal.kind === 'secure') await mailSecured(tx, loan, payment);
    else {
      await bookSettled(tx, payment, goal.keepMinor, now);
      await finishSettlement(tx, loan.id, now);
    }
    await tx.update(PaymentStep, { id: taken.step.id }, { state: 'done', doneAt: now, lastError: null, attempts: () => 'attempts + 1' });
  });
}

/** The goal is out of reach for good: the step stays visible on the money screen as refused. A hold that ended is booked as released. */
export function refuseStep(work: PaymentWork, taken: Taken, reason: string, seen: SeenPayment | null): Promise<void> {
  return whileIntended(work, taken, async (tx, _loan, payment) => {
    const now = work.now();
    if (payment.state === 'held' && seen?.status === 'cancelled') await bookReleased(tx, payment, now, 'ended at the payment service');
    await tx.update(PaymentStep, { id: taken.step.id }, { state: 'refused', doneAt: now, lastError: reason.slice(0, 500), attempts: () => 'attempts + 1' });
  });
}

function whileIntended(work: PaymentWork, { payment, step }: Taken, record: (tx: EntityManager, loan: Loan, payment: Payment) => Promise<void>): Promise<void> {
  return withSchoolSystem(work.db, payment.schoolId, async (tx) => {
    const loan = await lockLoan(tx, payment.loanId);
    const locked = await lockPayment(tx, payment.id);
    const still = await tx.existsBy(PaymentStep, { id: step.id, state: 'intended' });
    if (locked !== null && still) await record(tx, loan, locked);
  });
}

/** Brings a hold's books to where the service is: captured whole and still the student's, kept in part, or released. */
async function bookHoldTaken(tx: EntityManager, payment: Payment, goal: DepositGoal, seen: SeenPayment, now: Date): Promise<void> {
  if (payment.state !== 'held') return;
  const keepMinor = goal.kind === 'settle' ? goal.keepMinor : 0;
  const { amountMinor } = payment;
  if (seen.status === 'cancelled') return bookReleased(tx, payment, now);
  if (keepMinor > 0 && seen.receivedMinor === keepMinor) {
    await bookPayment(tx, payment, { kind: 'hold_captured_kept', amountMinor, keptMinor: keepMinor }, now);
    return changePayment(tx, payment, { state: keepMinor === amountMinor ? 'kept' : 'part_kept', chargeId: seen.chargeId });
  }
  if (seen.receivedMinor !== amountMinor) throw new Error(`payment ${payment.id}: ${seen.receivedMinor} was taken of a hold of ${amountMinor}`);
  await bookPayment(tx, payment, { kind: 'hold_secured', amountMinor }, now);
  await changePayment(tx, payment, { state: 'charged', securedAt: now, chargeId: seen.chargeId });
}

async function bookReleased(tx: EntityManager, payment: Payment, now: Date, memo = ''): Promise<void> {
  await bookPayment(tx, payment, { kind: 'hold_released', amountMinor: payment.amountMinor }, now, memo);
  await changePayment(tx, payment, { state: 'released' });
}

/** Books what was kept and paid back of money that had been taken. */
async function bookSettled(tx: EntityManager, payment: Payment, keepMinor: number, now: Date): Promise<void> {
  if (payment.state !== 'charged') return;
  const backMinor = payment.amountMinor - keepMinor;
  if (backMinor > 0) await bookPayment(tx, payment, { kind: 'deposit_refunded', amountMinor: backMinor }, now);
  if (keepMinor > 0) await bookPayment(tx, payment, { kind: 'deposit_kept', amountMinor: keepMinor }, now);
  await changePayment(tx, payment, { state: keepMinor === 0 ? 'refunded' : backMinor === 0 ? 'kept' : 'part_kept' });
}

async function mailSecured(tx: EntityManager, loan: Loan, payment: Payment): Promise<void> {
  if (payment.securedAt === null) return;
  await queueMail(tx, {
    schoolId: loan.schoolId, toAccountId: loan.borrowerId, template: 'hold-secured', dedupeKey: `hold-secured:${payment.id}`,
    data: { loanId: loan.id, kit: await neutralKit(tx, loan.kitId), deposit: { amountMinor: payment.amountMinor, currency: payment.currency } },
  });
}
