import { fork, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { cp, mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { testCluster } from '../cluster';
import { createTestDatabase, type TestDatabase } from '../database';

export type ProcessName = 'server' | 'worker' | 'payment-fake' | 'inbox';

export interface StackOptions {
  /** Whether the web app is exported and served; a test of the API alone starts faster without. Default true. */
  web?: boolean;
  /** Variables for the stack's processes, over the usual ones. */
  environment?: Record<string, string>;
}

/** The whole product, running for one test file on free ports: server, worker, payment fake and mail inbox on a seeded database. */
export interface Stack {
  /** The web app's address. */
  url: string;
  inboxUrl: string;
  paymentFakeUrl: string;
  environment: Record<string, string>;
  database: TestDatabase;
  /** Ends a process at once, as a power cut would. */
  kill(name: ProcessName): Promise<void>;
  /** Starts a killed process again and waits until the stack is healthy. */
  start(name: ProcessName): Promise<void>;
  /** Kills the server in the middle of whatever it does, and starts it again. */
  restartServer(): Promise<void>;
  /** What a process has written so far; for saying more when a test fails. */
  log(name: ProcessName): Promise<string>;
  /** Stops everything and drops the database. */
  stop(): Promise<void>;
}

const script = path.join(__dirname, '..', '..', '..', 'docker-free-scripts', 'test-stack.mjs');

/** Starts a stack of its own (about 5 s; half a minute more when the web app has changed). Call `stop()` in afterAll. */
export async function startStack({ web = true, environment: extra = {} }: StackOptions = {}): Promise<Stack> {
  const database = await createTestDatabase('seeded');
  const { port, passwords, seededFiles } = testCluster('seeded');
  const folder = await mkdtemp(path.join(tmpdir(), 'trayward-stack-'));
  if (seededFiles) await cp(seededFiles, path.join(folder, 'files'), { recursive: true });

  const settings = { folder, database: database.name, postgresPort: port, passwords, web, extra };
  const child = fork(script, [JSON.stringify(settings)], { stdio: ['ignore', 'inherit', 'inherit', 'ipc'] });
  const ended = once(child, 'exit');
  const tell = commandChannel(child);
  const stop = async (): Promise<void> => {
    if (child.connected) child.disconnect();
    await ended;
    await database.drop();
    await rm(folder, { recursive: true, force: true });
  };

  const environment = await firstAnswer(child).catch(async (error: unknown) => {
    await stop();
    throw error;
  });
  const url = (name: string): string => `http://127.0.0.1:${environment[name] ?? ''}`;
  return {
    url: environment.PUBLIC_URL ?? '',
    inboxUrl: url('INBOX_PORT'),
    paymentFakeUrl: url('PAYMENT_FAKE_PORT'),
    environment,
    database,
    kill: (name) => tell({ kill: name }),
    start: (name) => tell({ start: name }),
    restartServer: () => tell({ kill: 'server', start: 'server' }),
    log: (name) => readFile(path.join(folder, 'logs', `${name}.log`), 'utf8'),
    stop,
  };
}

interface Answer {
  id?: number;
  environment?: Record<string, string>;
  error?: string;
}

function firstAnswer(child: ChildProcess): Promise<Record<string, string>> {
  return new Promise((resolve, reject) => {
    child.once('message', ({ environment, error }: Answer) => {
      if (environment) resolve(environment);
      else reject(new Error(error ?? 'The stack did not start.'));
    });
    child.once('exit', (code) => { reject(new Error(`The stack ended with code ${code ?? 'none'} while starting.`)); });
  });
}

/** Sends commands and matches the answers to them by number. */
function commandChannel(child: ChildProcess): (command: { kill?: ProcessName; start?: ProcessName }) => Promise<void> {
  let sent = 0;
  const waiting = new Map<number, (error?: string) => void>();
  child.on('message', ({ id, error }: Answer) => {
    if (id !== undefined) waiting.get(id)?.(error);
  });
  return (command) =>
    new Promise((resolve, reject) => {
      sent += 1;
      waiting.set(sent, (error) => { if (error) reject(new Error(error)); else resolve(); });
      child.send({ id: sent, ...command });
    });
}
