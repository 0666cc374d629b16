import { withSchoolSystem } from '@/server/database/school';
import { lookUpPayment } from '@/server/features/deposits/lookUp';
import { faultForLog } from '@/server/http/logging';
import type { JobDeps, JobHandler } from '@/server/jobs/deps';
import type { JobPayload } from '@/server/jobs/payloads';
import { cancelLoan } from './cancelLoan';
import { lockLoan } from './loanState';

const atOnceMax = 200;
/** How long a kit waits for a payment service that does not answer, before it is given back anyway. */
const patienceMs = 15 * 60_000;

/**
 * Gives back kits whose reservation ran out. The payment is looked up first, so that one which was paid in time, and
 * whose notice is late, goes out instead.
 */
export const expireReservations: JobHandler<JobPayload<'expire-reservations'>> = async (deps, { schoolId }) => {
  const lapsed: { id: string; reservedUntil: Date; paymentId: string | null }[] = await withSchoolSystem(deps.db, schoolId, (tx) =>
    tx.query(
      `SELECT l.id, l.reserved_until AS "reservedUntil", p.id AS "paymentId"
         FROM loan l LEFT JOIN payment p ON p.loan_id = l.id AND p.state IN ('opening', 'open')
        WHERE l.state = 'reserved' AND l.reserved_until <= $1 ORDER BY l.reserved_until LIMIT ${atOnceMax}`,
      [deps.now()],
    ));
  for (const loan of lapsed) {
    try {
      if (loan.paymentId !== null && !(await looked(deps, { schoolId, paymentId: loan.paymentId }, loan.reservedUntil))) continue;
      await giveBack(deps, schoolId, loan.id);
    } catch (error) {
      deps.log.warn({ loanId: loan.id, fault: faultForLog(error) }, 'reservation could not be ended; it is tried again in a minute');
    }
  }
};

async function looked(deps: JobDeps, ref: { schoolId: string; paymentId: string }, reservedUntil: Date): Promise<boolean> {
  try {
    await lookUpPayment(deps, ref);
    return true;
  } catch (error) {
    deps.log.warn({ paymentId: ref.paymentId, fault: faultForLog(error) }, 'payment of a lapsed reservation could not be looked up');
    return deps.now().getTime() - reservedUntil.getTime() > patienceMs;
  }
}

function giveBack(deps: JobDeps, schoolId: string, loanId: string): Promise<void> {
  return withSchoolSystem(deps.db, schoolId, async (tx) => {
    const loan = await lockLoan(tx, loanId);
    const now = deps.now();
    if (loan.state !== 'reserved' || loan.reservedUntil > now) return;
    await cancelLoan(tx, loan, { reason: 'abandoned', actorId: null, now });
  });
}
