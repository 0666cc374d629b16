import { databaseEnvironment } from './database.mjs';
import { untilHealthy, untilListening } from './health.mjs';
import { runTs } from './paths.mjs';
import { PlainError } from './say.mjs';

/**
 * The environment of one whole stack on loopback: server, worker, payment fake and mail inbox.
 * @param mode `demo` or `test`; see server/config.ts
 * @param ports { web, postgres, paymentFake, smtp, inbox }
 */
export function stackEnvironment({ mode, state, ports, folder, webFolder, host = '127.0.0.1', publicUrl, database }) {
  // The owner's connection is for migrations and the seed alone; what serves requests must not even know it.
  const { DATABASE_OWNER_URL: _owner, ...databaseUrls } = databaseEnvironment({ port: ports.postgres, passwords: state.passwords, database });
  return {
    NODE_ENV: mode === 'test' ? 'test' : 'production',
    TRAYWARD_MODE: mode,
    TRAYWARD_DATA: folder,
    PORT: String(ports.web),
    HOST: host,
    PUBLIC_URL: publicUrl ?? `http://localhost:${ports.web}`,
    ...databaseUrls,
    ACCESS_TOKEN_SECRET: state.accessTokenSecret,
    STRIPE_SECRET_KEY: state.stripeSecretKey,
    STRIPE_WEBHOOK_SECRET: state.stripeWebhookSecret,
    STRIPE_API_BASE: `http://127.0.0.1:${ports.paymentFake}`,
    PAYMENT_FAKE_PORT: String(ports.paymentFake),
    TRAYWARD_PAYMENT_FAKE_FILE: `${folder}/payment-fake.json`,
    TRAYWARD_WEBHOOK_URL: `http://127.0.0.1:${ports.web}/api/v1/webhooks/stripe`,
    SMTP_PORT: String(ports.smtp),
    SMTP_URL: `smtp://127.0.0.1:${ports.smtp}`,
    MAIL_FROM: 'Trayward <desk@trayward.example>',
    INBOX_PORT: String(ports.inbox),
    INBOX_URL: `http://127.0.0.1:${ports.inbox}`,
    STORAGE_DIR: `${folder}/files`,
    WEB_DIR: webFolder,
  };
}

/** The processes of a stack in the order of their start: what others talk to comes first. */
const stackProcesses = {
  'payment-fake': 'server/payments/fake/main.ts',
  inbox: 'server/mail/inbox/main.ts',
  server: 'server/main.ts',
  worker: 'server/jobs/main.ts',
};

/** What needs neither database nor web app and can start while both are being prepared. */
export const helperProcesses = ['payment-fake', 'inbox'];
export const mainProcesses = ['server', 'worker'];

export function launch({ processes, environment, names }) {
  for (const name of names) processes.start(name, runTs(stackProcesses[name]), environment);
}

/** Waits until the whole stack is healthy, or tells which process died and why. */
export async function untilReady({ processes, environment }) {
  const died = processes.death.then(({ name, reason, lines }) => {
    throw new PlainError(`The ${name} process ${reason} while starting. Its last lines:\n${lines}`);
  });
  const host = environment.HOST === '0.0.0.0' ? '127.0.0.1' : environment.HOST;
  const ready = Promise.all([
    untilHealthy(`http://${host}:${environment.PORT}/api/v1/health`),
    ...['PAYMENT_FAKE_PORT', 'SMTP_PORT', 'INBOX_PORT'].map((name) => untilListening(Number(environment[name]))),
  ]);
  await Promise.race([ready, died]);
}
