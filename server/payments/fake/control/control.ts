import { fakeApiVersion, find, newId } from '../bank';
import { invalidRequest, noSuch } from '../errors';
import type { Fault } from '../http/faults';
import type { Desk } from '../http/serve';
import { booksOf } from '../money';
import type { Books } from '../money';
import { chargeOf } from '../objects/charges';
import { closeDispute, openDispute } from '../objects/disputes';
import type { DisputeReason } from '../objects/disputes';
import { answerBank, payOnPage } from '../objects/paying';
import type { PageOutcome } from '../objects/paying';
import { failRefund } from '../objects/refunds';
import { letTimePass } from '../time';
import type { Courier, CourierMode, DeliveryRecord } from '../webhooks/courier';
import { send } from '../webhooks/send';
import { signatureHeader } from '../webhooks/sign';

export interface Forgery {
  /** `right` is a good signature over an event that this service never recorded. */
  signature: 'future' | 'none' | 'right' | 'stale' | 'wrong';
  type?: string;
  /** What the event claims to be about. */
  object?: Record<string, unknown>;
  /** Where to; the first endpoint when absent. */
  url?: string;
}

export interface PayRequest {
  sessionId: string;
  cardNumber: string;
  email?: string;
  /** The answer to a card that asks; approves when absent. */
  approve?: boolean;
}

/** The switches for tests and demos. All times are the fake's own. */
export interface FakeControl {
  /** Forgets all objects, faults and modes; the clock is right again. Endpoints stay. */
  reset(): Promise<void>;
  nowSeconds(): number;
  /** Moves the clock on, so that pages close, holds lapse and refunds end. Negative values set it back. */
  advanceClock(seconds: number): Promise<number>;
  addFault(fault: Fault): void;
  clearFaults(): void;
  faults(): Fault[];
  webhooks(change: Partial<CourierMode>): CourierMode;
  releaseWebhooks(): void;
  /** Resolves when all notices are where they should be. */
  webhooksIdle(): Promise<void>;
  deliveries(): readonly DeliveryRecord[];
  /** Sends a made-up notice and answers the receiver's status. */
  forge(forgery: Forgery): Promise<number | null>;
  /** Does what a student does on the page, in one step. */
  pay(request: PayRequest): Promise<PageOutcome>;
  openDispute(target: { chargeId?: string; paymentIntentId?: string; reason?: DisputeReason }): Promise<string>;
  closeDispute(disputeId: string, outcome: 'lost' | 'won'): Promise<void>;
  failRefund(refundId: string): Promise<void>;
  books(): Books[];
}

interface ControlOptions {
  desk: Desk;
  courier: Courier;
  secret: string;
  wallClockMs: () => number;
}

const staleS = 3600;

export function createControl({ desk, courier, secret, wallClockMs }: ControlOptions): FakeControl {
  const { bank, faults } = desk;
  /** Each step first lets time pass, as a request would, and ends on disk. */
  async function step<T>(work: () => T): Promise<T> {
    letTimePass(bank);
    const result = work();
    await desk.save();
    return result;
  }

  return {
    reset: async () => {
      bank.reset();
      faults.clear();
      courier.forget();
      await desk.save();
    },
    nowSeconds: () => bank.nowS(),
    advanceClock: async (seconds) => {
      bank.state.clockOffsetS += seconds;
      return step(() => bank.nowS());
    },
    addFault: (fault) => faults.add(fault),
    clearFaults: () => faults.clear(),
    faults: () => faults.list(),
    webhooks: (change) => courier.setMode(change),
    releaseWebhooks: () => courier.release(),
    webhooksIdle: () => courier.idle(),
    deliveries: () => courier.records(),
    forge: (forgery) => forge(forgery, { desk, courier, secret, wallClockMs }),
    pay: (request) => step(() => payInOneStep(desk, request)),
    openDispute: (target) => step(() => openDispute(bank, chargeToDispute(desk, target), target.reason ?? 'fraudulent').id),
    closeDispute: (disputeId, outcome) => step(() => closeDispute(bank, find(bank, 'dispute', disputeId), outcome)),
    failRefund: (refundId) => step(() => failRefund(bank, find(bank, 'refund', refundId))),
    books: () => booksOf(bank),
  };
}

function payInOneStep({ bank }: Desk, request: PayRequest): PageOutcome {
  const session = find(bank, 'checkout.session', request.sessionId);
  const expYear = new Date(bank.nowS() * 1000).getUTCFullYear() + 2;
  const email = session.customer_email ?? request.email ?? 'student@portellery.example';
  const outcome = payOnPage(bank, session, { number: request.cardNumber, expMonth: 12, expYear, email });
  return outcome.kind === 'asks' ? answerBank(bank, session, request.approve ?? true) : outcome;
}

function chargeToDispute({ bank }: Desk, target: { chargeId?: string; paymentIntentId?: string }) {
  if (target.chargeId !== undefined) return find(bank, 'charge', target.chargeId);
  const intent = find(bank, 'payment_intent', target.paymentIntentId ?? '');
  const charge = chargeOf(bank, intent);
  if (charge === null) throw noSuch('charge', intent.id);
  return charge;
}

async function forge(forgery: Forgery, { desk, secret, wallClockMs }: ControlOptions): Promise<number | null> {
  const url = forgery.url ?? Object.values(desk.bank.state.documents.webhook_endpoint)[0]?.url;
  if (url === undefined) throw invalidRequest('There is no endpoint to send to.');
  const nowS = Math.floor(wallClockMs() / 1000);
  const payload = JSON.stringify({
    id: newId('evt'),
    object: 'event',
    api_version: fakeApiVersion,
    created: nowS,
    data: { object: forgery.object ?? { id: newId('pi'), object: 'payment_intent' } },
    livemode: false,
    pending_webhooks: 1,
    request: { id: null, idempotency_key: null },
    type: forgery.type ?? 'payment_intent.succeeded',
  });
  const headers = {
    none: null,
    right: signatureHeader(payload, secret, nowS),
    wrong: signatureHeader(payload, `${secret}x`, nowS),
    stale: signatureHeader(payload, secret, nowS - staleS),
    future: signatureHeader(payload, secret, nowS + staleS),
  };
  return send(url, payload, headers[forgery.signature]);
}
