import { databaseEnvironment } from './database.mjs';
import { runTs } from './paths.mjs';

/**
 * The environment of one whole stack on loopback: server, worker, payment fake and mail inbox.
 * @param mode `demo` or `test`; see server/config.ts
 * @param ports { web, postgres, paymentFake, smtp, inbox }
 */
export function stackEnvironment({ mode, state, ports, folder, webFolder, host = '127.0.0.1', publicUrl, database }) {
  return {
    NODE_ENV: mode === 'test' ? 'test' : 'production',
    TRAYWARD_MODE: mode,
    TRAYWARD_DATA: folder,
    PORT: String(ports.web),
    HOST: host,
    PUBLIC_URL: publicUrl ?? `http://localhost:${ports.web}`,
    ...databaseEnvironment({ port: ports.postgres, passwords: state.passwords, database }),
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
export const stackProcesses = [
  { name: 'payment-fake', args: runTs('server/payments/fake/main.ts') },
  { name: 'inbox', args: runTs('server/mail/inbox/main.ts') },
  { name: 'server', args: runTs('server/main.ts') },
  { name: 'worker', args: runTs('server/jobs/main.ts') },
];
