import type { EntityManager } from 'typeorm';
import { recordCustody } from '@/server/features/custody/custody.service';
import { refused } from '@/server/http/problem';
import { checkTransition } from '@shared/lending';
import { Loan } from './loan.entity';
import { loanFor, type LoanActor } from './loanAccess';
import { cannotMove } from './loans.errors';
import { lockLoan } from './loanState';

/** Accepts the terms as they stand now; the version accepted stays with the loan. Accepting the same again changes nothing. */
export async function acceptTerms(tx: EntityManager, loanId: string, termsVersionId: string, actor: LoanActor, now: Date): Promise<void> {
  await loanFor(tx, loanId, actor);
  const loan = await lockLoan(tx, loanId);
  const transition = checkTransition(loan.state, 'out');
  if (!transition.ok) throw cannotMove(transition);
  if (loan.termsAcceptedAt !== null && loan.termsVersionId === termsVersionId) return;
  const [current]: { id: string }[] = await tx.query('SELECT id FROM terms_version ORDER BY version DESC LIMIT 1');
  if (current?.id !== termsVersionId) throw refused('terms_changed', 'The terms were changed meanwhile. Reload, read the new ones and accept those.');
  await tx.update(Loan, { id: loanId }, { termsVersionId, termsAcceptedAt: now, version: () => 'version + 1' });
  await recordCustody(tx, { schoolId: loan.schoolId, kitId: loan.kitId, loanId, kind: 'terms_accepted', actorId: actor.accountId, forAccountId: loan.borrowerId, at: now });
}
