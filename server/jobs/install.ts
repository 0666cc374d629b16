import { runMigrations } from 'graphile-worker';
import { Client } from 'pg';
import { workerLogger } from './workerLogger';

/**
 * The application's only doors into the queue. They belong to the queue role and run with its rights, because the
 * application role can neither read nor write the queue's own tables.
 */
const doors = `
  CREATE SCHEMA IF NOT EXISTS jobs;
  REVOKE ALL ON SCHEMA jobs FROM PUBLIC;
  GRANT USAGE ON SCHEMA jobs TO trayward_app;

  CREATE OR REPLACE FUNCTION jobs.enqueue_job(task text, payload json, run_at timestamptz, job_key text, max_attempts integer)
    RETURNS void LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog AS $$
    BEGIN
      IF task !~ '^[a-z][a-z-]{2,59}$' THEN RAISE EXCEPTION 'enqueue_job: bad task name'; END IF;
      IF octet_length(payload::text) > 8192 THEN RAISE EXCEPTION 'enqueue_job: payload over 8 kB'; END IF;
      IF max_attempts NOT BETWEEN 1 AND 25 THEN RAISE EXCEPTION 'enqueue_job: 1 to 25 attempts'; END IF;
      PERFORM graphile_worker.add_job(task, payload, NULL, run_at, max_attempts, job_key);
    END $$;

  -- ready: due and waiting; waited_s: how long the oldest of them has been due; failed: given up for good;
  -- swept_at: when a worker last started the minute's sweep, which tells that one is alive.
  CREATE OR REPLACE FUNCTION jobs.queue_health()
    RETURNS TABLE (ready bigint, waited_s double precision, failed bigint, swept_at timestamptz)
    LANGUAGE sql STABLE SECURITY DEFINER SET search_path = pg_catalog AS $$
      SELECT count(*) FILTER (WHERE j.run_at <= now() AND j.attempts < j.max_attempts AND j.locked_at IS NULL),
             coalesce(max(extract(epoch FROM now() - j.run_at)) FILTER (WHERE j.run_at <= now() AND j.attempts < j.max_attempts AND j.locked_at IS NULL), 0)::double precision,
             count(*) FILTER (WHERE j.attempts >= j.max_attempts AND j.locked_at IS NULL),
             (SELECT max(c.last_execution) FROM graphile_worker._private_known_crontabs c)
        FROM graphile_worker.jobs j $$;

  REVOKE ALL ON FUNCTION jobs.enqueue_job(text, json, timestamptz, text, integer), jobs.queue_health() FROM PUBLIC;
  GRANT EXECUTE ON FUNCTION jobs.enqueue_job(text, json, timestamptz, text, integer), jobs.queue_health() TO trayward_app;
`;

/**
 * Installs or upgrades the queue as the queue role: graphile-worker's own schema, then the application's doors into it.
 * Part of the migrate step and safe to repeat.
 */
export async function installQueue(queueUrl: string): Promise<void> {
  await runMigrations({ connectionString: queueUrl, logger: workerLogger() });
  const client = new Client({ connectionString: queueUrl, application_name: 'trayward-migrate' });
  await client.connect();
  try {
    await client.query(doors);
  } finally {
    await client.end();
  }
}
