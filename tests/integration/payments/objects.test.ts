import { cards, deposit, newKey, paid, startService } from './support';
import type { Service } from './support';

describe('the objects behind the port, through the official SDK', () => {
  let service: Service;

  beforeAll(async () => {
    service = await startService();
  });
  afterAll(() => service.stop());
  beforeEach(() => service.fake.control.reset());

  describe('lists', () => {
    beforeEach(async () => {
      for (let number = 1; number <= 25; number += 1) await service.stripe.customers.create({ name: `customer ${number}` });
    });

    it('page newest first, ten unless told otherwise, until there is no more', async () => {
      const first = await service.stripe.customers.list();
      expect(first.data.map((customer) => customer.name)).toEqual(Array.from({ length: 10 }, (_, index) => `customer ${25 - index}`));
      expect(first.has_more).toBe(true);
      const last = await service.stripe.customers.list({ limit: 20, starting_after: first.data[9]?.id ?? '' });
      expect(last.data).toHaveLength(15);
      expect(last.has_more).toBe(false);
    });

    it('page back', async () => {
      const all = await service.stripe.customers.list({ limit: 100 });
      const back = await service.stripe.customers.list({ limit: 5, ending_before: all.data[7]?.id ?? '' });
      expect(back.data.map((customer) => customer.id)).toEqual(all.data.slice(2, 7).map((customer) => customer.id));
      expect(back.has_more).toBe(true);
    });

    it('are walked whole by the SDK’s own paging, each object once', async () => {
      const seen: string[] = [];
      for await (const customer of service.stripe.customers.list({ limit: 4 })) seen.push(customer.id);
      expect(new Set(seen).size).toBe(25);
      expect(seen).toHaveLength(25);
    });

    it('refuse a limit out of 1 to 100 and an unknown cursor', async () => {
      await expect(service.stripe.customers.list({ limit: 101 })).rejects.toMatchObject({ type: 'StripeInvalidRequestError', param: 'limit' });
      await expect(service.stripe.customers.list({ limit: 0 })).rejects.toMatchObject({ param: 'limit' });
      await expect(service.stripe.customers.list({ starting_after: 'cus_none' })).rejects.toMatchObject({ code: 'resource_missing' });
    });

    it('filter by the time of creation', async () => {
      await service.fake.control.advanceClock(1000);
      await service.stripe.customers.create({ name: 'late' });
      const since = service.fake.control.nowSeconds() - 500;
      expect((await service.stripe.customers.list({ created: { gte: since } })).data.map((customer) => customer.name)).toEqual(['late']);
      expect((await service.stripe.customers.list({ created: { lt: since }, limit: 100 })).data).toHaveLength(25);
    });
  });

  it('expands links where asked, also inside lists, and refuses what is no link', async () => {
    const id = await paid(service, { capture: 'charge' });
    const intent = await service.stripe.paymentIntents.retrieve(id, { expand: ['latest_charge.balance_transaction', 'payment_method'] });
    expect(intent.latest_charge).toMatchObject({ object: 'charge', balance_transaction: { object: 'balance_transaction', amount: 12_000 } });
    expect(intent.payment_method).toMatchObject({ object: 'payment_method', card: { last4: '4242' } });
    const lines = await service.stripe.balanceTransactions.list({ expand: ['data.source'] });
    expect(lines.data[0]?.source).toMatchObject({ object: 'charge', payment_intent: id });
    await expect(service.stripe.paymentIntents.retrieve(id, { expand: ['status'] })).rejects.toMatchObject({ param: 'expand' });
  });

  it('refuses fields it does not know, amounts that are none, and too small ones', async () => {
    const create = (change: Record<string, unknown>) => service.stripe.rawRequest('POST', '/v1/payment_intents', { amount: 1000, currency: 'eur', ...change });
    await expect(create({ colour: 'blue' })).rejects.toMatchObject({ code: 'parameter_unknown', param: 'colour' });
    await expect(create({ amount: 10.5 })).rejects.toMatchObject({ code: 'parameter_invalid_integer', param: 'amount' });
    await expect(create({ amount: -5 })).rejects.toMatchObject({ param: 'amount' });
    await expect(create({ amount: 49 })).rejects.toMatchObject({ code: 'amount_too_small' });
    await expect(create({ currency: 'gold' })).rejects.toMatchObject({ param: 'currency' });
    await expect(create({ currency: '' })).rejects.toMatchObject({ code: 'parameter_missing', param: 'currency' });
    await expect(service.stripe.rawRequest('GET', '/v1/unknown')).rejects.toMatchObject({ statusCode: 404 });
  });

  it('sets, changes and unsets metadata', async () => {
    const id = await paid(service);
    await service.stripe.paymentIntents.update(id, { metadata: { school_id: '', note: 'kept' } });
    expect((await service.stripe.paymentIntents.retrieve(id)).metadata).toEqual({ loan_id: 'loan-1', payment_id: 'payment-1', note: 'kept' });
  });

  it('keeps a card with consent and holds it again later without asking', async () => {
    const customer = await service.stripe.customers.create({ email: 'student@portellery.example' });
    const setup = await service.stripe.setupIntents.create({ customer: customer.id, payment_method: 'pm_card_visa', confirm: true });
    expect(setup.status).toBe('succeeded');
    const methods = await service.stripe.paymentMethods.list({ customer: customer.id });
    expect(methods.data.map((method) => method.id)).toEqual([setup.payment_method]);
    const hold = await service.stripe.paymentIntents.create({
      amount: 5_000, currency: 'eur', capture_method: 'manual', customer: customer.id,
      payment_method: methods.data[0]?.id ?? '', off_session: true, confirm: true,
    });
    expect(hold).toMatchObject({ status: 'requires_capture', amount_capturable: 5_000, customer: customer.id });
  });

  it('keeps a card through the page in setup mode', async () => {
    const customer = await service.stripe.customers.create({});
    const session = await service.stripe.checkout.sessions.create({ mode: 'setup', currency: 'eur', customer: customer.id, success_url: 'http://127.0.0.1:9/done' });
    expect((await service.fake.control.pay({ sessionId: session.id, cardNumber: cards.works })).kind).toBe('done');
    const done = await service.stripe.checkout.sessions.retrieve(session.id, { expand: ['setup_intent'] });
    expect(done).toMatchObject({ status: 'complete', payment_status: 'no_payment_required', setup_intent: { status: 'succeeded', customer: customer.id } });
  });

  describe('disputes', () => {
    it('take the money and the fee at once; lost, it stays away and the charge cannot be paid back', async () => {
      const id = await paid(service, { capture: 'charge' }, cards.disputed);
      const [dispute] = (await service.stripe.disputes.list({ payment_intent: id })).data;
      expect(dispute).toMatchObject({ amount: 12_000, status: 'needs_response', reason: 'fraudulent' });
      await expect(service.port.refund({ paymentIntentId: id, amountMinor: 1, key: newKey() })).rejects.toMatchObject({ code: 'charge_disputed' });
      await service.fake.control.closeDispute(dispute?.id ?? '', 'lost');
      expect(service.fake.control.books()).toMatchObject([{ capturedMinor: 12_000, disputedMinor: 12_000 }]);
    });

    it('are won by Stripe’s winning evidence (docs.stripe.com/testing), and the money comes back', async () => {
      const id = await paid(service, { capture: 'charge' });
      const disputeId = await service.fake.control.openDispute({ paymentIntentId: id });
      const dispute = await service.stripe.disputes.update(disputeId, { evidence: { uncategorized_text: 'winning_evidence' } });
      expect(dispute.status).toBe('won');
      expect(dispute.balance_transactions.map((line) => line.amount)).toEqual([-12_000, 12_000]);
      expect(service.fake.control.books()).toMatchObject([{ disputedMinor: 0 }]);
    });
  });

  it('keeps books that agree with its own balance, line by line', async () => {
    const charged = await paid(service, { capture: 'charge' });
    await service.port.refund({ paymentIntentId: charged, amountMinor: 4_000, key: newKey() });
    await service.port.capture(await paid(service, { paymentId: 'payment-2' }), 3_000, newKey());
    await paid(service, { paymentId: 'payment-3' });
    const lines = (await service.stripe.balanceTransactions.list({ limit: 100 })).data;
    // 2.9 % + 30 of 12000 and of 3000, worked by hand: 378 and 117.
    expect(lines.map((line) => [line.type, line.amount, line.fee, line.net])).toEqual([
      ['charge', 3_000, 117, 2_883],
      ['refund', -4_000, 0, -4_000],
      ['charge', 12_000, 378, 11_622],
    ]);
    expect(service.fake.control.books()).toEqual([
      { currency: 'eur', heldMinor: 12_000, capturedMinor: 15_000, refundedMinor: 4_000, disputedMinor: 0, feeMinor: 495, balanceMinor: 10_505 },
    ]);
  });

  it('does not let a payment be cancelled under its open page: the page is closed instead (as the SDK documents)', async () => {
    const { sessionId } = await service.port.openDepositPage(deposit(service));
    await service.fake.control.pay({ sessionId, cardNumber: cards.declined });
    const { paymentIntentId } = await service.port.readSession(sessionId);
    await expect(service.port.cancelHold(paymentIntentId ?? '', newKey())).rejects.toMatchObject({ name: 'PaymentConflict' });
  });
});
