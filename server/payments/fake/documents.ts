import type Stripe from 'stripe';

// Types only: nothing of this file is needed at run time, so a compiled server does not carry it.
import type published from './shapes.json';

type Shapes = (typeof published)['shapes'];
export type ObjectName = keyof Shapes;

/** A link that may be expanded is an id here; expanding is done on the way out. */
type Linked<T> = string extends T ? Exclude<T, object> : T;

/**
 * An object as this fake keeps and answers it: exactly the top-level keys that Stripe publishes for it, each with
 * the SDK's own type. Keys the SDK merely knows of (newer or optional ones) are left out on purpose.
 */
type Published<T, N extends ObjectName> = {
  [K in keyof Shapes[N] & keyof T]-?: Linked<Exclude<T[K], undefined>>;
};

export type SessionDocument = Published<Stripe.Checkout.Session, 'checkout.session'>;
export type IntentDocument = Published<Stripe.PaymentIntent, 'payment_intent'>;
export type ChargeDocument = Published<Stripe.Charge, 'charge'>;
export type RefundDocument = Published<Stripe.Refund, 'refund'>;
export type CustomerDocument = Published<Stripe.Customer, 'customer'>;
export type PaymentMethodDocument = Published<Stripe.PaymentMethod, 'payment_method'>;
export type SetupIntentDocument = Published<Stripe.SetupIntent, 'setup_intent'>;
export type DisputeDocument = Published<Stripe.Dispute, 'dispute'>;
export type BalanceTransactionDocument = Published<Stripe.BalanceTransaction, 'balance_transaction'>;
export type WebhookEndpointDocument = Published<Stripe.WebhookEndpoint, 'webhook_endpoint'>;

export type EventType = Extract<
  Stripe.Event['type'],
  | `charge.${string}`
  | `checkout.session.${'completed' | 'expired'}`
  | `customer.created`
  | `payment_intent.${string}`
  | `payment_method.attached`
  | `refund.${string}`
  | `setup_intent.${string}`
>;

export interface EventDocument extends Omit<Published<Stripe.EventBase, 'event'>, 'data' | 'type'> {
  type: EventType;
  data: { object: SubjectDocument };
}

/** What an event can be about. */
export type SubjectDocument =
  | SessionDocument
  | IntentDocument
  | ChargeDocument
  | RefundDocument
  | CustomerDocument
  | PaymentMethodDocument
  | SetupIntentDocument
  | DisputeDocument;

export interface Documents {
  'checkout.session': SessionDocument;
  payment_intent: IntentDocument;
  charge: ChargeDocument;
  refund: RefundDocument;
  customer: CustomerDocument;
  payment_method: PaymentMethodDocument;
  setup_intent: SetupIntentDocument;
  dispute: DisputeDocument;
  balance_transaction: BalanceTransactionDocument;
  event: EventDocument;
  webhook_endpoint: WebhookEndpointDocument;
}
export type AnyDocument = Documents[ObjectName];
