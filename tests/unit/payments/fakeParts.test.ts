import { cardByNumber, cardByToken, isCardNumber } from '@/server/payments/fake/cards';
import { createFaultBook } from '@/server/payments/fake/http/faults';
import { requestHash } from '@/server/payments/fake/http/idempotency';
import { assertChargeable, feeMinorOf, moneyText } from '@/server/payments/fake/money';
import { html } from '@/server/payments/fake/page/html';
import { allowOnly, flag, integer, list, metadata, positive, text } from '@/server/payments/fake/params';
import { signatureHeader } from '@/server/payments/fake/webhooks/sign';

describe('card numbers', () => {
  it('pass the check digit of ISO/IEC 7812-1 (its published example 7992739871, check digit 3)', () => {
    // The example is eleven digits long, one short of a card; padded with a leading zero the sum is the same.
    expect(isCardNumber('079927398713')).toBe(true);
    for (const wrong of ['0', '1', '2', '4', '5', '6', '7', '8', '9']) expect(isCardNumber(`07992739871${wrong}`)).toBe(false);
  });

  it.each(['', '4242', '4242424242424242424242', '4242 4242 4242 4242', 'abcdabcdabcdabcd'])('are not %p', (typed) => {
    expect(isCardNumber(typed)).toBe(false);
  });

  it('of all test cards are well formed, and number and token lead to the same card', () => {
    for (const number of ['4242424242424242', '5555555555554444', '378282246310005', '4000000000000002', '4000002760003184']) {
      expect(isCardNumber(number)).toBe(true);
      const card = cardByNumber(number);
      expect(card && cardByToken(card.token)).toBe(card);
    }
  });
});

describe('decoded fields', () => {
  it('are whole numbers or refused', () => {
    expect(integer({ amount: '-12' }, 'amount')).toBe(-12);
    expect(integer({}, 'amount')).toBeUndefined();
    for (const amount of ['1.5', '1e3', ' 1', '0x10', '99999999999999999999', 'many', ['1']]) expect(() => integer({ amount }, 'amount')).toThrow();
    expect(() => positive({ amount: '0' }, 'amount')).toThrow();
  });

  it('are texts or refused, and empty counts as absent', () => {
    expect(text({ a: '' }, 'a')).toBeUndefined();
    expect(() => text({ a: ['x'] }, 'a')).toThrow();
    expect(() => text({ a: 'x'.repeat(5001) }, 'a')).toThrow();
    expect(() => flag({ a: 'yes' }, 'a')).toThrow();
  });

  it('are refused when unknown, but expand is always known', () => {
    expect(() => {
      allowOnly({ amount: '1', expand: ['x'] }, ['amount']);
    }).not.toThrow();
    expect(() => {
      allowOnly({ amout: '1' }, ['amount']);
    }).toThrow(/amout/);
  });

  it('come as a list however they were numbered', () => {
    expect(list({ expand: ['a', 'b'] }, 'expand')).toEqual(['a', 'b']);
    expect(list({ expand: { 40: 'a', 41: 'b' } }, 'expand')).toEqual(['a', 'b']);
    expect(list({ expand: 'a' }, 'expand')).toEqual(['a']);
  });

  it('change metadata key by key within the published limits (50 keys, 40 and 500 characters)', () => {
    expect(metadata({ metadata: { a: '', b: '2' } }, { a: '1', c: '3' })).toEqual({ b: '2', c: '3' });
    expect(() => metadata({ metadata: { ['k'.repeat(41)]: 'v' } })).toThrow();
    expect(() => metadata({ metadata: { k: 'v'.repeat(501) } })).toThrow();
    expect(() => metadata({ metadata: Object.fromEntries(Array.from({ length: 51 }, (_, index) => [`k${index}`, 'v'])) })).toThrow();
  });

  it('make the same request in any order, and another one with any other value', () => {
    const hash = requestHash('/v1/refunds', { amount: '1', metadata: { a: '1', b: '2' } });
    expect(requestHash('/v1/refunds', { metadata: { b: '2', a: '1' }, amount: '1' })).toBe(hash);
    expect(requestHash('/v1/refunds', { amount: '2', metadata: { a: '1', b: '2' } })).not.toBe(hash);
    expect(requestHash('/v1/other', { amount: '1', metadata: { a: '1', b: '2' } })).not.toBe(hash);
  });
});

