/** GET /health: answered 503 instead of 200 when `status` is `failing`. */
export interface HealthView {
  status: 'ok' | 'failing';
  uptimeSeconds: number;
  database: 'ok' | 'failing';
  queue: {
    status: 'ok' | 'failing';
    /** Jobs that are due and wait; null when the queue does not answer. */
    ready: number | null;
    /** How long the oldest of them has been due. */
    waitedSeconds: number | null;
    /** Jobs given up for good. */
    failed: number | null;
    /** When a worker last started its sweep; null before the first. */
    workerSeenAt: string | null;
  };
}
