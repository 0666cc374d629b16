import type { JobHandler } from '@/server/jobs/deps';
import type { JobPayload } from '@/server/jobs/payloads';
import { takeSteps } from './takeSteps';

/** Takes the steps that a committed decision left intended at the payment service. */
export const paymentSteps: JobHandler<JobPayload<'payment-steps'>> = (deps, ref) => takeSteps(deps, ref);
