import type { Server } from 'node:http';
import { createApp } from './app';
import { paymentSettings, readConfig } from './config';
import { openDatabase } from './database/data-source';
import { createLogger } from './http/logging';
import { createPaymentPort } from './payments/stripe.adapter';
import { createFolderStorage } from './storage/folderStorage';

/** A request that hangs longer than this while the process is stopping is cut off. */
const stopWithinMs = 10_000;

/** The server process: answers requests until SIGTERM or SIGINT, then finishes those in hand and ends. */
async function main(): Promise<void> {
  const config = readConfig(process.env);
  const logger = createLogger(config.logLevel).child({ process: 'server' });
  const db = await openDatabase({ url: config.database.url, poolSize: config.database.poolSize, applicationName: 'trayward-server' });
  const payments = createPaymentPort(paymentSettings(config));
  const storage = createFolderStorage(config.storageDir);
  const app = createApp({ config, db, payments, storage, logger, clock: () => new Date() });

  const server = app.listen(config.port, config.host, (error?: Error) => {
    if (error) fail(error);
    else logger.info({ port: config.port }, 'server ready');
  });
  // Longer than a proxy keeps its connections, so that it never sends into one that is closing.
  server.keepAliveTimeout = 75_000;
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.once(signal, () => {
      logger.info({ signal }, 'server stopping');
      stop(server)
        .then(() => db.close())
        .then(() => logger.info('server stopped'))
        .catch(fail);
    });
  }
}

async function stop(server: Server): Promise<void> {
  const cut = setTimeout(() => server.closeAllConnections(), stopWithinMs);
  await new Promise<void>((resolve) => {
    server.close(() => resolve());
    server.closeIdleConnections();
  });
  clearTimeout(cut);
}

function fail(error: unknown): void {
  process.stderr.write(`The server could not go on: ${error instanceof Error ? error.message : String(error)}\n`);
  process.exit(1);
}

main().catch(fail);
