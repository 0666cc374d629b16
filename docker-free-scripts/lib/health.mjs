import { setTimeout as pause } from 'node:timers/promises';
import { connect } from 'node:net';
import { PlainError } from './say.mjs';

const askEveryMs = 100;

/** Waits until `url` answers 2xx. @param timeoutMs gives up after this long with the last thing heard */
export async function untilHealthy(url, timeoutMs = 60_000) {
  let heard = 'no answer';
  await until(timeoutMs, async () => {
    const answer = await fetch(url, { signal: AbortSignal.timeout(5_000) }).catch((error) => (heard = error.cause?.code ?? error.message, undefined));
    if (answer && !answer.ok) heard = `${answer.status} ${await answer.text()}`;
    return answer?.ok;
  }, () => `${url} is not healthy after ${timeoutMs / 1000} s (${heard}).`);
}

/** Waits until something on loopback accepts connections on `port`. */
export async function untilListening(port, timeoutMs = 60_000) {
  await until(timeoutMs, () => new Promise((resolve) => {
    const socket = connect(port, '127.0.0.1');
    socket.once('connect', () => { socket.destroy(); resolve(true); });
    socket.once('error', () => resolve(false));
  }), () => `Nothing listens on port ${port} after ${timeoutMs / 1000} s.`);
}

async function until(timeoutMs, isSo, complaint) {
  const deadline = Date.now() + timeoutMs;
  while (!(await isSo())) {
    if (Date.now() > deadline) throw new PlainError(complaint());
    await pause(askEveryMs);
  }
}
