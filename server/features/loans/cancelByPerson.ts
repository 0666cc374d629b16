import type { EntityManager } from 'typeorm';
import { cancelLoan } from './cancelLoan';
import { isBorrower, loanFor, type LoanActor } from './loanAccess';
import { lockLoan } from './loanState';

/** The borrower, or staff for them, gives a reserved kit back. Once it is out it comes back through the return box instead. */
export async function cancelByPerson(tx: EntityManager, loanId: string, words: string | undefined, actor: LoanActor, now: Date): Promise<void> {
  await loanFor(tx, loanId, actor);
  const loan = await lockLoan(tx, loanId);
  const reason = isBorrower(loan, actor) ? 'by_student' : 'by_staff';
  await cancelLoan(tx, loan, { reason, actorId: actor.accountId, now, ...(words === undefined ? {} : { words }) });
}
