import type { Bank } from '../bank';
import type { EventDocument, WebhookEndpointDocument } from '../documents';
import type { Delivery } from '../state';
import { Rounds } from './rounds';
import { send } from './send';
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

const gatherMs = 150;
const recordsKept = 1000;

/** Brings every event to every endpoint that wants it, one after another, and again until it is taken. */
export class Courier {
  private readonly stopping = new AbortController();
  private readonly rounds = new Rounds();
  private mode = punctual;
  private brought: DeliveryRecord[] = [];
  private kept: Delivery[] = [];
  private gathered: Delivery[] = [];
  private tail = Promise.resolve();

  constructor(private readonly options: CourierOptions) {
    options.bank.onEvent((event) => {
      this.accept(event);
    });
  }

  setMode(change: Partial<CourierMode>): CourierMode {
    this.mode = { ...this.mode, ...change };
    return this.mode;
  }

  /** Sends what was kept back while paused. */
  release(): void {
    this.setMode({ paused: false });
    const ready = this.kept;
    this.kept = [];
    for (const delivery of ready) this.take(delivery);
  }

  /** Takes up again what an earlier process did not bring. */
  resume(): void {
    for (const delivery of this.options.bank.state.undelivered) this.take(delivery);
  }

  /** Resolves when nothing is under way (retries that wait and paused notices do not count). */
  idle(): Promise<void> {
    return this.rounds.idle();
  }

  records(): readonly DeliveryRecord[] {
    return this.brought;
  }

  forget(): void {
    this.brought = [];
    this.kept = [];
    this.gathered = [];
    this.mode = punctual;
    this.rounds.forget();
  }

  stop(): void {
    this.stopping.abort();
    this.rounds.forget();
  }

  private accept(event: EventDocument): void {
    const { state } = this.options.bank;
    for (const endpoint of Object.values(state.documents.webhook_endpoint)) {
      const wanted = endpoint.enabled_events.includes('*') || endpoint.enabled_events.includes(event.type);
      if (!wanted || endpoint.status !== 'enabled') continue;
      const delivery = { eventId: event.id, endpointId: endpoint.id, attempts: 0 };
      event.pending_webhooks += 1;
      state.undelivered.push(delivery);
      // Not within the operation that caused it, which may have more to do before it is done.
      setImmediate(() => {
        this.take(delivery);
      });
    }
  }

  private take(delivery: Delivery): void {
    if (this.mode.paused) this.kept.push(delivery);
    else if (this.mode.reversed) this.gather(delivery);
    else this.dispatch(delivery);
  }

  private gather(delivery: Delivery): void {
    if (this.gathered.length === 0) {
      const done = this.rounds.begin();
      this.rounds.later(gatherMs, () => {
        const batch = this.gathered.reverse();
        this.gathered = [];
        for (const late of batch) this.dispatch(late);
        done();
      });
    }
    this.gathered.push(delivery);
  }

  private dispatch(delivery: Delivery): void {
    const done = this.rounds.begin();
    const start = (): void => {
      this.tail = this.tail
        .then(() => this.deliver(delivery))
        .catch(this.options.report)
        .finally(done);
    };
    if (this.mode.lateMs > 0) this.rounds.later(this.mode.lateMs, start);
    else start();
  }

  private async deliver(delivery: Delivery): Promise<void> {
    const { documents } = this.options.bank.state;
    const event = documents.event[delivery.eventId];
    const endpoint = documents.webhook_endpoint[delivery.endpointId];
    if (this.stopping.signal.aborted || event === undefined || endpoint === undefined) return;
    if (this.mode.loseNext > 0) {
      this.setMode({ loseNext: this.mode.loseNext - 1 });
      this.drop(delivery);
    } else if (await this.bring(event, endpoint)) {
      event.pending_webhooks -= 1;
      this.drop(delivery);
    } else {
      this.retry(delivery);
    }
    await this.options.save();
  }

  private async bring(event: EventDocument, endpoint: WebhookEndpointDocument): Promise<boolean> {
    const first = await this.post(event, endpoint);
    return this.mode.doubled ? (await this.post(event, endpoint)) || first : first;
  }

  private async post(event: EventDocument, endpoint: WebhookEndpointDocument): Promise<boolean> {
    const payload = JSON.stringify(event);
    const signature = signatureHeader(payload, this.options.secret, Math.floor(this.options.wallClockMs() / 1000));
    const status = await send(endpoint.url, payload, signature, this.stopping.signal);
    this.brought = [...this.brought.slice(1 - recordsKept), { eventId: event.id, type: event.type, status }];
    return status !== null && status >= 200 && status < 300;
  }

  private retry(delivery: Delivery): void {
    // While stopping nothing counts as a try: the next process takes it up as it was.
    if (this.stopping.signal.aborted) return;
    const delayMs = this.options.retryDelaysMs[delivery.attempts];
    delivery.attempts += 1;
    if (delayMs === undefined) this.drop(delivery);
    else {
      this.rounds.later(delayMs, () => {
        this.take(delivery);
      });
    }
  }

  private drop(delivery: Delivery): void {
    const { state } = this.options.bank;
    state.undelivered = state.undelivered.filter((other) => other !== delivery);
  }
}
