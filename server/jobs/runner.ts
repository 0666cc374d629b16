import { EventEmitter } from 'node:events';
import { parseCronItems, run, type WorkerEvents } from 'graphile-worker';
import type { JobDeps } from './deps';
import { watchOrphans } from './orphans';
import { taskList } from './perform';
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
  /** How often to look for jobs of workers that died. */
  readonly orphanIntervalMs?: number;
}

export interface JobRunner {
  /** Settles when the runner has stopped, rejects when it broke. */
  readonly ended: Promise<void>;
  /** Takes no new job and waits for those in hand. */
  stop(): Promise<void>;
}

const everyMinute = parseCronItems([
  { task: 'sweep-schools', match: '* * * * *', identifier: 'sweep-schools', options: { maxAttempts: 3, jobKey: 'sweep-schools', backfillPeriod: 0 } },
]);

// Without batching the library lets a job go without waiting for the answer, and a stop in that moment closes the
// connection first: the finished job stays locked. A batch is waited for; 0 ms means one is written at once.
const preset = { worker: { completeJobBatchDelay: 0, failJobBatchDelay: 0 } };

/** Starts working on the queue. Many runners on one database share its jobs: each is done by one of them. */
export async function startRunner(options: RunnerOptions): Promise<JobRunner> {
  const { queueUrl, deps, concurrency = 4 } = options;
  const events: WorkerEvents = new EventEmitter();
  let workerId = '';
  events.once('pool:create', ({ workerPool }) => { workerId = workerPool.id; });
  const runner = await run({
    connectionString: queueUrl,
    concurrency,
    maxPoolSize: concurrency + 2,
    pollInterval: options.pollIntervalMs ?? 2000,
    noHandleSignals: true,
    taskList: taskList(deps),
    parsedCronItems: options.sweeps === false ? [] : everyMinute,
    logger: workerLogger(deps.log),
    events,
    preset,
  });
  const orphans = await watchOrphans({ queueUrl, workerId, everyMs: options.orphanIntervalMs ?? 30_000, log: deps.log });
  const ended = runner.promise.finally(() => orphans.stop());
  ended.catch(() => undefined); // whoever waits for `ended` hears of it; nobody has to
  let stopping: Promise<void> | undefined;
  return { ended, stop: () => (stopping ??= runner.stop().then(() => ended)) };
}
