import { PaymentConflict, PaymentRefused } from '@/server/payments/payments.errors';

import { cards, deposit, newKey, paid, startService } from './support';
import type { Service } from './support';

const dayS = 86_400;

describe('the payment port against the fake', () => {
  let service: Service;

  beforeAll(async () => {
    service = await startService();
  });
  afterAll(() => service.stop());
  beforeEach(() => service.fake.control.reset());

  describe('a hold', () => {
    it('secures the amount without taking it, for seven days (docs.stripe.com/payments/capture-later)', async () => {
      const heldAtS = service.fake.control.nowSeconds();
      const payment = await service.port.readPayment(await paid(service));
      expect(payment).toMatchObject({
        status: 'held',
        amountMinor: 12_000,
        currency: 'eur',
        capturableMinor: 12_000,
        receivedMinor: 0,
        refundedMinor: 0,
        metadata: { schoolId: 'school-1', loanId: 'loan-1', paymentId: 'payment-1' },
      });
      const lapsesInS = (payment.captureBefore?.getTime() ?? 0) / 1000 - heldAtS;
      expect(Math.abs(lapsesInS - 7 * dayS)).toBeLessThan(5);
    });

    it('leaves the finished session unpaid and points to the payment', async () => {
      const { sessionId } = await service.port.openDepositPage(deposit(service));
      await service.fake.control.pay({ sessionId, cardNumber: cards.works });
      const raw = await service.stripe.checkout.sessions.retrieve(sessionId);
      expect(raw.payment_status).toBe('unpaid');
      const session = await service.port.readSession(sessionId);
      expect(session).toMatchObject({ status: 'complete', url: null, amountMinor: 12_000, metadata: { paymentId: 'payment-1' } });
      expect(session.paymentIntentId).toMatch(/^pi_/);
    });

    it('is captured whole', async () => {
      const payment = await service.port.capture(await paid(service), 12_000, newKey());
      expect(payment).toMatchObject({ status: 'charged', receivedMinor: 12_000, capturableMinor: 0, refundedMinor: 0, captureBefore: null });
    });

    it('is captured in part once, and the released rest does not count as paid back', async () => {
      const id = await paid(service);
      const payment = await service.port.capture(id, 4_500, newKey());
      expect(payment).toMatchObject({ status: 'charged', receivedMinor: 4_500, capturableMinor: 0, refundedMinor: 0 });
      await expect(service.port.capture(id, 1_000, newKey())).rejects.toThrow(PaymentConflict);
    });

    it('books the released rest as the service does: in amount_refunded (woocommerce-gateway-stripe#1073)', async () => {
      const payment = await service.port.capture(await paid(service), 4_500, newKey());
      const charge = await service.stripe.charges.retrieve(payment.chargeId ?? '');
      expect(charge).toMatchObject({ amount: 12_000, amount_captured: 4_500, amount_refunded: 7_500, refunded: false });
    });

    it('is not captured for more than is held', async () => {
      const id = await paid(service);
      await expect(service.port.capture(id, 12_001, newKey())).rejects.toMatchObject({ name: 'PaymentRefused', code: 'amount_too_large' });
      expect((await service.port.readPayment(id)).status).toBe('held');
    });

    it('is released: nothing was taken, nothing can be taken', async () => {
      const id = await paid(service);
      expect(await service.port.cancelHold(id, newKey())).toMatchObject({ status: 'cancelled', capturableMinor: 0, receivedMinor: 0, refundedMinor: 0 });
      await expect(service.port.capture(id, 12_000, newKey())).rejects.toThrow(PaymentConflict);
      await expect(service.port.cancelHold(id, newKey())).rejects.toThrow(PaymentConflict);
    });

    it('lapses by itself at capture_before, not a second earlier', async () => {
      const id = await paid(service);
      const { captureBefore } = await service.port.readPayment(id);
      const leftS = (captureBefore?.getTime() ?? 0) / 1000 - service.fake.control.nowSeconds();
      await service.fake.control.advanceClock(leftS - 30);
      expect((await service.port.readPayment(id)).status).toBe('held');
      await service.fake.control.advanceClock(31);
      expect((await service.port.readPayment(id)).status).toBe('cancelled');
      await expect(service.port.capture(id, 12_000, newKey())).rejects.toThrow(PaymentConflict);
    });

    it('can be captured in part and the taken part paid back, never more', async () => {
      const id = await paid(service);
      await service.port.capture(id, 5_000, newKey());
      await service.port.refund({ paymentIntentId: id, amountMinor: 2_000, key: newKey() });
      expect(await service.port.readPayment(id)).toMatchObject({ receivedMinor: 5_000, refundedMinor: 2_000 });
      await expect(service.port.refund({ paymentIntentId: id, amountMinor: 3_001, key: newKey() })).rejects.toThrow(PaymentRefused);
      await service.port.refund({ paymentIntentId: id, amountMinor: 3_000, key: newKey() });
      expect(await service.port.readPayment(id)).toMatchObject({ receivedMinor: 5_000, refundedMinor: 5_000 });
    });
  });

  describe('a charge', () => {
    it('takes the amount at once', async () => {
      expect(await service.port.readPayment(await paid(service, { capture: 'charge' }))).toMatchObject({
        status: 'charged',
        receivedMinor: 12_000,
        capturableMinor: 0,
        captureBefore: null,
      });
    });

    it('is paid back in parts, and a refund beyond the rest is refused', async () => {
      const id = await paid(service, { capture: 'charge' });
      const first = await service.port.refund({ paymentIntentId: id, amountMinor: 7_000, key: newKey(), metadata: { reason: 'kit-returned' } });
      expect(first).toMatchObject({ status: 'done', amountMinor: 7_000, currency: 'eur', paymentIntentId: id });
      await expect(service.port.refund({ paymentIntentId: id, amountMinor: 5_001, key: newKey() })).rejects.toThrow(PaymentRefused);
      await service.port.refund({ paymentIntentId: id, amountMinor: 5_000, key: newKey() });
      expect(await service.port.readPayment(id)).toMatchObject({ receivedMinor: 12_000, refundedMinor: 12_000 });
      await expect(service.port.refund({ paymentIntentId: id, amountMinor: 1, key: newKey() })).rejects.toMatchObject({ code: 'charge_already_refunded' });
      expect((await service.stripe.refunds.retrieve(first.refundId)).metadata).toEqual({ reason: 'kit-returned' });
    });

    it('cannot be released like a hold', async () => {
      await expect(service.port.cancelHold(await paid(service, { capture: 'charge' }), newKey())).rejects.toThrow(PaymentConflict);
    });

    it('counts a refund that fails as not paid back', async () => {
      const id = await paid(service, { capture: 'charge' }, cards.refundFails);
      const refund = await service.port.refund({ paymentIntentId: id, amountMinor: 12_000, key: newKey() });
      await service.fake.control.advanceClock(120);
      expect((await service.port.readRefund(refund.refundId)).status).toBe('failed');
      expect((await service.port.readPayment(id)).refundedMinor).toBe(0);
    });

    it('tells a refund that is still under way from one that is done', async () => {
      const id = await paid(service, { capture: 'charge' }, cards.refundWaits);
      const refund = await service.port.refund({ paymentIntentId: id, amountMinor: 12_000, key: newKey() });
      expect(refund.status).toBe('pending');
      await service.fake.control.advanceClock(120);
      expect((await service.port.readRefund(refund.refundId)).status).toBe('done');
    });
  });

  describe('the page’s session', () => {
    it('refuses to stay open for less than 30 minutes or more than 24 hours', async () => {
      const inMinutes = (minutes: number): Date => new Date((service.fake.control.nowSeconds() + minutes * 60) * 1000);
      for (const minutes of [29, 24 * 60 + 1]) {
        await expect(service.port.openDepositPage(deposit(service, { expiresAt: inMinutes(minutes) }))).rejects.toMatchObject({ name: 'PaymentRefused' });
      }
    });

    it('can be closed early, once', async () => {
      const { sessionId } = await service.port.openDepositPage(deposit(service));
      expect(await service.port.expireSession(sessionId, newKey())).toMatchObject({ status: 'expired', url: null });
      await expect(service.port.expireSession(sessionId, newKey())).rejects.toMatchObject({ name: 'PaymentConflict', code: 'session_expired' });
    });

    it('cannot be closed when it was paid', async () => {
      const { sessionId } = await service.port.openDepositPage(deposit(service));
      await service.fake.control.pay({ sessionId, cardNumber: cards.works });
      await expect(service.port.expireSession(sessionId, newKey())).rejects.toMatchObject({ name: 'PaymentConflict', code: 'session_complete' });
    });

    it('closes at its time and ends a payment that was begun on it', async () => {
      const { sessionId } = await service.port.openDepositPage(deposit(service));
      await service.fake.control.pay({ sessionId, cardNumber: cards.declined });
      await service.fake.control.advanceClock(46 * 60);
      const session = await service.port.readSession(sessionId);
      expect(session.status).toBe('expired');
      expect((await service.port.readPayment(session.paymentIntentId ?? '')).status).toBe('cancelled');
      expect((await service.fake.control.pay({ sessionId, cardNumber: cards.works })).kind).toBe('closed');
    });

    it('stays open after a decline, whose payment counts as failed until another card works', async () => {
      const { sessionId } = await service.port.openDepositPage(deposit(service));
      expect((await service.fake.control.pay({ sessionId, cardNumber: cards.insufficientFunds })).kind).toBe('declined');
      const open = await service.port.readSession(sessionId);
      expect(open.status).toBe('open');
      expect(await service.port.readPayment(open.paymentIntentId ?? '')).toMatchObject({ status: 'failed', chargeId: null });
      await service.fake.control.pay({ sessionId, cardNumber: cards.works });
      expect((await service.port.readPayment(open.paymentIntentId ?? '')).status).toBe('held');
    });
  });

  it('keeps whole minor units for currencies of no and of three decimals', async () => {
    for (const [currency, amountMinor] of [['JPY', 15_000], ['KWD', 45_500]] as const) {
      const payment = await service.port.readPayment(await paid(service, { currency, amountMinor }));
      expect(payment).toMatchObject({ currency: currency.toLowerCase(), amountMinor });
    }
  });

  it('says which object does not exist', async () => {
    await expect(service.port.readPayment('pi_missing')).rejects.toMatchObject({ name: 'PaymentRefused', code: 'resource_missing' });
  });
});
