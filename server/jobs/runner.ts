import { EventEmitter } from 'node:events';
import { type JobHelpers, makeWorkerUtils, parseCronItems, run, type TaskList, type WorkerEvents, type WorkerUtils } from 'graphile-worker';
import { faultForLog } from '@/server/http/logging';
import { type JobDeps, type JobHandler, PermanentFailure } from './deps';
import { type JobName, type JobPayload, payloads } from './payloads';
import { PoisonedPayload } from './shape';
import { tasks } from './tasks';
import { workerLogger } from './workerLogger';

export interface RunnerOptions {
  /** Connection of the queue role. */
  readonly queueUrl: string;
  readonly deps: JobDeps;
  /** Jobs worked on at once by this process, 1 to 50. */
  readonly concurrency?: number;
  /** Looks for due jobs at least this often; new ones are announced at once. */
  readonly pollIntervalMs?: number;
  /** Whether this runner starts the sweeps of every minute. Any number of runners may: a minute is started once. */
  readonly sweeps?: boolean;
}

export interface JobRunner {
  /** Settles when the runner has stopped, rejects when it broke. */
  readonly ended: Promise<void>;
  /** Takes no new job and waits for those in hand. */
  stop(): Promise<void>;
}

const everyMinute = parseCronItems([{ task: 'sweep-schools', match: '* * * * *', identifier: 'sweep-schools', options: { maxAttempts: 3, jobKey: 'sweep-schools', backfillPeriod: 0 } }]);

/** Starts working on the queue. Many runners on one database share its jobs: each is done by one of them. */
export async function startRunner(options: RunnerOptions): Promise<JobRunner> {
  const { queueUrl, deps } = options;
  const logger = workerLogger(deps.log);
  const utils = await makeWorkerUtils({ connectionString: queueUrl, logger, maxPoolSize: 1 });
  const events: WorkerEvents = new EventEmitter();
  const buried = buryPermanentFailures(events, utils, deps);
  const runner = await run({
    connectionString: queueUrl,
    concurrency: options.concurrency ?? 4,
    maxPoolSize: (options.concurrency ?? 4) + 2,
    pollInterval: options.pollIntervalMs ?? 2000,
    noHandleSignals: true,
    taskList: taskList(deps),
    parsedCronItems: options.sweeps === false ? [] : everyMinute,
    logger,
    events,
  });
  const ended = runner.promise.finally(async () => {
    await buried();
    await utils.release();
  });
  ended.catch(() => undefined); // whoever waits for `ended` hears of it; nobody has to
  return { ended, stop: async () => { await runner.stop(); await ended; } };
}

function taskList(deps: JobDeps): TaskList {
  const names = Object.keys(tasks) as JobName[];
  return Object.fromEntries(names.map((name) => [name, (payload: unknown, helpers: JobHelpers) => perform(name, payload, helpers, deps)]));
}

async function perform<N extends JobName>(name: N, raw: unknown, { job }: JobHelpers, deps: JobDeps): Promise<void> {
  const handler: JobHandler<JobPayload<N>> = tasks[name];
  const log = deps.log.child({ job: name, jobId: job.id, attempt: job.attempts });
  const startedMs = performance.now();
  try {
    const payload = payloads[name](raw) as JobPayload<N>;
    await handler({ ...deps, log }, payload, { number: job.attempts, isLast: job.attempts >= job.max_attempts });
  } catch (error) {
    const final = isPermanent(error) || job.attempts >= job.max_attempts;
    // A failure that will be tried again heals by itself more often than not; one that will not needs a person.
    log[final ? 'error' : 'warn']({ fault: faultForLog(error) }, final ? 'job failed for good' : 'job failed and will be tried again');
    throw withoutDetails(error);
  }
  log.debug({ ms: Math.round(performance.now() - startedMs) }, 'job done');
}

function isPermanent(error: unknown): boolean {
  return error instanceof PoisonedPayload || error instanceof PermanentFailure;
}

/** The queue stores the error's message in its table: ours are written for that, a library's or database's may hold personal data. */
function withoutDetails(error: unknown): Error {
  if (error instanceof PoisonedPayload || error instanceof PermanentFailure) return error;
  return new Error(`${error instanceof Error ? error.name : typeof error}; see the log for this job's id`);
}

/**
 * The queue knows retries only, so what must not be tried again is marked as failed through its own function once the
 * job has been let go. Killed in between, the job is tried once more and ends the same way.
 * @returns waits until every mark is made
 */
function buryPermanentFailures(events: WorkerEvents, utils: WorkerUtils, deps: JobDeps): () => Promise<void> {
  const doomed = new Map<string, string>();
  const marks = new Set<Promise<void>>();
  events.on('job:error', ({ job, error }) => {
    if (error instanceof Error && isPermanent(error)) doomed.set(job.id, error.message);
  });
  events.on('job:complete', ({ job }) => {
    const reason = doomed.get(job.id);
    if (reason === undefined) return;
    doomed.delete(job.id);
    const mark: Promise<void> = utils.permanentlyFailJobs([job.id], reason)
      .then(() => undefined, (error: unknown) => deps.log.warn({ jobId: job.id, fault: faultForLog(error) }, 'job could not be marked as failed'))
      .finally(() => marks.delete(mark));
    marks.add(mark);
  });
  return async () => {
    await Promise.all(marks);
  };
}
