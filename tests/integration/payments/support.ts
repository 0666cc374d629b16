import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';

import Stripe from 'stripe';

import { createPaymentFake } from '@/server/payments/fake';
import type { PaymentFake, PaymentFakeOptions } from '@/server/payments/fake';
import type { OpenDepositPage, PaymentPort } from '@/server/payments/payments.port';
import { createPaymentPort } from '@/server/payments/stripe.adapter';

export const webhookSecret = 'whsec_test_payments';
const secretKey = 'sk_test_payments';

/** Stripe's published test cards, docs.stripe.com/testing. */
export const cards = {
  works: '4242424242424242',
  declined: '4000000000000002',
  insufficientFunds: '4000000000009995',
  expired: '4000000000000069',
  wrongCvc: '4000000000000127',
  asks: '4000002760003184',
  asksUnlessSaved: '4000002500003155',
  refundFails: '4000000000005126',
  refundWaits: '4000000000007726',
  disputed: '4000000000000259',
} as const;

export interface ReceivedNotice {
  id: string;
  type: string;
  rawBody: string;
  signature: string | undefined;
}

export interface Receiver {
  url: string;
  notices: ReceivedNotice[];
  /** What the next notices are answered; 200 when empty. */
  answers: number[];
  close(): Promise<void>;
}

/** A webhook endpoint that writes down what it gets. */
export async function startReceiver(): Promise<Receiver> {
  const notices: ReceivedNotice[] = [];
  const answers: number[] = [];
  const server = createServer((req, res) => {
    const chunks: Buffer[] = [];
    req.on('data', (chunk: Buffer) => chunks.push(chunk));
    req.on('end', () => {
      const rawBody = Buffer.concat(chunks).toString();
      const { id, type } = JSON.parse(rawBody) as { id: string; type: string };
      const signature = req.headers['stripe-signature'];
      notices.push({ id, type, rawBody, signature: typeof signature === 'string' ? signature : undefined });
      res.writeHead(answers.shift() ?? 200).end();
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  return {
    url: `http://127.0.0.1:${port}/webhooks`,
    notices,
    answers,
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  };
}

export interface Service {
  fake: PaymentFake;
  url: string;
  port: PaymentPort;
  /** The official SDK itself, for what the port does not offer. */
  stripe: Stripe;
  stop(): Promise<void>;
}

/** The fake on a free port of this process, with the port's adapter and the SDK pointed at it. */
export async function startService(options: Partial<PaymentFakeOptions> = {}, timeoutMs = 5000): Promise<Service> {
  const fake = createPaymentFake({ webhookSecret, ...options });
  const { url, ...apiBase } = await fake.start();
  return {
    fake,
    url,
    port: createPaymentPort({ secretKey, webhookSecret, apiBase, timeoutMs }),
    stripe: new Stripe(secretKey, { ...apiBase, maxNetworkRetries: 0, telemetry: false }),
    stop: () => fake.stop(),
  };
}

let serial = 0;

/** A key no other test uses. */
export function newKey(): string {
  serial += 1;
  return `test-key-${serial}`;
}

export function deposit(service: Service, change: Partial<OpenDepositPage> = {}): OpenDepositPage {
  return {
    paymentId: 'payment-1',
    schoolId: 'school-1',
    loanId: 'loan-1',
    amountMinor: 12_000,
    currency: 'EUR',
    capture: 'hold',
    description: 'Teaching kit, deposit',
    customerEmail: 'student@portellery.example',
    returnUrl: 'http://127.0.0.1:9/loans/loan-1?session={CHECKOUT_SESSION_ID}',
    cancelUrl: 'http://127.0.0.1:9/loans/loan-1?cancelled=1',
    expiresAt: new Date((service.fake.control.nowSeconds() + 45 * 60) * 1000),
    idempotencyKey: newKey(),
    ...change,
  };
}

/** Opens a page and pays it in one step; answers the payment's id. */
export async function paid(service: Service, change: Partial<OpenDepositPage> = {}, cardNumber: string = cards.works): Promise<string> {
  const { sessionId } = await service.port.openDepositPage(deposit(service, change));
  const outcome = await service.fake.control.pay({ sessionId, cardNumber });
  if (outcome.kind !== 'done') throw new Error(`the page answered ${outcome.kind}`);
  const { paymentIntentId } = await service.port.readSession(sessionId);
  if (paymentIntentId === null) throw new Error('a finished page without a payment');
  return paymentIntentId;
}
