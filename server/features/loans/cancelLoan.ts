import type { EntityManager } from 'typeorm';
import { recordCustody } from '@/server/features/custody/custody.service';
import { closePageLater } from '@/server/features/deposits/closePage';
import { queueMail } from '@/server/mail/queueMail';
import type { CancelReason } from '@shared/api/loans';
import { neutralKit } from './lendingRules';
import type { Loan } from './loan.entity';
import { moveLoan } from './loanState';

export interface Cancelling {
  readonly reason: CancelReason;
  /** What was said beside it, for the custody event. */
  readonly words?: string;
  /** Null for the sweep of reservations that ran out. */
  readonly actorId: string | null;
  readonly now: Date;
  readonly absentSlots?: readonly string[];
}

const reasonWords: Record<CancelReason, string> = {
  by_student: 'by the borrower',
  by_staff: 'by staff',
  abandoned: 'not paid in time',
  jar_absent: 'a jar was not there',
};

/**
 * Cancels a reserved loan that the caller has locked: the kit is free from this transaction on, and the payment page is
 * closed after it. A payment that completes in between goes back by itself.
 */
export async function cancelLoan(tx: EntityManager, loan: Loan, how: Cancelling): Promise<void> {
  await moveLoan(tx, loan, 'cancelled', how.now, { cancelReason: how.reason });
  const words = how.words?.trim() ?? '';
  await recordCustody(tx, {
    schoolId: loan.schoolId, kitId: loan.kitId, loanId: loan.id, kind: 'loan_cancelled', actorId: how.actorId, forAccountId: loan.borrowerId, at: how.now,
    detail: { reason: words === '' ? reasonWords[how.reason] : `${reasonWords[how.reason]}: ${words}` },
  });
  await closePageLater(tx, loan.id, how.now);
  await queueMail(tx, {
    schoolId: loan.schoolId, toAccountId: loan.borrowerId, template: 'loan-cancelled', dedupeKey: `loan-cancelled:${loan.id}`,
    data: { loanId: loan.id, kit: await neutralKit(tx, loan.kitId), reason: how.reason, ...(how.absentSlots === undefined ? {} : { absentSlots: how.absentSlots }) },
  });
}
