import type { EntityManager } from 'typeorm';
import { recordCustody } from '@/server/features/custody/custody.service';
import { settleDeposit } from '@/server/features/deposits/settle';
import type { Loan } from '@/server/features/loans/loan.entity';
import { moveLoan } from '@/server/features/loans/loanState';
import { backOnShelf } from '@/server/features/kits/standing';
import { queueMail } from '@/server/mail/queueMail';
import { Settlement } from './settlement.entity';

/**
 * Every stone came back as itself: the whole deposit is released, the kit goes back on the shelf and the borrower is told.
 * Runs in the transaction of the last finding; `loan` is locked by the caller.
 */
export async function releaseAll(tx: EntityManager, loan: Loan, actorId: string, now: Date): Promise<void> {
  await tx.upsert(Settlement, {
    loanId: loan.id, schoolId: loan.schoolId, state: 'decided', keptMinor: 0, releasedMinor: loan.depositMinor, currency: loan.currency,
    decidedBy: actorId, decidedAt: now,
  }, ['loanId']);
  await moveLoan(tx, loan, 'settled', now);
  await backOnShelf(tx, { kitId: loan.kitId, schoolId: loan.schoolId, reason: 'Every stone is the recorded one', actorId, loanId: loan.id, now });
  await recordCustody(tx, { schoolId: loan.schoolId, kitId: loan.kitId, loanId: loan.id, kind: 'check_done', actorId, at: now });
  await settleDeposit(tx, loan.id, { keepMinor: 0, actorId, now });
  const [kit] = await tx.query<{ kitNumber: string; neutralTitle: string }[]>(
    'SELECT number AS "kitNumber", neutral_title AS "neutralTitle" FROM kit WHERE id = $1', [loan.kitId]);
  const [payment] = await tx.query<{ mode: 'hold' | 'charge' }[]>(`SELECT CASE WHEN secured_at IS NULL THEN mode ELSE 'charge' END AS mode FROM payment WHERE loan_id = $1 AND state <> 'cancelled'`, [loan.id]);
  if (kit === undefined) return;
  await queueMail(tx, {
    schoolId: loan.schoolId, toAccountId: loan.borrowerId, template: 'deposit-released', dedupeKey: `deposit-released:${loan.id}`,
    data: { loanId: loan.id, kit, deposit: payment === undefined ? null : { amountMinor: loan.depositMinor, currency: loan.currency, mode: payment.mode } },
  });
}
