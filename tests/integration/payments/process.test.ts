import { spawn } from 'node:child_process';
import type { ChildProcessWithoutNullStreams } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';

import { createPaymentFake } from '@/server/payments/fake';
import { createPaymentPort } from '@/server/payments/stripe.adapter';

import { cards, deposit, newKey, paid, startReceiver, startService, webhookSecret } from './support';

async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const { port } = server.address() as AddressInfo;
  server.close();
  await once(server, 'close');
  return port;
}

describe('the fake over restarts', () => {
  let folder: string;

  beforeEach(() => {
    folder = mkdtempSync(path.join(tmpdir(), 'payment-fake-'));
  });
  afterEach(() => rmSync(folder, { recursive: true }));

  it('keeps payments, keys and the clock in its file', async () => {
    const filePath = path.join(folder, 'nested', 'state.json');
    const before = await startService({ filePath });
    const id = await paid(before);
    await before.fake.control.advanceClock(3600);
    await before.port.capture(id, 5_000, 'key-kept');
    await before.stop();

    const after = await startService({ filePath });
    expect(await after.port.readPayment(id)).toMatchObject({ status: 'charged', receivedMinor: 5_000 });
    expect(await after.port.capture(id, 5_000, 'key-kept')).toMatchObject({ receivedMinor: 5_000 });
    expect(after.fake.control.nowSeconds() - Date.now() / 1000).toBeGreaterThan(3590);
    await after.stop();
  });

  it('has an answer on disk before it is given, and never half a file', async () => {
    const filePath = path.join(folder, 'state.json');
    const service = await startService({ filePath });
    const ids = await Promise.all(Array.from({ length: 15 }, (_, index) => paid(service, { paymentId: `payment-${index}` })));
    const state = JSON.parse(readFileSync(filePath, 'utf8')) as { documents: { payment_intent: Record<string, { status: string }> } };
    for (const id of ids) expect(state.documents.payment_intent[id]?.status).toBe('requires_capture');
    await service.stop();
  });

  it('brings notices that were still under way when it stopped', async () => {
    const filePath = path.join(folder, 'state.json');
    const receiver = await startReceiver();
    const before = await startService({ filePath, webhookUrl: receiver.url });
    before.fake.control.webhooks({ paused: true });
    await paid(before);
    await before.fake.control.webhooksIdle();
    await before.stop();
    expect(receiver.notices).toHaveLength(0);

    const after = await startService({ filePath, webhookUrl: receiver.url });
    await after.fake.control.webhooksIdle();
    expect(receiver.notices).toHaveLength(4);
    await after.stop();
    await receiver.close();
  });

  it('refuses a file that is not its own instead of writing over it', () => {
    const filePath = path.join(folder, 'other.json');
    writeFileSync(filePath, '{"hello":"world"}');
    expect(() => createPaymentFake({ webhookSecret, filePath })).toThrow(/was not written by this payment fake/);
    expect(readFileSync(filePath, 'utf8')).toBe('{"hello":"world"}');
  });
});

describe('the fake as a process of its own', () => {
  const root = path.resolve(__dirname, '../../..');
  const started: ChildProcessWithoutNullStreams[] = [];

  function start(env: Record<string, string>): { child: ChildProcessWithoutNullStreams; output: () => string } {
    const child = spawn(process.execPath, ['-r', '@swc-node/register', 'server/payments/fake/main.ts'], {
      cwd: root,
      env: { NODE_ENV: 'test', PATH: process.env.PATH ?? '', ...env },
    });
    started.push(child);
    let output = '';
    child.stdout.on('data', (chunk: Buffer) => (output += chunk.toString()));
    child.stderr.on('data', (chunk: Buffer) => (output += chunk.toString()));
    return { child, output: () => output };
  }

  afterEach(() => {
    for (const child of started) child.kill('SIGKILL');
  });

  async function until(condition: () => Promise<boolean>): Promise<void> {
    for (let round = 0; round < 150; round += 1) {
      if (await condition().catch(() => false)) return;
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
    throw new Error('it did not come up');
  }

  it.each([
    ['a live key', { STRIPE_SECRET_KEY: 'sk_live_x', PAYMENT_FAKE_PORT: '18150', STRIPE_WEBHOOK_SECRET: 'whsec_x' }, 'is a live key'],
    ['no port', { STRIPE_WEBHOOK_SECRET: 'whsec_x' }, 'PAYMENT_FAKE_PORT'],
    ['no secret', { PAYMENT_FAKE_PORT: '18150' }, 'STRIPE_WEBHOOK_SECRET'],
  ])('refuses to start with %s, in one line', async (_what, env: Record<string, string>, message) => {
    const { child, output } = start(env);
    const [code] = (await once(child, 'exit')) as [number | null];
    expect(code).toBe(1);
    expect(output()).toContain(message);
    expect(output().trim().split('\n')).toHaveLength(1);
  });

  it('serves the SDK, takes switches over HTTP from this machine only, and stops on SIGTERM', async () => {
    const port = await freePort();
    const url = `http://127.0.0.1:${port}`;
    const { child } = start({ PAYMENT_FAKE_PORT: String(port), STRIPE_WEBHOOK_SECRET: webhookSecret });
    await until(async () => (await fetch(`${url}/health`)).ok);

    const post = (route: string, body: unknown, headers: Record<string, string> = {}): Promise<Response> =>
      fetch(`${url}/_control${route}`, { method: 'POST', headers: { 'content-type': 'application/json', ...headers }, body: JSON.stringify(body) });
    const payments = createPaymentPort({ secretKey: 'sk_test_x', webhookSecret, apiBase: { host: '127.0.0.1', port, protocol: 'http' } });
    const request = deposit({ fake: { control: { nowSeconds: () => Date.now() / 1000 } } } as Parameters<typeof deposit>[0]);
    const { sessionId } = await payments.openDepositPage(request);
    expect(await (await post('/pay', { sessionId, cardNumber: cards.works })).json()).toMatchObject({ kind: 'done' });
    await post('/faults', { kind: 'lost-answer', path: '/capture', times: 1 });
    const { paymentIntentId } = await payments.readSession(sessionId);
    await payments.capture(paymentIntentId ?? '', 3_000, newKey());
    const books: unknown = await (await fetch(`${url}/_control/books`)).json();
    expect(books).toMatchObject([{ currency: 'eur', capturedMinor: 3_000, heldMinor: 0 }]);
    expect((await post('/reset', {}, { origin: 'http://elsewhere.example' })).status).toBe(403);
    expect((await post('/reset', {}, { 'x-forwarded-for': '203.0.113.5' })).status).toBe(403);
    expect((await post('/faults', { kind: 'nonsense' })).status).toBe(400);
    expect((await post('/clock', { advanceSeconds: 'soon' })).status).toBe(400);

    child.kill('SIGTERM');
    const [code] = (await once(child, 'exit')) as [number | null];
    expect(code).toBe(0);
  });
});
