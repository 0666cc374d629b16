import type { EntityManager } from 'typeorm';
import type { Loan } from '@/server/features/loans/loan.entity';
import { lockLoan } from '@/server/features/loans/loanState';
import { invalid, refused } from '@/server/http/problem';
import { enqueue } from '@/server/jobs/enqueue';
import { formatMoney } from '@shared/money';
import { finishSettlement } from './finishSettlement';
import { Payment, type StepKind } from './payment.entity';
import { intendStep, lockLivePayment } from './paymentRows';

export interface DepositDecision {
  /** How much of the deposit the school keeps: 0 to the whole of it, minor units. The rest goes back. */
  readonly keepMinor: number;
  /** Who decided; null for the system, when every stone was the same. */
  readonly actorId: string | null;
  readonly now: Date;
}

/**
 * Decides a deposit, once for a loan: writes the step intended at the payment service in the caller's transaction and
 * enqueues the job that takes it after commit. The settlement row, where there is one, becomes `done` when the money
 * has moved (at once where nothing has to move). Called again with the same decision it does nothing.
 *
 * @throws Invalid `keepMinor` outside 0 … deposit
 * @throws Refused `deposit_decided` when another amount was decided before; `deposit_not_paid`; `deposit_gone` when the
 *   hold lapsed or was cancelled outside, so that nothing is left to keep
 */
export async function settleDeposit(tx: EntityManager, loanId: string, decision: DepositDecision): Promise<void> {
  const loan = await lockLoan(tx, loanId);
  const { keepMinor, now } = decision;
  if (!Number.isSafeInteger(keepMinor) || keepMinor < 0 || keepMinor > loan.depositMinor) {
    throw invalid('keepMinor', `Keep between nothing and the deposit of ${formatMoney(loan.depositMinor, loan.currency)}.`);
  }
  const payment = await lockLivePayment(tx, loanId);
  if (loan.depositMinor === 0) return finishSettlement(tx, loanId, now);
  if (payment === null) throw refused('deposit_not_paid', 'No deposit was paid for this loan, so there is nothing to release or keep.');
  await intendDecision(tx, { loan, payment, keepMinor, now });
}

async function intendDecision(tx: EntityManager, decided: { loan: Loan; payment: Payment; keepMinor: number; now: Date }): Promise<void> {
  const { loan, payment, keepMinor, now } = decided;
  if (payment.state === 'released' && keepMinor === 0 && !(await hasDecision(tx, payment))) return finishSettlement(tx, loan.id, now);
  if (payment.state === 'released' && !(await hasDecision(tx, payment))) {
    throw refused('deposit_gone', 'The hold on the card ended before the deposit was decided, so nothing can be kept. Settle the loan with nothing kept.');
  }
  const amountMinor = { release: payment.amountMinor, keep: keepMinor, refund: payment.amountMinor - keepMinor };
  const kind = settleKind(payment, keepMinor);
  // One key for every decision about a payment: whatever is asked twice, or asked differently, is decided once.
  const step = await intendStep(tx, { payment, kind, key: settleKey(payment), amountMinor: amountMinor[kind], now });
  if (!step.isNew && keptBy(step, payment) !== keepMinor) {
    throw refused('deposit_decided', 'This deposit was decided already. Open the loan to see what was kept and what went back.');
  }
  if (step.state === 'done') return;
  await enqueue(tx, 'payment-steps', { schoolId: payment.schoolId, paymentId: payment.id }, { key: `payment-steps:${payment.id}` });
}

async function hasDecision(tx: EntityManager, payment: Payment): Promise<boolean> {
  const rows: unknown[] = await tx.query('SELECT 1 FROM payment_step WHERE key = $1', [settleKey(payment)]);
  return rows.length > 0;
}

export const settleKey = (payment: Pick<Payment, 'id'>): string => `settle:${payment.id}`;

function settleKind(payment: Payment, keepMinor: number): 'release' | 'keep' | 'refund' {
  if (payment.state === 'opening' || payment.state === 'open') {
    throw refused('deposit_not_paid', 'The deposit of this loan is not paid yet. Cancel the loan, or wait for the payment.');
  }
  if (keepMinor === payment.amountMinor) return 'keep';
  const isHeld = payment.mode === 'hold' && payment.securedAt === null;
  if (!isHeld) return 'refund';
  return keepMinor === 0 ? 'release' : 'keep';
}

/** How much a settling step keeps of its payment, minor units. */
export function keptBy(step: { kind: StepKind; amountMinor: number }, payment: Pick<Payment, 'amountMinor'>): number {
  if (step.kind === 'keep') return step.amountMinor;
  return step.kind === 'refund' ? payment.amountMinor - step.amountMinor : 0;
}
