import type { JobHelpers, TaskList } from 'graphile-worker';
import { faultForLog } from '@/server/http/logging';
import { type JobDeps, type JobHandler, PermanentFailure } from './deps';
import { type JobName, type JobPayload, payloads } from './payloads';
import { PoisonedPayload } from './shape';
import { tasks } from './tasks';

/** Our tasks in the form the queue library calls: payload checked, outcome logged, nothing personal in either. */
export function taskList(deps: JobDeps): TaskList {
  const names = Object.keys(tasks) as JobName[];
  return Object.fromEntries(names.map((name) => [name, (payload: unknown, helpers: JobHelpers) => perform(name, payload, helpers, deps)]));
}

// eslint-disable-next-line @typescript-eslint/no-unnecessary-type-parameters -- N ties the job's payload to its handler
async function perform<N extends JobName>(name: N, raw: unknown, helpers: JobHelpers, deps: JobDeps): Promise<void> {
  const { job } = helpers;
  const handler: JobHandler<JobPayload<N>> = tasks[name];
  const log = deps.log.child({ job: name, jobId: job.id, attempt: job.attempts });
  const startedMs = performance.now();
  try {
    const payload = payloads[name](raw) as JobPayload<N>;
    await handler({ ...deps, log }, payload, { number: job.attempts, isLast: job.attempts >= job.max_attempts });
  } catch (error) {
    const permanent = error instanceof PoisonedPayload || error instanceof PermanentFailure;
    if (permanent) await takeAwayRetries(helpers);
    const final = permanent || job.attempts >= job.max_attempts;
    // A failure that will be tried again heals by itself more often than not; one that will not needs a person.
    log[final ? 'error' : 'warn']({ fault: faultForLog(error) }, final ? 'job failed for good' : 'job failed and will be tried again');
    // The queue stores the message in its table. Ours are written for that; a library's or database's may hold personal data.
    throw permanent ? error : new Error(`${error instanceof Error ? error.name : typeof error}; see the log for this job's id`);
  }
  log.debug({ ms: Math.round(performance.now() - startedMs) }, 'job done');
}

/**
 * The queue knows retries only. Its public function for giving a job up refuses one that is running, so the running
 * job's own count is lowered in the library's table; `tests/integration/jobs` notices should a new version change it.
 */
async function takeAwayRetries({ job, withPgClient }: JobHelpers): Promise<void> {
  await withPgClient((client) => client.query('UPDATE graphile_worker._private_jobs SET max_attempts = attempts WHERE id = $1', [job.id]));
}