describe('money', () => {
  it('is written with its currency’s decimals (ISO 4217: EUR 2, JPY 0, KWD 3)', () => {
    expect(moneyText(12_000, 'eur')).toBe('€120.00');
    expect(moneyText(12_000, 'jpy')).toBe('¥12,000');
    expect(moneyText(12_000, 'kwd').replace(/\s/g, ' ')).toBe('KWD 12.000');
  });

  it('costs 2.9 % and 30, in whole minor units', () => {
    expect([1000, 1001, 12_000].map(feeMinorOf)).toEqual([59, 59, 378]);
  });

  it('is neither too little nor more than eight digits', () => {
    for (const amount of [49, 100_000_000]) {
      expect(() => {
        assertChargeable(amount, 'eur', 'amount');
      }).toThrow();
    }
    expect(() => {
      assertChargeable(50, 'eur', 'amount');
      assertChargeable(99_999_999, 'eur', 'amount');
    }).not.toThrow();
  });
});

describe('fault switches', () => {
  it('hit as often as told, only where told', () => {
    const book = createFaultBook();
    book.add({ kind: 'lost-answer', path: '/capture', method: 'POST', times: 2 });
    expect(book.take('POST', '/v1/refunds')).toEqual([]);
    expect(book.take('GET', '/v1/payment_intents/pi_1/capture')).toEqual([]);
    expect(book.take('POST', '/v1/payment_intents/pi_1/capture')).toHaveLength(1);
    expect(book.list()).toMatchObject([{ times: 1 }]);
    book.take('POST', '/v1/payment_intents/pi_1/capture');
    expect(book.list()).toEqual([]);
  });

  it('can hold together: late and lost', () => {
    const book = createFaultBook();
    book.add({ kind: 'delay', delayMs: 5 });
    book.add({ kind: 'lost-answer' });
    book.add({ kind: 'lost-answer' });
    expect(book.take('POST', '/x').map((fault) => fault.kind)).toEqual(['delay', 'lost-answer']);
    expect(book.take('POST', '/x').map((fault) => fault.kind)).toEqual(['lost-answer']);
  });

  it('without an end last until cleared', () => {
    const book = createFaultBook();
    book.add({ kind: 'dropped', times: null });
    for (let round = 0; round < 50; round += 1) expect(book.take('GET', '/x')).toHaveLength(1);
    book.clear();
    expect(book.take('GET', '/x')).toEqual([]);
  });
});

describe('the page’s HTML', () => {
  it('escapes every value that is not HTML itself', () => {
    expect(html`<p title="${'"\''}">${'<b>&'}</p>`.html).toBe('<p title="&quot;&#39;">&lt;b&gt;&amp;</p>');
    expect(html`<ul>${[html`<li>${'a<'}</li>`, html`<li>${2}</li>`]}</ul>`.html).toBe('<ul><li>a&lt;</li>\n<li>2</li></ul>');
    expect(html`${null}${false}`.html).toBe('');
  });
});

describe('a notice’s signature', () => {
  it('is HMAC-SHA-256 over timestamp, dot and payload (computed apart with: printf %s "1700000000.{}" | openssl dgst -sha256 -hmac whsec_test)', () => {
    expect(signatureHeader('{}', 'whsec_test', 1_700_000_000)).toBe('t=1700000000,v1=35495024f4ef3f94e5a93e22221544c4b75e9a42300cd965ab81cb85cd994e91');
  });
});
