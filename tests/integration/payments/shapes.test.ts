import published from '@/server/payments/fake/shapes.json';

import { nullableKeys } from './sdkTypes';
import { cards, deposit, newKey, paid, startReceiver, startService } from './support';
import type { Receiver, Service } from './support';

const shapes: Readonly<Record<string, Readonly<Record<string, string>>>> = published.shapes;

type Found = Record<string, unknown> & { object: string };

/** Every object of a published kind inside an answer, however deep. */
function objectsIn(value: unknown, found: Found[] = []): Found[] {
  if (Array.isArray(value)) for (const item of value) objectsIn(item, found);
  else if (typeof value === 'object' && value !== null) {
    if ('object' in value && typeof value.object === 'string' && value.object in shapes) found.push(value as Found);
    for (const inner of Object.values(value)) objectsIn(inner, found);
  }
  return found;
}

function kindOf(value: unknown): string {
  if (Array.isArray(value)) return 'array';
  return Number.isInteger(value) ? 'integer' : typeof value;
}

describe('the objects the fake answers', () => {
  let service: Service;
  let receiver: Receiver;
  const seen = new Map<string, Found[]>();

  /** Brings every object through every state it can be in, and collects all answers and all events. */
  beforeAll(async () => {
    receiver = await startReceiver();
    service = await startService({ webhookUrl: receiver.url });
    const { stripe, port, fake } = service;
    const held = await paid(service);
    await port.capture(await paid(service), 4_000, newKey());
    await port.cancelHold(await paid(service), newKey());
    for (const card of [cards.refundFails, cards.refundWaits]) {
      const charged = await paid(service, { capture: 'charge' }, card);
      await port.refund({ paymentIntentId: charged, amountMinor: 5_000, key: newKey(), metadata: { reason: 'kit-returned' } });
    }
    await paid(service, { capture: 'charge' }, cards.disputed);
    const open = await port.openDepositPage(deposit(service));
    await fake.control.pay({ sessionId: open.sessionId, cardNumber: cards.declined });
    const refused = await port.openDepositPage(deposit(service));
    await fake.control.pay({ sessionId: refused.sessionId, cardNumber: cards.asks, approve: false });
    await port.expireSession((await port.openDepositPage(deposit(service))).sessionId, newKey());
    const customer = await stripe.customers.create({ email: 'student@portellery.example', metadata: { a: 'b' } });
    await stripe.setupIntents.create({ customer: customer.id, payment_method: 'pm_card_visa', confirm: true });
    await stripe.setupIntents.create({ payment_method: 'pm_card_authenticationRequired', confirm: true });
    await stripe.setupIntents.create({ payment_method: 'pm_card_visa_chargeDeclined', confirm: true }).catch(() => undefined);
    await stripe.paymentIntents.create({ amount: 900, currency: 'eur' });
    await stripe.paymentIntents.retrieve(held);
    await fake.control.advanceClock(8 * 86_400);
    await collect();
  });
  afterAll(async () => {
    await service.stop();
    await receiver.close();
  });

  async function collect(): Promise<void> {
    const lists = [
      'checkout/sessions', 'payment_intents', 'charges', 'refunds', 'customers', 'payment_methods',
      'setup_intents', 'disputes', 'balance_transactions', 'events', 'webhook_endpoints',
    ];
    for (const path of lists) {
      const answer = await fetch(`${service.url}/v1/${path}?limit=100`, { headers: { authorization: 'Bearer sk_test_shapes' } });
      for (const found of objectsIn(await answer.json())) seen.set(found.object, [...(seen.get(found.object) ?? []), found]);
    }
  }

  const names = Object.keys(shapes);

  it.each(names)('have exactly the published top-level keys: %s (github.com/stripe/openapi fixtures, 2026-08-21)', (name) => {
    const found = seen.get(name) ?? [];
    expect(found.length).toBeGreaterThan(0);
    const keys = Object.keys(shapes[name] ?? {}).sort();
    for (const object of found) expect(Object.keys(object).sort()).toEqual(keys);
  });

  it.each(names)('have values of the published kinds, and null only where the fixtures or the SDK’s types allow it: %s', (name) => {
    const nullable = nullableKeys(name);
    for (const object of seen.get(name) ?? []) {
      for (const [key, kind] of Object.entries(shapes[name] ?? {})) {
        const value = object[key];
        if (value === null) expect([key, kind === 'null' || nullable.has(key)]).toEqual([key, true]);
        else if (kind !== 'null') expect([key, kindOf(value)]).toEqual([key, kind]);
      }
    }
  });

  it('name linked objects by their ids, as text', () => {
    for (const intent of seen.get('payment_intent') ?? []) {
      for (const key of ['customer', 'latest_charge', 'payment_method']) expect(['string', 'object']).toContain(intent[key] === null ? 'object' : typeof intent[key]);
    }
    const charges = (seen.get('charge') ?? []).filter((charge) => charge.balance_transaction !== null);
    expect(charges.length).toBeGreaterThan(0);
    for (const charge of charges) expect(charge.balance_transaction).toMatch(/^txn_/);
  });

  it('never tell that they are live', () => {
    for (const found of [...seen.values()].flat()) if ('livemode' in found) expect(found.livemode).toBe(false);
  });

  it('never carry a card number', () => {
    const all = JSON.stringify([...seen.values()]);
    for (const number of Object.values(cards)) expect(all).not.toContain(number);
  });
});
