import type { EntityManager } from 'typeorm';
import { notFound } from '@/server/http/problem';
import type { CancelReason, LoanState } from '@shared/api/loans';
import { checkTransition } from '@shared/lending';
import { Loan } from './loan.entity';
import { cannotMove } from './loans.errors';

/**
 * The loan's row, locked until the transaction ends. Always the first lock: then the kit's, then the payment's.
 * @throws NotFound when this school has no such loan
 */
export async function lockLoan(tx: EntityManager, loanId: string): Promise<Loan> {
  const loan = await tx.findOne(Loan, { where: { id: loanId }, lock: { mode: 'pessimistic_write' } });
  if (loan === null) throw noSuchLoan();
  return loan;
}

/** The only words for a loan that is not there, is another school's or is nobody's business of the asker. */
export const noSuchLoan = (): Error => notFound('There is no such loan here. Go back to your loans and pick one.');

const moments: Partial<Record<LoanState, 'outAt' | 'returnedAt' | 'settledAt' | 'cancelledAt'>> = {
  out: 'outAt',
  returned: 'returnedAt',
  settled: 'settledAt',
  cancelled: 'cancelledAt',
};

/** What may be written together with a move. */
export interface MoveExtras {
  readonly cancelReason?: CancelReason;
  readonly dueAt?: Date;
}

/**
 * Moves a loan locked by `lockLoan` to its next state, stamps the moment, and brings the object up to date too.
 * @throws Refused (409 `loan_state`) for a transition that is not listed, saying what would be allowed
 */
export async function moveLoan(tx: EntityManager, loan: Loan, to: LoanState, now: Date, extras: MoveExtras = {}): Promise<void> {
  const transition = checkTransition(loan.state, to);
  if (!transition.ok) throw cannotMove(transition);
  const moment = moments[to];
  const change: Partial<Loan> = { ...extras, state: to, ...(moment === undefined ? {} : { [moment]: now }) };
  await tx.update(Loan, { id: loan.id }, { ...change, version: () => 'version + 1' });
  Object.assign(loan, change, { version: loan.version + 1 });
}
