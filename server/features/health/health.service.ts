import { setTimeout as sleep } from 'node:timers/promises';
import type { Database } from '@/server/database/data-source';
import { withSystem } from '@/server/database/school';
import type { HealthView } from '@shared/api/health';

/** A job that has been due this long means that no worker is at work. */
const queueLateAfterS = 300;
const timeoutMs = 3_000;

interface QueueRow {
  ready: number;
  waitedSeconds: number;
  failed: number;
  sweptAt: Date | null;
}

/** Asks the database and, through it, the queue. Never throws: what does not answer in time is reported as failing. */
export async function readHealth(db: Database): Promise<HealthView> {
  const uptimeSeconds = Math.floor(process.uptime());
  const queue = await inTime(readQueue(db));
  if (!queue) {
    const database = await inTime(withSystem(db, (tx) => tx.query<unknown[]>('SELECT 1')));
    return { status: 'failing', uptimeSeconds, database: database ? 'ok' : 'failing', queue: { status: 'failing', ready: null, waitedSeconds: null, failed: null, workerSeenAt: null } };
  }
  const status = queue.waitedSeconds > queueLateAfterS ? 'failing' : 'ok';
  return {
    status, uptimeSeconds, database: 'ok',
    queue: { status, ready: queue.ready, waitedSeconds: Math.round(queue.waitedSeconds), failed: queue.failed, workerSeenAt: queue.sweptAt?.toISOString() ?? null },
  };
}

async function readQueue(db: Database): Promise<QueueRow | undefined> {
  const rows: QueueRow[] = await withSystem(db, (tx) =>
    tx.query('SELECT ready::integer, waited_s AS "waitedSeconds", failed::integer, swept_at AS "sweptAt" FROM jobs.queue_health()'),
  );
  return rows[0];
}

async function inTime<T>(work: Promise<T>): Promise<T | undefined> {
  const late = sleep(timeoutMs, undefined, { ref: false });
  return Promise.race([work, late]).catch(() => undefined);
}
