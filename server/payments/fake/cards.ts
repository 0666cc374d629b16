/**
 * Stripe's published test cards (docs.stripe.com/testing) and what each does. No other number is ever taken: a
 * real card typed in here by mistake is declined as Stripe's own test mode does, and only its last digits are kept.
 */
export interface TestCard {
  number: string;
  /** The name API callers use instead of a number. */
  token: string;
  brand: 'amex' | 'mastercard' | 'visa';
  funding: 'credit' | 'debit';
  country: string;
  outcome: CardOutcome;
}

export type CardOutcome =
  | { kind: 'works' }
  | { kind: 'declined'; code: DeclineCode; declineCode?: string }
  | { kind: 'asks'; when: 'always' | 'unless-saved' }
  | { kind: 'disputed'; reason: 'fraudulent' | 'product_not_received' }
  | { kind: 'refund-fails' }
  | { kind: 'refund-waits' };

export type DeclineCode = 'card_declined' | 'expired_card' | 'incorrect_cvc' | 'processing_error';

type Row = readonly [number: string, token: string, outcome: CardOutcome, extra?: Partial<Pick<TestCard, 'brand' | 'funding' | 'country'>>];

const works: CardOutcome = { kind: 'works' };
const declined = (code: DeclineCode, declineCode?: string): CardOutcome =>
  declineCode === undefined ? { kind: 'declined', code } : { kind: 'declined', code, declineCode };

const rows: readonly Row[] = [
  ['4242424242424242', 'pm_card_visa', works],
  ['4000056655665556', 'pm_card_visa_debit', works, { funding: 'debit' }],
  ['5555555555554444', 'pm_card_mastercard', works, { brand: 'mastercard' }],
  ['378282246310005', 'pm_card_amex', works, { brand: 'amex' }],
  ['4000000000000002', 'pm_card_visa_chargeDeclined', declined('card_declined', 'generic_decline')],
  ['4000000000009995', 'pm_card_visa_chargeDeclinedInsufficientFunds', declined('card_declined', 'insufficient_funds')],
  ['4000000000009987', 'pm_card_visa_chargeDeclinedLostCard', declined('card_declined', 'lost_card')],
  ['4000000000009979', 'pm_card_visa_chargeDeclinedStolenCard', declined('card_declined', 'stolen_card')],
  ['4000000000000069', 'pm_card_chargeDeclinedExpiredCard', declined('expired_card')],
  ['4000000000000127', 'pm_card_chargeDeclinedIncorrectCvc', declined('incorrect_cvc')],
  ['4000000000000119', 'pm_card_chargeDeclinedProcessingError', declined('processing_error')],
  ['4000002500003155', 'pm_card_authenticationRequiredOnSetup', { kind: 'asks', when: 'unless-saved' }],
  ['4000002760003184', 'pm_card_authenticationRequired', { kind: 'asks', when: 'always' }],
  ['4000000000000259', 'pm_card_createDispute', { kind: 'disputed', reason: 'fraudulent' }],
  ['4000000000002685', 'pm_card_createDisputeProductNotReceived', { kind: 'disputed', reason: 'product_not_received' }],
  ['4000000000005126', 'pm_card_refundFail', { kind: 'refund-fails' }],
  ['4000000000007726', 'pm_card_pendingRefund', { kind: 'refund-waits' }],
];

const cards: readonly TestCard[] = rows.map(([number, token, outcome, extra]) => ({
  number,
  token,
  outcome,
  brand: extra?.brand ?? 'visa',
  funding: extra?.funding ?? 'credit',
  country: extra?.country ?? 'US',
}));

export function cardByNumber(number: string): TestCard | undefined {
  return cards.find((card) => card.number === number);
}

export function cardByToken(token: string): TestCard | undefined {
  return cards.find((card) => card.token === token);
}

/** What Stripe's test mode answers to a well-formed number that is not a test card. */
export const liveCardOutcome: CardOutcome = declined('card_declined', 'test_mode_live_card');

/** ISO/IEC 7812-1 check digit (Luhn); 12 to 19 digits. */
export function isCardNumber(digits: string): boolean {
  if (!/^\d{12,19}$/.test(digits)) return false;
  let sum = 0;
  for (let index = 0; index < digits.length; index += 1) {
    const digit = Number(digits[digits.length - 1 - index]);
    const doubled = index % 2 === 1 ? digit * 2 : digit;
    sum += doubled > 9 ? doubled - 9 : doubled;
  }
  return sum % 10 === 0;
}

export const declineMessages: Readonly<Record<string, string>> = {
  generic_decline: 'Your card was declined.',
  insufficient_funds: 'Your card has insufficient funds.',
  lost_card: 'Your card was declined.',
  stolen_card: 'Your card was declined.',
  test_mode_live_card: 'Your card was declined. This is a test page: use one of the test cards.',
  expired_card: 'Your card has expired.',
  incorrect_cvc: "Your card's security code is incorrect.",
  processing_error: 'An error occurred while processing your card. Try again in a little bit.',
};
