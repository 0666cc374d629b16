import { PaymentRefused, PaymentServiceUnavailable } from '@/server/payments/payments.errors';
import { createPaymentPort } from '@/server/payments/stripe.adapter';

import { deposit, newKey, paid, startService, webhookSecret } from './support';
import type { Service } from './support';

describe('the payment port when the service misbehaves', () => {
  let service: Service;

  beforeAll(async () => {
    service = await startService({}, 400);
  });
  afterAll(() => service.stop());
  beforeEach(() => service.fake.control.reset());

  const captured = (): number => service.fake.control.books()[0]?.capturedMinor ?? 0;

  it('heals one lost answer by itself: the SDK repeats the call and the key makes it one effect', async () => {
    const id = await paid(service);
    service.fake.control.addFault({ kind: 'lost-answer', path: '/capture' });
    expect((await service.port.capture(id, 5_000, newKey())).receivedMinor).toBe(5_000);
    expect(captured()).toBe(5_000);
  });

  it('reports answers lost twice as unavailable, and a retry with the same key has one effect', async () => {
    const id = await paid(service);
    const key = newKey();
    service.fake.control.addFault({ kind: 'lost-answer', path: '/capture', times: 2 });
    await expect(service.port.capture(id, 5_000, key)).rejects.toMatchObject({ name: 'PaymentServiceUnavailable', retryable: true });
    expect(captured()).toBe(5_000);
    expect(await service.port.capture(id, 5_000, key)).toMatchObject({ status: 'charged', receivedMinor: 5_000 });
    expect(captured()).toBe(5_000);
  });

  it('pays back once although the answer was lost, and twice with two keys', async () => {
    const id = await paid(service, { capture: 'charge' });
    const key = newKey();
    service.fake.control.addFault({ kind: 'lost-answer', path: '/refunds', times: 2 });
    const request = { paymentIntentId: id, amountMinor: 4_000, key };
    await expect(service.port.refund(request)).rejects.toThrow(PaymentServiceUnavailable);
    await service.port.refund(request);
    expect((await service.port.readPayment(id)).refundedMinor).toBe(4_000);
    await service.port.refund({ ...request, key: newKey() });
    expect((await service.port.readPayment(id)).refundedMinor).toBe(8_000);
  });

  it('opens one page although the answer was lost', async () => {
    const request = deposit(service);
    service.fake.control.addFault({ kind: 'lost-answer', path: '/checkout/sessions', times: 2 });
    await expect(service.port.openDepositPage(request)).rejects.toThrow(PaymentServiceUnavailable);
    const first = await service.port.openDepositPage(request);
    expect(await service.port.openDepositPage(request)).toEqual(first);
    expect((await service.stripe.checkout.sessions.list()).data).toHaveLength(1);
  });

  it('does nothing when the line drops before the service was reached', async () => {
    const id = await paid(service);
    service.fake.control.addFault({ kind: 'dropped', times: 2 });
    await expect(service.port.capture(id, 5_000, newKey())).rejects.toThrow(PaymentServiceUnavailable);
    expect((await service.port.readPayment(id)).status).toBe('held');
  });

  it('gives up waiting after its time, although the work was done', async () => {
    const id = await paid(service);
    const key = newKey();
    service.fake.control.addFault({ kind: 'delay', path: '/capture', delayMs: 900 });
    await expect(service.port.capture(id, 5_000, key)).rejects.toThrow(PaymentServiceUnavailable);
    expect((await service.port.capture(id, 5_000, key)).receivedMinor).toBe(5_000);
    expect(captured()).toBe(5_000);
  });

  it.each([500, 503, 429, 409])('counts an error %i of the service as unavailable, not as a refusal', async (status) => {
    const id = await paid(service);
    service.fake.control.addFault({ kind: 'error', status });
    await expect(service.port.cancelHold(id, newKey())).rejects.toThrow(PaymentServiceUnavailable);
    expect((await service.port.cancelHold(id, newKey())).status).toBe('cancelled');
  });

  it('stays away for as long as it is told to', async () => {
    service.fake.control.addFault({ kind: 'dropped', times: null });
    for (let call = 0; call < 3; call += 1) await expect(service.port.readPayment('pi_any')).rejects.toThrow(PaymentServiceUnavailable);
    service.fake.control.clearFaults();
    await expect(service.port.readPayment('pi_any')).rejects.toThrow(PaymentRefused);
  });

  it('counts nobody at the address as unavailable', async () => {
    const nobody = createPaymentPort({ secretKey: 'sk_test_x', webhookSecret, apiBase: { host: '127.0.0.1', port: 9, protocol: 'http' } });
    await expect(nobody.readPayment('pi_any')).rejects.toThrow(PaymentServiceUnavailable);
  });

  it('counts wrong credentials as unavailable until an operator puts them right', async () => {
    const { port } = new URL(service.url);
    const apiBase = { host: '127.0.0.1', port: Number(port), protocol: 'http' } as const;
    const stranger = createPaymentPort({ secretKey: 'pk_nonsense', webhookSecret, apiBase });
    await expect(stranger.readPayment('pi_any')).rejects.toMatchObject({ name: 'PaymentServiceUnavailable', code: 'bad_credentials' });
  });

  it('never sends a live key to another server', () => {
    const apiBase = { host: '127.0.0.1', port: 1, protocol: 'http' } as const;
    expect(() => createPaymentPort({ secretKey: 'sk_live_x', webhookSecret, apiBase })).toThrow(/live payment key/);
  });
});

