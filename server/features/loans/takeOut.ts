import type { EntityManager } from 'typeorm';
import { recordCustody } from '@/server/features/custody/custody.service';
import { queueMail } from '@/server/mail/queueMail';
import { dueAt } from '@shared/lending';
import { lendingRules, neutralKit } from './lendingRules';
import type { Loan } from './loan.entity';
import { moveLoan } from './loanState';

/**
 * The kit goes out: its jars were seen, the terms accepted and the deposit held, charged or not due. The due time counts
 * from now. Writes custody and the receipt.
 *
 * @param loan    locked by the caller, `reserved`
 * @param actorId who did the last step; null when the payment service's notice did
 */
export async function takeOut(tx: EntityManager, loan: Loan, by: { actorId: string | null; mode: 'hold' | 'charge' | null; now: Date }): Promise<void> {
  const rules = await lendingRules(tx);
  await moveLoan(tx, loan, 'out', by.now, { dueAt: dueAt(by.now, rules.loanDays, rules) });
  await recordCustody(tx, {
    schoolId: loan.schoolId, kitId: loan.kitId, loanId: loan.id, kind: 'kit_out',
    actorId: by.actorId, forAccountId: loan.borrowerId, at: by.now,
  });
  const stones: { slot: string; neutralDescription: string }[] = await tx.query(
    `SELECT ls.slot, s.neutral_description AS "neutralDescription"
       FROM loan_stone ls JOIN stone s ON s.id = ls.stone_id WHERE ls.loan_id = $1 ORDER BY ls.slot`,
    [loan.id],
  );
  await queueMail(tx, {
    schoolId: loan.schoolId, toAccountId: loan.borrowerId, template: 'loan-started', dedupeKey: `loan-started:${loan.id}`,
    data: {
      loanId: loan.id, kit: await neutralKit(tx, loan.kitId), dueAt: loan.dueAt.toISOString(), stones,
      deposit: by.mode === null ? null : { amountMinor: loan.depositMinor, currency: loan.currency, mode: by.mode },
    },
  });
}
