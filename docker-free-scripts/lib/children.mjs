import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, openSync, closeSync, readFileSync, renameSync } from 'node:fs';
import path from 'node:path';
import { inRoot, root } from './paths.mjs';

const stopTimeoutMs = 10_000;

/**
 * The processes one script started. Each writes to its own log under `logFolder`, and stands in its own process group, so
 * that a Ctrl-C reaches this script alone and the stop keeps its order.
 */
export function children({ logFolder }) {
  mkdirSync(logFolder, { recursive: true });
  const started = [];
  let stopping = false;
  let reportDeath;
  /** Resolves with the first child that ends although nobody asked it to. */
  const death = new Promise((resolve) => { reportDeath = resolve; });

  const logFile = (name) => path.join(logFolder, `${name}.log`);

  function start(name, args, environment = {}) {
    if (stopping) return undefined;
    if (existsSync(logFile(name))) renameSync(logFile(name), path.join(logFolder, `${name}.previous.log`));
    const log = openSync(logFile(name), 'w', 0o600);
    const child = spawn(process.execPath, ['-r', inRoot('docker-free-scripts', 'exit-with-parent.cjs'), ...args], {
      cwd: root, env: { ...process.env, ...environment }, detached: true, stdio: ['ignore', log, log, 'ipc'],
    });
    closeSync(log);
    const entry = { name, child, expected: false };
    entry.ended = new Promise((resolve) => child.once('exit', (code, signal) => {
      resolve();
      if (!stopping && !entry.expected) reportDeath({ name, reason: signal ? `was ended by ${signal}` : `ended with code ${code}`, lines: tail(logFile(name)) });
    }));
    started.push(entry);
    return child;
  }

  /** Ends one process at once, as a power cut would; for tests of what survives that. */
  async function kill(name) {
    const entry = started.findLast((one) => one.name === name);
    entry.expected = true;
    signalGroup(entry.child, 'SIGKILL');
    await entry.ended;
  }

  /** Asks all to stop, last started first, and ends by force what has not stopped in time. */
  async function stop() {
    stopping = true;
    await Promise.all(started.toReversed().map(async ({ child, ended }) => {
      signalGroup(child, 'SIGTERM');
      const timer = setTimeout(() => signalGroup(child, 'SIGKILL'), stopTimeoutMs);
      await ended;
      clearTimeout(timer);
    }));
  }

  return { start, stop, kill, death, logFile };
}

function signalGroup(child, signal) {
  if (child.exitCode !== null || child.signalCode !== null) return;
  try {
    process.kill(-child.pid, signal);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}

/** The last lines of a log, for telling why a process died. */
export function tail(file, count = 12) {
  return existsSync(file) ? readFileSync(file, 'utf8').trimEnd().split('\n').slice(-count).join('\n') : '';
}
