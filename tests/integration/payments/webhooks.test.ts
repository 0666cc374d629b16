import Stripe from 'stripe';

import { PaymentServiceUnavailable, WebhookRefused } from '@/server/payments/payments.errors';
import type { PaymentNotice } from '@/server/payments/payments.port';

import { cards, deposit, newKey, paid, startReceiver, startService, webhookSecret } from './support';
import type { ReceivedNotice, Receiver, Service } from './support';

describe('notices of the fake, read by the port', () => {
  let service: Service;
  let receiver: Receiver;

  beforeAll(async () => {
    receiver = await startReceiver();
    service = await startService({ webhookUrl: receiver.url, retryDelaysMs: [20, 40, 60] });
  });
  afterAll(async () => {
    await service.stop();
    await receiver.close();
  });
  beforeEach(async () => {
    await service.fake.control.reset();
    receiver.notices.length = 0;
    receiver.answers.length = 0;
  });

  const read = (notice: ReceivedNotice): PaymentNotice => service.port.parseWebhook(Buffer.from(notice.rawBody), notice.signature);
  const types = (): string[] => receiver.notices.map((notice) => notice.type);
  const settled = (): Promise<void> => service.fake.control.webhooksIdle();

  async function until(condition: () => boolean): Promise<void> {
    for (let round = 0; round < 200 && !condition(); round += 1) await new Promise((resolve) => setTimeout(resolve, 10));
    expect(condition()).toBe(true);
  }

  describe('what is told', () => {
    it('tells a hold, its session and its capture, each naming the payment', async () => {
      const id = await paid(service);
      await service.port.capture(id, 5_000, newKey());
      await settled();
      expect(types()).toEqual([
        'payment_intent.created',
        'charge.succeeded',
        'payment_intent.amount_capturable_updated',
        'checkout.session.completed',
        'charge.captured',
        'payment_intent.succeeded',
        'charge.refunded',
      ]);
      const notices = receiver.notices.map(read);
      expect(new Set(notices.map((notice) => notice.paymentIntentId))).toEqual(new Set([id]));
      expect(notices.map((notice) => notice.objectKind)).toEqual(['payment', 'charge', 'payment', 'session', 'charge', 'payment', 'charge']);
    });

    it('tells a released hold', async () => {
      const id = await paid(service);
      await service.port.cancelHold(id, newKey());
      await settled();
      expect(types().slice(-2)).toEqual(['charge.refunded', 'payment_intent.canceled']);
    });

    it('tells a hold that lapsed', async () => {
      await paid(service);
      await service.fake.control.advanceClock(7 * 86_400 + 1);
      await settled();
      expect(types().slice(-3)).toEqual(['charge.expired', 'charge.refunded', 'payment_intent.canceled']);
    });

    it('tells a decline and a page that closed', async () => {
      const { sessionId } = await service.port.openDepositPage(deposit(service));
      await service.fake.control.pay({ sessionId, cardNumber: cards.declined });
      await service.port.expireSession(sessionId, newKey());
      await settled();
      expect(types()).toEqual(['payment_intent.created', 'charge.failed', 'payment_intent.payment_failed', 'payment_intent.canceled', 'checkout.session.expired']);
    });

    it('tells a refund and that it failed later', async () => {
      const id = await paid(service, { capture: 'charge' }, cards.refundFails);
      await settled();
      receiver.notices.length = 0;
      const { refundId } = await service.port.refund({ paymentIntentId: id, amountMinor: 1_000, key: newKey() });
      await service.fake.control.advanceClock(120);
      await settled();
      expect(types()).toEqual(expect.arrayContaining(['refund.created', 'charge.refunded', 'refund.failed', 'refund.updated']));
      const failed = receiver.notices.find((notice) => notice.type === 'refund.failed');
      expect(failed && read(failed)).toMatchObject({ objectKind: 'refund', objectId: refundId, paymentIntentId: id });
    });

    it('tells a dispute that is opened and closed', async () => {
      const id = await paid(service, { capture: 'charge' });
      await settled();
      receiver.notices.length = 0;
      const disputeId = await service.fake.control.openDispute({ paymentIntentId: id });
      await service.fake.control.closeDispute(disputeId, 'won');
      await settled();
      expect(types()).toEqual(['charge.dispute.created', 'charge.dispute.funds_withdrawn', 'charge.dispute.funds_reinstated', 'charge.dispute.closed']);
      const [created] = receiver.notices;
      expect(created && read(created)).toMatchObject({ objectKind: 'dispute', objectId: disputeId, paymentIntentId: id });
    });

    it('shows the object as it was when it happened, whatever happened since', async () => {
      service.fake.control.webhooks({ paused: true });
      const id = await paid(service);
      await service.port.capture(id, 5_000, newKey());
      service.fake.control.releaseWebhooks();
      await settled();
      const held = receiver.notices.find((notice) => notice.type === 'payment_intent.amount_capturable_updated');
      const event = JSON.parse(held?.rawBody ?? '{}') as { data: { object: Stripe.PaymentIntent } };
      expect(event.data.object.status).toBe('requires_capture');
      expect((await service.port.readPayment(id)).status).toBe('charged');
    });
  });

  describe('signatures', () => {
    /** Signed by the SDK's own helper, which shares no code with the fake. */
    const signedBySdk = (payload: string, timestamp: number, secret = webhookSecret): string =>
      Stripe.webhooks.generateTestHeaderString({ payload, secret, timestamp });
    const payload = JSON.stringify({ id: 'evt_1', object: 'event', type: 'payment_intent.succeeded', created: 1, data: { object: { id: 'pi_1', object: 'payment_intent' } } });
    const nowS = (): number => Math.floor(Date.now() / 1000);

    it('takes what the service signed', async () => {
      await paid(service);
      await settled();
      expect(receiver.notices.length).toBeGreaterThan(0);
      for (const notice of receiver.notices) expect(read(notice).id).toBe(notice.id);
    });

    it('takes what the SDK’s own helper signed', () => {
      expect(service.port.parseWebhook(payload, signedBySdk(payload, nowS()))).toEqual({
        id: 'evt_1',
        type: 'payment_intent.succeeded',
        objectKind: 'payment',
        objectId: 'pi_1',
        paymentIntentId: 'pi_1',
        createdAt: new Date(1000),
      });
    });

    it('refuses a signature of 301 seconds ago and takes one of 299 (the SDK’s tolerance is 300)', () => {
      expect(() => service.port.parseWebhook(payload, signedBySdk(payload, nowS() - 301))).toThrow(WebhookRefused);
      expect(service.port.parseWebhook(payload, signedBySdk(payload, nowS() - 299)).id).toBe('evt_1');
    });

    it('takes a signature from the future: only our own clock can be slow', () => {
      expect(service.port.parseWebhook(payload, signedBySdk(payload, nowS() + 3600)).id).toBe('evt_1');
    });

    it('measures the signature’s age, not the event’s', () => {
      const old = payload.replace('"created":1', '"created":1000000000');
      expect(service.port.parseWebhook(old, signedBySdk(old, nowS())).createdAt).toEqual(new Date(1_000_000_000_000));
    });

    it.each([
      ['another secret', () => signedBySdk(payload, nowS(), 'whsec_other')],
      ['no signature', () => undefined],
      ['an empty signature', () => ''],
      ['nonsense', () => 't=now,v1=zz'],
      ['another scheme only', () => signedBySdk(payload, nowS()).replace('v1=', 'v0=')],
    ])('refuses %s', (_what, header) => {
      expect(() => service.port.parseWebhook(payload, header())).toThrow(WebhookRefused);
    });

    it('refuses a body changed by one character', () => {
      expect(() => service.port.parseWebhook(payload.replace('pi_1', 'pi_2'), signedBySdk(payload, nowS()))).toThrow(WebhookRefused);
    });

    it.each(['', 'not json', '[]', 'null', '{}', '{"id":"evt_1","type":"x","created":1,"data":{}}'])('refuses a well-signed body that is no event: %s', (body) => {
      expect(() => service.port.parseWebhook(body, signedBySdk(body, nowS()))).toThrow(WebhookRefused);
    });

    it('sends forgeries on request, and only the sound ones pass', async () => {
      for (const [signature, passes] of [['right', true], ['future', true], ['wrong', false], ['stale', false], ['none', false]] as const) {
        receiver.notices.length = 0;
        expect(await service.fake.control.forge({ signature })).toBe(200);
        const [notice] = receiver.notices;
        if (notice === undefined) throw new Error('nothing came');
        if (passes) expect(read(notice).objectKind).toBe('payment');
        else expect(() => read(notice)).toThrow(WebhookRefused);
      }
    });
  });

  describe('faults', () => {
    it('sends each notice twice when told to, under one id', async () => {
      service.fake.control.webhooks({ doubled: true });
      await paid(service);
      await settled();
      const ids = receiver.notices.map((notice) => notice.id);
      expect(ids).toHaveLength(2 * new Set(ids).size);
    });

    it('brings notices newest first when told to', async () => {
      service.fake.control.webhooks({ reversed: true });
      await paid(service);
      await settled();
      expect(types()).toEqual(['checkout.session.completed', 'payment_intent.amount_capturable_updated', 'charge.succeeded', 'payment_intent.created']);
    });

    it('keeps notices back until released', async () => {
      service.fake.control.webhooks({ paused: true });
      await paid(service);
      await settled();
      expect(types()).toEqual([]);
      service.fake.control.releaseWebhooks();
      await settled();
      expect(types()).toHaveLength(4);
    });

    it('brings notices late', async () => {
      service.fake.control.webhooks({ lateMs: 120 });
      const before = Date.now();
      await paid(service);
      await settled();
      expect(types()).toHaveLength(4);
      expect(Date.now() - before).toBeGreaterThanOrEqual(115);
    });

    it('loses notices for good, yet still lists their events', async () => {
      service.fake.control.webhooks({ loseNext: 4 });
      await paid(service);
      await settled();
      expect(types()).toEqual([]);
      expect((await service.stripe.events.list({ delivery_success: false })).data).toHaveLength(4);
    });

    it('tries again until the receiver takes it', async () => {
      receiver.answers.push(500, 503);
      await paid(service);
      await until(() => new Set(types()).size === 4 && receiver.notices.length === 6);
      await settled();
      expect((await service.stripe.events.list({ delivery_success: false })).data).toHaveLength(0);
    });

    it('gives up after its last try', async () => {
      receiver.answers.push(...Array.from({ length: 16 }, () => 500));
      await paid(service);
      await until(() => receiver.notices.length === 16);
      await settled();
      await new Promise((resolve) => setTimeout(resolve, 100));
      expect(receiver.notices).toHaveLength(16);
    });

    it('never tells of work that was refused', async () => {
      const id = await paid(service);
      await settled();
      receiver.notices.length = 0;
      service.fake.control.addFault({ kind: 'dropped', times: 2 });
      await expect(service.port.capture(id, 5_000, newKey())).rejects.toThrow(PaymentServiceUnavailable);
      await settled();
      expect(types()).toEqual([]);
    });

    it('tells once of work done twice under one key', async () => {
      const id = await paid(service);
      const key = newKey();
      service.fake.control.addFault({ kind: 'lost-answer', path: '/capture', times: 2 });
      await expect(service.port.capture(id, 12_000, key)).rejects.toThrow(PaymentServiceUnavailable);
      await service.port.capture(id, 12_000, key);
      await settled();
      expect(types().filter((type) => type === 'payment_intent.succeeded')).toHaveLength(1);
    });
  });

  it('goes only to the endpoints that asked, and not to a disabled one', async () => {
    const other = await startReceiver();
    try {
      const endpoint = await service.stripe.webhookEndpoints.create({ url: other.url, enabled_events: ['checkout.session.completed'] });
      await paid(service);
      await settled();
      expect(other.notices.map((notice) => notice.type)).toEqual(['checkout.session.completed']);
      await service.stripe.webhookEndpoints.update(endpoint.id, { disabled: true });
      await paid(service);
      await settled();
      expect(other.notices).toHaveLength(1);
      await service.stripe.webhookEndpoints.del(endpoint.id);
      expect((await service.stripe.webhookEndpoints.list()).data.map((found) => found.id)).toEqual(['we_configured']);
    } finally {
      await other.close();
    }
  });
});
