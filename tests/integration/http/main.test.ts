import { spawn, type ChildProcessWithoutNullStreams } from 'node:child_process';
import { once } from 'node:events';
import { createServer, type AddressInfo } from 'node:net';
import path from 'node:path';
import { createTestDatabase, type TestDatabase } from '@/tests/support/database';

const root = path.resolve(__dirname, '..', '..', '..');
let database: TestDatabase;
const started: ChildProcessWithoutNullStreams[] = [];

beforeAll(async () => { database = await createTestDatabase(); });
afterAll(async () => {
  for (const child of started) child.kill('SIGKILL');
  await database.drop();
});

/** Below the range from which the system deals out ports, so that no other test's short-lived server can have it. */
const port = 18_400 + (process.pid % 100);

function start(environment: Record<string, string>): { child: ChildProcessWithoutNullStreams; said: () => string } {
  const child = spawn(process.execPath, ['-r', './docker-free-scripts/register.cjs', 'server/main.ts'], { cwd: root, env: { NODE_ENV: 'test', PATH: process.env['PATH'] ?? '', ...environment } });
  started.push(child);
  let text = '';
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (chunk: Buffer) => { text += chunk.toString(); });
  return { child, said: () => text };
}

function environment(port: number): Record<string, string> {
  return {
    TRAYWARD_MODE: 'test', PORT: String(port), HOST: '127.0.0.1', ACCESS_TOKEN_SECRET: 'test secret of at least thirty-two characters',
    STRIPE_SECRET_KEY: 'sk_test_of_the_tests', STRIPE_WEBHOOK_SECRET: 'whsec_of_the_tests', STRIPE_API_BASE: 'http://127.0.0.1:1', SMTP_URL: 'smtp://127.0.0.1:1', ...database.environment,
  };
}

async function untilHealthy(port: number, said: () => string): Promise<void> {
  for (let tries = 0; tries < 200; tries += 1) {
    const status = await fetch(`http://127.0.0.1:${port}/api/v1/health`).then((answer) => answer.status, () => 0);
    if (status === 200) return;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error(`The server did not become healthy: ${said()}`);
}

describe('the server process', () => {
  it('serves until SIGTERM and then ends in order', async () => {
    const { child, said } = start(environment(port));
    await untilHealthy(port, said);
    child.kill('SIGTERM');
    const [code] = (await once(child, 'exit')) as [number | null];
    expect(code).toBe(0);
    expect(said()).toContain('server stopped');
  });

  it('names every missing variable and does not start', async () => {
    const { child, said } = start({});
    const [code] = (await once(child, 'exit')) as [number | null];
    expect(code).toBe(1);
    expect(said()).toMatch(/PUBLIC_URL is required[\s\S]*ACCESS_TOKEN_SECRET is required/);
    expect(said()).not.toContain('    at ');
  });

  it('says so when the port is taken', async () => {
    const taken = createServer().listen(0, '127.0.0.1');
    await once(taken, 'listening');
    const { child, said } = start(environment((taken.address() as AddressInfo).port));
    const [code] = (await once(child, 'exit')) as [number | null];
    taken.close();
    expect(code).toBe(1);
    expect(said()).toContain('EADDRINUSE');
  });
});
