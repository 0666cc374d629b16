import type { EntityManager } from 'typeorm';
import { recordCustody } from '@/server/features/custody/custody.service';
import { outcomeOf } from '@/server/features/settlement/outcome';
import { forbidden, refused } from '@/server/http/problem';
import type { LoanOutcome } from '@shared/api/loans';
import { mailAdmins } from './admins';
import { isBorrower, loanFor, type LoanActor } from './loanAccess';
import { lockLoan } from './loanState';

/** Whether the borrower may say something against what is, or is meant to be, kept: once, and within the school's time. */
export function mayObject(outcome: LoanOutcome | null, now: Date): boolean {
  if (outcome === null || outcome.keptMinor === 0 || outcome.objection !== null) return false;
  return outcome.objectUntil !== null && now.getTime() <= Date.parse(outcome.objectUntil);
}

/** Stores the borrower's objection; it stands on the desk until an admin answers. */
export async function objectToLoan(tx: EntityManager, loanId: string, text: string, actor: LoanActor, now: Date): Promise<void> {
  const seen = await loanFor(tx, loanId, actor);
  if (!isBorrower(seen, actor)) throw forbidden('Only the borrower can object. Write down for them what they say at the desk, and let them send it.');
  const loan = await lockLoan(tx, loanId);
  const outcome = await outcomeOf(tx, loanId);
  if (outcome?.objection) throw refused('objected', 'Your objection is here already. The school answers it on this page.');
  if (!mayObject(outcome, now)) throw refused('nothing_to_object', 'There is nothing to object to: nothing is kept, or the time for it is over. Ask at the desk.');
  await tx.query('INSERT INTO objection (loan_id, school_id, text, made_by, made_at) VALUES ($1, $2, $3, $4, $5)', [loanId, loan.schoolId, text, actor.accountId, now]);
  await recordCustody(tx, { schoolId: loan.schoolId, kitId: loan.kitId, loanId, kind: 'objection_made', actorId: actor.accountId, at: now });
  await mailAdmins(tx, loan, { template: 'objection-made' });
}
