import { withSchoolSystem } from '@/server/database/school';
import { lockLoan } from '@/server/features/loans/loanState';
import { faultForLog } from '@/server/http/logging';
import type { JobDeps, JobHandler } from '@/server/jobs/deps';
import type { JobPayload } from '@/server/jobs/payloads';
import { isOpen, secureBeforeLapseMs } from '@shared/lending';
import { intendStep, lockPayment } from './paymentRows';
import { settleKey } from './settle';
import { PaymentStep } from './payment.entity';
import { takeSteps } from './takeSteps';

const atOnceMax = 100;

/**
 * Looks for holds that end within a day while their loan is not settled, and takes the whole deposit before they do. It
 * stays the student's: this is not keeping. A hold that is already being released or kept is left alone.
 */
export const watchHolds: JobHandler<JobPayload<'watch-holds'>> = async (deps, { schoolId }) => {
  const ending: { id: string; loanId: string }[] = await withSchoolSystem(deps.db, schoolId, (tx) =>
    tx.query(
      `SELECT p.id, p.loan_id AS "loanId" FROM payment p JOIN loan l ON l.id = p.loan_id
        WHERE p.state = 'held' AND p.capture_before < $1 AND l.state NOT IN ('settled', 'cancelled')
        ORDER BY p.capture_before LIMIT ${atOnceMax}`,
      [new Date(deps.now().getTime() + secureBeforeLapseMs)],
    ));
  for (const { id, loanId } of ending) {
    try {
      if (await intendSecuring(deps, { schoolId, paymentId: id, loanId })) await takeSteps(deps, { schoolId, paymentId: id });
    } catch (error) {
      deps.log.warn({ paymentId: id, fault: faultForLog(error) }, 'hold could not be secured; it is tried again in a minute');
    }
  }
};

function intendSecuring(deps: JobDeps, at: { schoolId: string; paymentId: string; loanId: string }): Promise<boolean> {
  return withSchoolSystem(deps.db, at.schoolId, async (tx) => {
    const loan = await lockLoan(tx, at.loanId);
    const payment = await lockPayment(tx, at.paymentId);
    if (payment?.state !== 'held' || !isOpen(loan.state)) return false;
    if (await tx.existsBy(PaymentStep, { key: settleKey(payment) })) return false;
    const step = await intendStep(tx, { payment, kind: 'secure', key: `secure:${payment.id}`, amountMinor: payment.amountMinor, now: deps.now() });
    return step.state === 'intended';
  });
}
