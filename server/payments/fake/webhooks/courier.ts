import type { Bank } from '../bank';
import type { EventDocument, WebhookEndpointDocument } from '../documents';
import type { Delivery } from '../state';
import { signatureHeader } from './sign';

/** How notices misbehave; all off by default. */
export interface CourierMode {
  /** Kept back until released. */
  paused: boolean;
  /** Every notice is sent twice. */
  doubled: boolean;
  /** Each notice leaves this much later, ms. */
  lateMs: number;
  /** Notices gather for a moment and leave newest first. */
  reversed: boolean;
  /** So many of the next notices are never sent, and not retried. */
  loseNext: number;
}

export const punctual: CourierMode = { paused: false, doubled: false, lateMs: 0, reversed: false, loseNext: 0 };

export interface DeliveryRecord {
  eventId: string;
  type: string;
  /** HTTP status of the receiver, or null when there was no answer. */
  status: number | null;
}

export interface CourierOptions {
  bank: Bank;
  secret: string;
  wallClockMs: () => number;
  /** Pauses between tries of one notice; after the last it is given up. */
  retryDelaysMs: readonly number[];
  save: () => Promise<void>;
  /** Told when a delivery could not be recorded. */
  report: (error: unknown) => void;
}

export interface Courier {
  setMode(change: Partial<CourierMode>): CourierMode;
  mode(): CourierMode;
  /** Sends what was kept back while paused. */
  release(): void;
  /** Takes up again what an earlier process did not bring. */
  resume(): void;
  /** Resolves when nothing is under way (retries that wait and paused notices do not count). */
  idle(): Promise<void>;
  records(): readonly DeliveryRecord[];
  forget(): void;
  stop(): void;
}

const gatherMs = 150;
const answerWithinMs = 10_000;
const recordsKept = 1000;

/** Brings every event to every endpoint that wants it, one after another, and again until it is taken. */
export function createCourier(options: CourierOptions): Courier {
  const { bank } = options;
  const stopping = new AbortController();
  const timers = new Set<NodeJS.Timeout>();
  let mode = punctual;
  let records: DeliveryRecord[] = [];
  let kept: Delivery[] = [];
  let gathered: Delivery[] = [];
  let underWay = 0;
  let generation = 0;
  let waiting: (() => void)[] = [];
  let tail = Promise.resolve();

  function later(ms: number, work: () => void): void {
    const timer = setTimeout(() => {
      timers.delete(timer);
      work();
    }, ms);
    timers.add(timer);
  }

  /** Marks something as under way; the answer ends it. What was forgotten meanwhile no longer counts. */
  function begin(): () => void {
    const mine = generation;
    underWay += 1;
    return () => {
      if (mine !== generation) return;
      underWay -= 1;
      if (underWay === 0) wake();
    };
  }

  function wake(): void {
    for (const resolve of waiting) resolve();
    waiting = [];
  }

  function stopTimers(): void {
    for (const timer of timers) clearTimeout(timer);
    timers.clear();
    generation += 1;
    underWay = 0;
    wake();
  }

  function dispatch(delivery: Delivery): void {
    const done = begin();
    const start = (): void => {
      tail = tail
        .then(() => deliver(delivery))
        .catch(options.report)
        .finally(done);
    };
    if (mode.lateMs > 0) later(mode.lateMs, start);
    else start();
  }

  function take(delivery: Delivery): void {
    if (mode.paused) kept.push(delivery);
    else if (mode.reversed) gather(delivery);
    else dispatch(delivery);
  }

  function gather(delivery: Delivery): void {
    if (gathered.length === 0) {
      const done = begin();
      later(gatherMs, () => {
        const batch = gathered.reverse();
        gathered = [];
        for (const late of batch) dispatch(late);
        done();
      });
    }
    gathered.push(delivery);
  }

  async function deliver(delivery: Delivery): Promise<void> {
    const event = bank.state.documents.event[delivery.eventId];
    const endpoint = bank.state.documents.webhook_endpoint[delivery.endpointId];
    if (stopping.signal.aborted || event === undefined || endpoint === undefined) return;
    if (mode.loseNext > 0) {
      mode = { ...mode, loseNext: mode.loseNext - 1 };
      drop(delivery);
    } else if (await bring(event, endpoint)) {
      event.pending_webhooks -= 1;
      drop(delivery);
    } else {
      retry(delivery);
    }
    await options.save();
  }

  async function bring(event: EventDocument, endpoint: WebhookEndpointDocument): Promise<boolean> {
    const first = await post(event, endpoint);
    return mode.doubled ? (await post(event, endpoint)) || first : first;
  }

  async function post(event: EventDocument, endpoint: WebhookEndpointDocument): Promise<boolean> {
    const payload = JSON.stringify(event);
    const status = await send(endpoint.url, payload, signatureHeader(payload, options.secret, Math.floor(options.wallClockMs() / 1000)), stopping.signal);
    records = [...records.slice(1 - recordsKept), { eventId: event.id, type: event.type, status }];
    return status !== null && status >= 200 && status < 300;
  }

  function retry(delivery: Delivery): void {
    const delayMs = options.retryDelaysMs[delivery.attempts];
    delivery.attempts += 1;
    if (delayMs === undefined) drop(delivery);
    else later(delayMs, () => take(delivery));
  }

  function drop(delivery: Delivery): void {
    bank.state.undelivered = bank.state.undelivered.filter((other) => other !== delivery);
  }

  bank.onEvent((event) => {
    for (const endpoint of Object.values(bank.state.documents.webhook_endpoint)) {
      const wanted = endpoint.enabled_events.includes('*') || endpoint.enabled_events.includes(event.type);
      if (!wanted || endpoint.status !== 'enabled') continue;
      const delivery = { eventId: event.id, endpointId: endpoint.id, attempts: 0 };
      event.pending_webhooks += 1;
      bank.state.undelivered.push(delivery);
      // Not within the operation that caused it: the event must leave as it ends up, and never before the answer is ready.
      setImmediate(() => take(delivery));
    }
  });

  return {
    setMode(change) {
      mode = { ...mode, ...change };
      return mode;
    },
    mode: () => mode,
    release() {
      mode = { ...mode, paused: false };
      const ready = kept;
      kept = [];
      for (const delivery of ready) take(delivery);
    },
    resume() {
      for (const delivery of bank.state.undelivered) take(delivery);
    },
    async idle() {
      // One turn, so that events emitted just now are counted.
      await new Promise((resolve) => setImmediate(resolve));
      if (underWay > 0) await new Promise<void>((resolve) => waiting.push(resolve));
    },
    records: () => records,
    forget() {
      records = [];
      kept = [];
      gathered = [];
      mode = punctual;
      stopTimers();
    },
    stop() {
      stopping.abort();
      stopTimers();
    },
  };
}

/** @returns the receiver's status, or null when it gave none */
export async function send(url: string, payload: string, signature: string | null, signal?: AbortSignal): Promise<number | null> {
  const timeout = AbortSignal.timeout(answerWithinMs);
  try {
    const response = await fetch(url, {
      method: 'POST',
      headers: { 'content-type': 'application/json; charset=utf-8', ...(signature === null ? {} : { 'stripe-signature': signature }) },
      body: payload,
      redirect: 'manual',
      signal: signal === undefined ? timeout : AbortSignal.any([timeout, signal]),
    });
    await response.arrayBuffer();
    return response.status;
  } catch {
    return null; // not reachable, too slow, or we are stopping: tried again later
  }
}
