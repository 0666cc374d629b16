import { cards, deposit, startService } from './support';
import type { Service } from './support';

/** The page as a browser without script would use it. */
describe('the test payment page', () => {
  let service: Service;

  beforeAll(async () => {
    service = await startService();
  });
  afterAll(() => service.stop());
  beforeEach(() => service.fake.control.reset());

  async function open(change: Parameters<typeof deposit>[1] = {}): Promise<{ sessionId: string; url: string }> {
    return service.port.openDepositPage(deposit(service, change));
  }

  function press(url: string, fields: Record<string, string>): Promise<Response> {
    return fetch(url, { method: 'POST', body: new URLSearchParams(fields), redirect: 'manual' });
  }

  const card = (number: string): Record<string, string> => ({ card: number, expiry: '12/34', cvc: '123' });
  const text = async (url: string): Promise<string> => (await fetch(url)).text();

  it('says that no real money moves, what is held and for what', async () => {
    const { url } = await open();
    const page = await text(url);
    expect(page).toContain('Test payment page — no real money');
    expect(page).toContain('Hold €120.00 on your card');
    expect(page).toContain('Teaching kit, deposit');
    expect(page).toContain('This amount is held on your card, not charged.');
    expect(page).toContain('href="http://127.0.0.1:9/loans/loan-1?cancelled=1"');
  });

  it('tells a charge from a hold', async () => {
    const { url } = await open({ capture: 'charge' });
    const page = await text(url);
    expect(page).toContain('Pay €120.00');
    expect(page).not.toContain('Hold €');
  });

  it('writes amounts by their currency’s own decimals (ISO 4217)', async () => {
    const { url } = await open({ currency: 'JPY', amountMinor: 15_000, capture: 'charge' });
    expect(await text(url)).toContain('¥15,000');
  });

  it('shows what the caller wrote as text, never as markup', async () => {
    const { url } = await open({ description: '<img src=x onerror=alert(1)>' });
    const page = await text(url);
    expect(page).toContain('&lt;img src=x onerror=alert(1)&gt;');
    expect(page).not.toContain('<img');
  });

  it('goes back with the session’s id once the card works', async () => {
    const { url, sessionId } = await open();
    const answer = await press(url, card('4242 4242 4242 4242'));
    expect(answer.status).toBe(303);
    expect(answer.headers.get('location')).toBe(`http://127.0.0.1:9/loans/loan-1?session=${sessionId}`);
  });

  it.each([
    ['declined', cards.declined, 'Your card was declined.'],
    ['short of money', cards.insufficientFunds, 'insufficient funds'],
    ['expired', cards.expired, 'has expired'],
    ['with a wrong code', cards.wrongCvc, 'security code is incorrect'],
  ])('keeps the page open after a card that is %s, says so, and takes another (docs.stripe.com/testing)', async (_how, number, message) => {
    const { url, sessionId } = await open();
    const answer = await press(url, card(number));
    expect(answer.headers.get('location')).toBe(`/pay/${sessionId}`);
    const page = await text(url);
    expect(page).toContain('role="alert"');
    expect(page).toContain(message);
    expect((await press(url, card(cards.works))).headers.get('location')).toContain(sessionId);
    expect((await service.port.readSession(sessionId)).status).toBe('complete');
  });

  it.each([
    ['a number with a wrong check digit', { ...card('4242424242424241') }, 'card number is incorrect'],
    ['a date that is past', { ...card(cards.works), expiry: '01/20' }, 'expiration year is invalid'],
    ['a date that is none', { ...card(cards.works), expiry: 'soon' }, 'expiry date is incomplete'],
    ['a code of two digits', { ...card(cards.works), cvc: '12' }, 'security code is incomplete'],
    ['nothing at all', {}, 'expiry date is incomplete'],
  ])('refuses %s before any attempt is made', async (_what, fields: Record<string, string>, message) => {
    const { url, sessionId } = await open();
    await press(url, fields);
    expect(await text(url)).toContain(message);
    expect((await service.port.readSession(sessionId)).paymentIntentId).toBeNull();
  });

  it('never takes a real card: a well-formed number that is no test card is declined and not kept', async () => {
    const { url, sessionId } = await open();
    const number = '4111111111111111'; // passes the check digit, is not among Stripe's test cards
    await press(url, card(number));
    expect(await text(url)).toContain('use one of the test cards');
    expect((await service.port.readSession(sessionId)).status).toBe('open');
    const intents = await service.stripe.paymentIntents.list({ expand: ['data.latest_charge'] });
    expect(JSON.stringify(intents.data)).not.toContain(number);
    expect(intents.data[0]?.last_payment_error?.decline_code).toBe('test_mode_live_card');
  });

  it('asks the bank where the card asks for it, and goes on when approved', async () => {
    const { url, sessionId } = await open();
    expect((await press(url, card(cards.asks))).headers.get('location')).toBe(`/pay/${sessionId}/bank`);
    expect((await service.port.readSession(sessionId)).status).toBe('open');
    expect(await text(`${url}/bank`)).toContain('Approve');
    expect((await press(`${url}/bank`, { answer: 'approve' })).headers.get('location')).toContain(`session=${sessionId}`);
    expect((await service.port.readSession(sessionId)).status).toBe('complete');
  });

  it('counts a refusal at the bank as a decline and lets the student try again', async () => {
    const { url, sessionId } = await open();
    await press(url, card(cards.asksUnlessSaved));
    expect((await press(`${url}/bank`, { answer: 'refuse' })).headers.get('location')).toBe(`/pay/${sessionId}`);
    expect(await text(url)).toContain('could not confirm that it was you');
    await press(url, card(cards.works));
    expect((await service.port.readSession(sessionId)).status).toBe('complete');
  });

  it('asks for an address where the caller gave none', async () => {
    const request = deposit(service);
    delete request.customerEmail;
    const { url, sessionId } = await service.port.openDepositPage(request);
    expect(await text(url)).toContain('E-mail for the receipt');
    await press(url, card(cards.works));
    expect(await text(url)).toContain('e-mail address is incomplete');
    await press(url, { ...card(cards.works), email: 'student@portellery.example' });
    expect((await service.port.readSession(sessionId)).status).toBe('complete');
  });

  it('says when it was used before, and takes nothing twice', async () => {
    const { url } = await open({ capture: 'charge' });
    await press(url, card(cards.works));
    const again = await press(url, card(cards.works));
    expect(await again.text()).toContain('This is already done');
    expect(service.fake.control.books()).toMatchObject([{ currency: 'eur', capturedMinor: 12_000 }]);
  });

  it('says when its time is over, and takes nothing', async () => {
    const { url } = await open();
    await service.fake.control.advanceClock(46 * 60);
    const answer = await fetch(url);
    expect(answer.status).toBe(410);
    expect(await answer.text()).toContain('This page has expired');
    expect((await press(url, card(cards.works))).status).toBe(410);
    expect(service.fake.control.books()).toEqual([]);
  });

  it('does not know a page that was never opened', async () => {
    expect((await fetch(`${service.url}/pay/cs_test_none`)).status).toBe(404);
    expect((await fetch(`${service.url}/pay/__proto__`)).status).toBe(404);
  });

  it('runs no script and loads nothing from elsewhere', async () => {
    const { url } = await open();
    const answer = await fetch(url);
    expect(answer.headers.get('content-security-policy')).toContain("default-src 'none'");
    expect(await answer.text()).not.toMatch(/<script|src=/);
  });
});
