import type { EntityManager } from 'typeorm';
import { may, type Role } from '@shared/permissions';
import { Loan } from './loan.entity';
import { noSuchLoan } from './loanState';

/** Who asks, in which school, with which roles there. */
export interface LoanActor {
  readonly accountId: string;
  readonly schoolId: string;
  readonly roles: readonly Role[];
}

/** A loan for its borrower, or for staff who act for them; for anybody else there is no such loan. */
export async function loanFor(tx: EntityManager, loanId: string, actor: LoanActor): Promise<Loan> {
  const loan = await tx.findOneBy(Loan, { id: loanId });
  if (loan === null || !(isBorrower(loan, actor) || may(actor.roles, 'loan:staff'))) throw noSuchLoan();
  return loan;
}

export const isBorrower = (loan: Loan, actor: Pick<LoanActor, 'accountId'>): boolean => loan.borrowerId === actor.accountId;
