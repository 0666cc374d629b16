import { randomBytes } from 'node:crypto';

import type { AnyDocument, Documents, EventDocument, EventType, ObjectName, SubjectDocument } from './documents';
import { noSuch } from './errors';
import { emptyState } from './state';
import type { State } from './state';

/** The API version the fake's answers and events are rendered in: that of the SDK the project pins. */
export const fakeApiVersion = '2026-10-28.endive';

export interface RequestNote {
  id: string | null;
  idempotency_key: string | null;
}

/** The fake's memory, clock and notices, handed to every operation. Operations are synchronous, so none can interleave. */
export interface Bank {
  state: State;
  /** Where the hosted pages are reached, without a slash at the end. */
  pageBase: string;
  nowS(): number;
  /** Records that something happened and hands the event to the courier. */
  emit(type: EventType, object: SubjectDocument): EventDocument;
  onEvent(listener: (event: EventDocument) => void): void;
  /** What the events that follow were caused by; null when they come from the page or from time. */
  request: RequestNote | null;
  reset(): void;
}

export interface BankOptions {
  state: State;
  pageBase: string;
  wallClockMs: () => number;
}

export function createBank({ state, pageBase, wallClockMs }: BankOptions): Bank {
  const listeners: ((event: EventDocument) => void)[] = [];
  const bank: Bank = {
    state,
    pageBase,
    request: null,
    nowS: () => Math.floor(wallClockMs() / 1000) + bank.state.clockOffsetS,
    onEvent: (listener) => void listeners.push(listener),
    emit(type, object) {
      const event: EventDocument = {
        id: newId('evt'),
        object: 'event',
        api_version: fakeApiVersion,
        created: bank.nowS(),
        // An event shows its object as it was, whatever happens to it later.
        data: { object: shown(bank, object) },
        livemode: false,
        pending_webhooks: 0,
        request: bank.request ?? { id: null, idempotency_key: null },
        type,
      };
      keep(bank, 'event', event);
      for (const listener of listeners) listener(event);
      return event;
    },
    reset() {
      const endpoints = bank.state.documents.webhook_endpoint;
      bank.state = emptyState();
      // Where notices go is configuration, not data.
      bank.state.documents.webhook_endpoint = endpoints;
    },
  };
  return bank;
}

const alphabet = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789';

/** A new id such as `pi_…`; `length` random characters of 62 (24: 142 bits). */
export function newId(prefix: string, length = 24): string {
  let text = '';
  for (const byte of randomBytes(length)) text += alphabet.charAt(byte % alphabet.length);
  return `${prefix}_${text}`;
}

export function keep<N extends ObjectName>(bank: Bank, name: N, document: Documents[N]): Documents[N] {
  const shelf: Record<string, Documents[N]> = bank.state.documents[name];
  shelf[document.id] = document;
  return document;
}

/** @param param the request field that named the object, as Stripe's refusal repeats it */
export function find<N extends ObjectName>(bank: Bank, name: N, id: string, param = 'id'): Documents[N] {
  const shelf: Record<string, Documents[N]> = bank.state.documents[name];
  const found = Object.hasOwn(shelf, id) ? shelf[id] : undefined;
  if (found === undefined) throw noSuch(name, id, param);
  return found;
}

export function all<N extends ObjectName>(bank: Bank, name: N): Documents[N][] {
  return Object.values<Documents[N]>(bank.state.documents[name]);
}

/** A copy as it is answered: objects that an object carries inside it are taken from their own place, never kept twice. */
export function shown<T extends AnyDocument>(bank: Bank, document: T): T {
  const copy = structuredClone(document);
  if (copy.object === 'charge' && copy.refunds !== null) {
    const refunds = all(bank, 'refund').filter((refund) => refund.charge === copy.id);
    copy.refunds.data = structuredClone(refunds.reverse().slice(0, 10));
    copy.refunds.has_more = refunds.length > 10;
  }
  if (copy.object === 'dispute') {
    copy.balance_transactions = structuredClone(all(bank, 'balance_transaction').filter((line) => line.source === copy.id));
  }
  return copy;
}
