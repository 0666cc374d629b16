import type { EntityManager } from 'typeorm';

export interface QueueHealth {
  /** Jobs that are due and not yet taken. */
  readonly ready: number;
  /** How long the oldest of them has been due, s. Minutes mean that no worker is alive, or too few. */
  readonly waitedSeconds: number;
  /** Jobs given up for good; a person should look at them. */
  readonly failed: number;
  /** When a worker last began the minute's sweep; null before the first. */
  readonly sweptAt: Date | null;
}

/** Looks at the queue through `jobs.queue_health()`, from any unit of work. */
export async function readQueueHealth(tx: EntityManager): Promise<QueueHealth> {
  const rows: { ready: string; waited_s: number; failed: string; swept_at: Date | null }[] = await tx.query('SELECT * FROM jobs.queue_health()');
  const row = rows[0];
  if (!row) throw new Error('jobs.queue_health() gave no row');
  return { ready: Number(row.ready), waitedSeconds: row.waited_s, failed: Number(row.failed), sweptAt: row.swept_at };
}
