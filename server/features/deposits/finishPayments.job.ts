import { withSchoolSystem } from '@/server/database/school';
import { faultForLog } from '@/server/http/logging';
import type { JobHandler } from '@/server/jobs/deps';
import type { JobPayload } from '@/server/jobs/payloads';
import { lookUpPayment } from './lookUp';
import { takeSteps } from './takeSteps';

const atOnceMax = 50;
/** Younger ones are most likely still in the hands of whoever began them. */
const settleMs = 60_000;

/**
 * Takes up what a killed process, a lost answer or a lost notice left behind: steps still intended, pages still opening,
 * and open pages that may have been paid. One payment that cannot be finished does not keep the others waiting.
 */
export const finishPayments: JobHandler<JobPayload<'finish-payments'>> = async (deps, { schoolId }) => {
  const before = new Date(deps.now().getTime() - settleMs);
  const waiting: { id: string; unpaid: boolean }[] = await withSchoolSystem(deps.db, schoolId, (tx) =>
    tx.query(
      `SELECT p.id, p.state IN ('opening', 'open') AS unpaid FROM payment p
        WHERE (p.state IN ('opening', 'open') AND p.created_at <= $1)
           OR EXISTS (SELECT 1 FROM payment_step s WHERE s.payment_id = p.id AND s.state = 'intended' AND s.created_at <= $1)
        ORDER BY p.created_at LIMIT ${atOnceMax}`,
      [before],
    ));
  for (const { id, unpaid } of waiting) {
    const ref = { schoolId, paymentId: id };
    try {
      if (unpaid) await lookUpPayment(deps, ref);
      await takeSteps(deps, ref);
    } catch (error) {
      deps.log.warn({ paymentId: id, fault: faultForLog(error) }, 'payment could not be finished; it is tried again in a minute');
    }
  }
};
