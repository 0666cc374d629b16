import { withSystem } from '@/server/database/school';
import type { JobHandler } from './deps';
import { enqueueSweep } from './enqueue';
import { type JobPayload, schoolSweeps } from './payloads';

/**
 * Enqueues one job per school and sweep. The key makes a sweep that is still waiting (a worker was away) one job, not
 * many; one that is running is followed by one more, so nothing that happened meanwhile is missed.
 */
export const sweepSchools: JobHandler<JobPayload<'sweep-schools'>> = async ({ db }) => {
  await withSystem(db, async (tx) => {
    const schools: { id: string }[] = await tx.query('SELECT id FROM all_school_ids() AS id');
    for (const { id } of schools) {
      for (const name of schoolSweeps) await enqueueSweep(tx, name, id);
    }
  });
};
