import { ConfigError, paymentSettings, readConfig } from '@/server/config';
import { openDatabase } from '@/server/database/data-source';
import { createLogger } from '@/server/http/logging';
import { createSmtpMail } from '@/server/mail/smtpMail';
import { createPaymentPort } from '@/server/payments/stripe.adapter';
import { healthServer } from './health';
import { startRunner } from './runner';

/**
 * The worker process: takes jobs from the queue until SIGTERM or SIGINT, then finishes those in hand and ends.
 * `WORKER_CONCURRENCY` (1 to 50, default 4) jobs at once; `WORKER_PORT` opens `GET /health` on loopback.
 */
async function main(): Promise<void> {
  const config = readConfig(process.env);
  const log = createLogger(config.logLevel).child({ process: 'worker' });
  const concurrency = wholeNumber('WORKER_CONCURRENCY', 4, 50);
  const healthPort = wholeNumber('WORKER_PORT', 0, 65_535);
  const db = await openDatabase({ url: config.database.url, poolSize: concurrency + 2, applicationName: 'trayward-jobs' });
  const mail = createSmtpMail(config.mail);
  const payments = createPaymentPort(paymentSettings(config));
  const runner = await startRunner({
    queueUrl: config.database.queueUrl,
    concurrency,
    deps: { db, mail, payments, publicUrl: config.publicUrl, now: () => new Date(), log },
  });
  const health = healthPort > 0 ? await healthServer(healthPort, runner.ended) : undefined;
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.once(signal, () => {
      log.info({ signal }, 'worker stopping');
      runner.stop().catch(() => undefined); // its failure is heard of through `ended`
    });
  }
  log.info({ concurrency }, 'worker ready');
  try {
    await runner.ended;
  } finally {
    await Promise.all([health?.close(), mail.close(), db.close()]);
  }
  log.info('worker stopped');
}

function wholeNumber(name: string, fallback: number, max: number): number {
  const given = process.env[name]?.trim();
  if (!given) return fallback;
  const value = Number(given);
  if (Number.isInteger(value) && value >= 1 && value <= max) return value;
  throw new ConfigError([`${name} must be a whole number from 1 to ${max}`]);
}

main().catch((error: unknown) => {
  process.stderr.write(`The worker could not go on: ${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});
