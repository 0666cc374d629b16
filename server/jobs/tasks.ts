import { finishPayments } from '@/server/features/deposits/finishPayments.job';
import { paymentEvent } from '@/server/features/deposits/paymentEvent.job';
import { paymentSteps } from '@/server/features/deposits/paymentSteps.job';
import { watchHolds } from '@/server/features/deposits/watchHolds.job';
import { expireReservations } from '@/server/features/loans/expireReservations.job';
import { sendMail } from '@/server/mail/sendMail.job';
import type { JobHandler } from './deps';
import type { JobName, JobPayload } from './payloads';
import { sweepSchools } from './sweepSchools.job';

/** The handler of every job. The type makes a job without a handler, or a handler of the wrong payload, a compile error. */
export const tasks: { readonly [N in JobName]: JobHandler<JobPayload<N>> } = {
  'sweep-schools': sweepSchools,
  'expire-reservations': expireReservations,
  'finish-payments': finishPayments,
  'watch-holds': watchHolds,
  'payment-event': paymentEvent,
  'payment-steps': paymentSteps,
  'send-mail': sendMail,
};
