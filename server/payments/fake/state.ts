import type { Documents, ObjectName } from './documents';

/** What the fake must remember of a page beyond the published object. */
export interface SessionNote {
  item: { name: string; description: string | null; quantity: number };
  captureMethod: 'automatic' | 'manual';
  description: string | null;
  intentMetadata: Record<string, string>;
  setupFutureUsage: 'off_session' | 'on_session' | null;
  receiptEmail: string | null;
  /** Shown once above the form: why the last try did not work. */
  notice: string | null;
  /** The payment method that waits for "approve or refuse". */
  awaiting: string | null;
}

/** Something that happens by itself later: a refund that fails or goes through after a while. */
export interface Scheduled {
  atS: number;
  what: 'refund-fails' | 'refund-succeeds';
  id: string;
}

export interface StoredAnswer {
  requestHash: string;
  status: number;
  body: unknown;
  storedAtS: number;
}

export interface Delivery {
  eventId: string;
  endpointId: string;
  attempts: number;
}

/** All the fake knows, as plain JSON, so that it can be written to a file as it stands. */
export interface State {
  version: 1;
  clockOffsetS: number;
  documents: { [N in ObjectName]: Record<string, Documents[N]> };
  sessionNotes: Record<string, SessionNote>;
  /** Which test card a payment method was made from: the key of a behaviour in `cards.ts`. */
  methodCards: Record<string, string>;
  scheduled: Scheduled[];
  idempotency: Record<string, StoredAnswer>;
  undelivered: Delivery[];
}

export function emptyState(): State {
  return {
    version: 1,
    clockOffsetS: 0,
    documents: {
      'checkout.session': {},
      payment_intent: {},
      charge: {},
      refund: {},
      customer: {},
      payment_method: {},
      setup_intent: {},
      dispute: {},
      balance_transaction: {},
      event: {},
      webhook_endpoint: {},
    },
    sessionNotes: {},
    methodCards: {},
    scheduled: [],
    idempotency: {},
    undelivered: [],
  };
}
