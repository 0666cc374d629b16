import { Client } from 'pg';
import type { Logger } from 'pino';
import { faultForLog } from '@/server/http/logging';

const namePrefix = 'trayward-worker:';

export interface OrphanWatch {
  stop(): Promise<void>;
}

/**
 * Frees the jobs of workers that died without a word. The queue by itself waits four hours for a worker that holds a
 * job; but a worker that is alive keeps a connection open under its own name, so one without is known to be dead at
 * once. Should only that connection have broken, a job may run twice, which every handler must bear anyway.
 */
export async function watchOrphans(options: { queueUrl: string; workerId: string; everyMs: number; log: Logger }): Promise<OrphanWatch> {
  const { queueUrl, workerId, everyMs, log } = options;
  let client: Client | undefined;
  let stopped = false;

  async function look(): Promise<void> {
    try {
      client ??= await connect(queueUrl, workerId, () => { client = undefined; });
      const freed = await freeOrphans(client);
      if (freed > 0) log.warn({ jobs: freed }, 'freed the jobs of workers that died');
    } catch (error) {
      log.warn({ fault: faultForLog(error) }, 'could not look for the jobs of dead workers; will look again');
    }
  }

  await look();
  let looking: Promise<void> = Promise.resolve();
  const timer = setInterval(() => {
    looking = looking.then(() => (stopped ? undefined : look()));
  }, everyMs);
  return {
    async stop() {
      stopped = true;
      clearInterval(timer);
      await looking;
      await client?.end();
    },
  };
}

async function connect(queueUrl: string, workerId: string, onLost: () => void): Promise<Client> {
  const client = new Client({ connectionString: queueUrl, application_name: `${namePrefix}${workerId}`, keepAlive: true });
  client.on('error', onLost);
  client.on('end', onLost);
  await client.connect();
  return client;
}

/** @returns how many jobs were freed. A lock younger than ten seconds is left alone: its worker may just be starting. */
async function freeOrphans(client: Client): Promise<number> {
  const { rows } = await client.query<{ locked_by: string; jobs: string }>(
    `SELECT j.locked_by, count(*) AS jobs FROM graphile_worker.jobs j
      WHERE j.locked_by IS NOT NULL AND j.locked_at < now() - interval '10 seconds'
        AND NOT EXISTS (SELECT 1 FROM pg_stat_activity a WHERE a.datname = current_database() AND a.application_name = $1 || j.locked_by)
      GROUP BY j.locked_by`,
    [namePrefix],
  );
  if (rows.length === 0) return 0;
  await client.query('SELECT graphile_worker.force_unlock_workers($1::text[])', [rows.map((row) => row.locked_by)]);
  return rows.reduce((sum, row) => sum + Number(row.jobs), 0);
}