describe('idempotency keys at the fake (docs.stripe.com/api/idempotent_requests)', () => {
  let service: Service;

  beforeAll(async () => {
    service = await startService();
  });
  afterAll(() => service.stop());
  beforeEach(() => service.fake.control.reset());

  it('replays the first answer and says so in a header', async () => {
    const id = await paid(service, { capture: 'charge' });
    const params = { payment_intent: id, amount: 1_000 };
    const first = await service.stripe.refunds.create(params, { idempotencyKey: 'key-a' });
    const second = await service.stripe.refunds.create(params, { idempotencyKey: 'key-a' });
    expect(second.id).toBe(first.id);
    expect(first.lastResponse.headers['idempotent-replayed']).toBeUndefined();
    expect(second.lastResponse.headers['idempotent-replayed']).toBe('true');
    expect((await service.stripe.refunds.list({ payment_intent: id })).data).toHaveLength(1);
  });

  it('refuses a key that belongs to another request', async () => {
    const id = await paid(service, { capture: 'charge' });
    await service.port.refund({ paymentIntentId: id, amountMinor: 1_000, key: 'key-b' });
    await expect(service.port.refund({ paymentIntentId: id, amountMinor: 2_000, key: 'key-b' })).rejects.toMatchObject({
      name: 'PaymentRefused',
      code: 'idempotency_key_reused',
    });
    expect((await service.port.readPayment(id)).refundedMinor).toBe(1_000);
  });

  it('replays a decline under the same key: a new attempt needs a new one', async () => {
    const declined = { amount: 1_000, currency: 'eur', payment_method: 'pm_card_visa_chargeDeclined', confirm: true } as const;
    for (let call = 0; call < 2; call += 1) {
      await expect(service.stripe.paymentIntents.create(declined, { idempotencyKey: 'key-c' })).rejects.toMatchObject({
        type: 'StripeCardError',
        code: 'card_declined',
        decline_code: 'generic_decline',
      });
    }
    expect((await service.stripe.paymentIntents.list()).data).toHaveLength(1);
  });

  it('does not keep a refusal of the request itself: put right, the key works', async () => {
    await expect(service.stripe.refunds.create({ payment_intent: 'pi_missing' }, { idempotencyKey: 'key-d' })).rejects.toMatchObject({ statusCode: 404 });
    const id = await paid(service, { capture: 'charge' });
    await expect(service.stripe.refunds.create({ payment_intent: id }, { idempotencyKey: 'key-d' })).resolves.toMatchObject({ amount: 12_000 });
  });

  it('forgets a key after 24 hours', async () => {
    const id = await paid(service, { capture: 'charge' });
    const request = { paymentIntentId: id, amountMinor: 1_000, key: 'key-e' };
    await service.port.refund(request);
    await service.fake.control.advanceClock(86_400 + 1);
    await service.port.refund(request);
    expect((await service.port.readPayment(id)).refundedMinor).toBe(2_000);
  });

  it('refuses a key of more than 255 characters', async () => {
    const id = await paid(service, { capture: 'charge' });
    await expect(service.port.refund({ paymentIntentId: id, amountMinor: 1_000, key: 'k'.repeat(256) })).rejects.toThrow(PaymentRefused);
    expect((await service.port.readPayment(id)).refundedMinor).toBe(0);
  });

  it('makes one capture of twenty that come at once with one key, and one of twenty with twenty keys', async () => {
    const sameKey = await paid(service);
    const same = await Promise.all(Array.from({ length: 20 }, () => service.port.capture(sameKey, 6_000, 'key-f')));
    expect(same.every((payment) => payment.receivedMinor === 6_000)).toBe(true);
    const otherKeys = await paid(service, { paymentId: 'payment-2' });
    const others = await Promise.allSettled(Array.from({ length: 20 }, () => service.port.capture(otherKeys, 6_000, newKey())));
    expect(others.filter((result) => result.status === 'fulfilled')).toHaveLength(1);
    expect(service.fake.control.books()).toMatchObject([{ heldMinor: 0, capturedMinor: 12_000 }]);
  });

  it('confirms by the published test tokens too, and declines with their codes', async () => {
    const held = await service.stripe.paymentIntents.create({ amount: 2_000, currency: 'eur', capture_method: 'manual', payment_method: 'pm_card_visa', confirm: true });
    expect(held.status).toBe('requires_capture');
    const asks = await service.stripe.paymentIntents.create({ amount: 2_000, currency: 'eur', payment_method: 'pm_card_authenticationRequired', confirm: true });
    expect(asks).toMatchObject({ status: 'requires_action', next_action: { type: 'redirect_to_url' } });
  });
});
