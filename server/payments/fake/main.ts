import { createPaymentFake } from './index';

/**
 * The payment fake as its own process. Environment: `PAYMENT_FAKE_PORT` (required), `STRIPE_WEBHOOK_SECRET` (required),
 * `TRAYWARD_WEBHOOK_URL`, `TRAYWARD_PAYMENT_FAKE_FILE`, `PAYMENT_FAKE_HOST` (127.0.0.1), `PAYMENT_FAKE_PUBLIC_URL`.
 * Refuses to start beside live keys, so that nobody mistakes it for the real service.
 */
async function main(): Promise<void> {
  const env = process.env;
  if (/^[sr]k_live/.test(env.STRIPE_SECRET_KEY ?? '')) fail('STRIPE_SECRET_KEY is a live key: the payment fake is for test keys only. Unset it, or do not start the fake.');
  const port = Number(env.PAYMENT_FAKE_PORT);
  if (!Number.isInteger(port) || port < 1 || port > 65_535) fail('PAYMENT_FAKE_PORT must name a port, 1 to 65535.');
  const webhookSecret = env.STRIPE_WEBHOOK_SECRET ?? '';
  if (webhookSecret === '') fail('STRIPE_WEBHOOK_SECRET must be set: it signs the notices.');

  const fake = createPaymentFake({
    webhookSecret,
    ...(env.TRAYWARD_WEBHOOK_URL ? { webhookUrl: env.TRAYWARD_WEBHOOK_URL } : {}),
    ...(env.TRAYWARD_PAYMENT_FAKE_FILE ? { filePath: env.TRAYWARD_PAYMENT_FAKE_FILE } : {}),
    ...(env.PAYMENT_FAKE_PUBLIC_URL ? { publicUrl: env.PAYMENT_FAKE_PUBLIC_URL } : {}),
  });
  const address = await fake.start(port, env.PAYMENT_FAKE_HOST ?? '127.0.0.1');
  process.stdout.write(`payment fake: ${address.url}\n`);

  const stop = (): void => {
    fake.stop().then(() => process.exit(0), (error: unknown) => fail(String(error)));
  };
  process.once('SIGINT', stop);
  process.once('SIGTERM', stop);
}

function fail(message: string): never {
  process.stderr.write(`payment fake: ${message}\n`);
  process.exit(1);
}

main().catch((error: unknown) => {
  const inUse = error instanceof Error && 'code' in error && error.code === 'EADDRINUSE';
  fail(inUse ? `port ${process.env.PAYMENT_FAKE_PORT} is taken: choose another with PAYMENT_FAKE_PORT.` : String(error));
});
