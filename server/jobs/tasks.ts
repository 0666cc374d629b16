import { sendMail } from '@/server/mail/sendMail.job';
import type { JobHandler } from './deps';
import type { JobName, JobPayload } from './payloads';
import { sweepSchools } from './sweepSchools.job';

/** The handler of every job. The type makes a job without a handler, or a handler of the wrong payload, a compile error. */
export const tasks: { readonly [N in JobName]: JobHandler<JobPayload<N>> } = {
  'sweep-schools': sweepSchools,
  'send-mail': sendMail,
};
