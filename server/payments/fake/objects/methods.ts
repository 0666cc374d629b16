import { createHash } from 'node:crypto';

import { find, keep, newId } from '../bank';
import type { Bank } from '../bank';
import { cardByNumber, cardByToken, isCardNumber, liveCardOutcome } from '../cards';
import type { CardOutcome, TestCard } from '../cards';
import type { PaymentMethodDocument } from '../documents';
import { ApiError } from '../errors';

export interface CardInput {
  number: string;
  expMonth: number;
  expYear: number;
  email?: string | null;
  name?: string | null;
}

/** How a number that is not a test card looks; it is declined when used. */
const unknownCard = { brand: 'visa', country: 'US', funding: 'credit' } as const;

/** Makes a payment method of a typed card. Only the last four digits are kept. */
export function createMethod(bank: Bank, input: CardInput): PaymentMethodDocument {
  const digits = input.number.replace(/[\s-]/g, '');
  if (!isCardNumber(digits)) throw cardError('incorrect_number', 'Your card number is incorrect.', 'number');
  const now = new Date(bank.nowS() * 1000);
  if (!Number.isInteger(input.expMonth) || input.expMonth < 1 || input.expMonth > 12) {
    throw cardError('invalid_expiry_month', "Your card's expiration month is invalid.", 'exp_month');
  }
  if (!Number.isInteger(input.expYear) || Date.UTC(input.expYear, input.expMonth) <= now.getTime() || input.expYear > now.getUTCFullYear() + 50) {
    throw cardError('invalid_expiry_year', "Your card's expiration year is invalid.", 'exp_year');
  }
  const card = cardByNumber(digits);
  const method = methodDocument(bank, input, digits, card);
  bank.state.methodCards[method.id] = card?.token ?? 'live';
  return keep(bank, 'payment_method', method);
}

/** The method with this id, or a new one for a test token such as `pm_card_visa`. */
export function findMethod(bank: Bank, id: string): PaymentMethodDocument {
  const card = cardByToken(id);
  if (card === undefined) return find(bank, 'payment_method', id, 'payment_method');
  const expYear = new Date(bank.nowS() * 1000).getUTCFullYear() + 2;
  return createMethod(bank, { number: card.number, expMonth: 12, expYear });
}

export function outcomeOf(bank: Bank, method: PaymentMethodDocument): CardOutcome {
  return cardByToken(bank.state.methodCards[method.id] ?? '')?.outcome ?? liveCardOutcome;
}

export function cardError(code: string, message: string, param: string): ApiError {
  return new ApiError(402, { type: 'card_error', code, message, param });
}

function methodDocument(bank: Bank, input: CardInput, digits: string, card: TestCard | undefined): PaymentMethodDocument {
  const known = card ?? unknownCard;
  return {
    id: newId('pm'),
    object: 'payment_method',
    allow_redisplay: 'unspecified',
    billing_details: { address: null, email: input.email ?? null, name: input.name ?? null, phone: null, tax_id: null },
    card: {
      brand: known.brand,
      checks: { address_line1_check: null, address_postal_code_check: null, cvc_check: 'pass' },
      country: known.country,
      display_brand: known.brand,
      exp_month: input.expMonth,
      exp_year: input.expYear,
      // Never made of an unknown number: it might be somebody's.
      fingerprint: card === undefined ? null : createHash('sha256').update(card.number).digest('base64url').slice(0, 16),
      funding: known.funding,
      generated_from: null,
      last4: digits.slice(-4),
      networks: { available: [known.brand], preferred: null },
      regulated_status: 'unregulated',
      three_d_secure_usage: { supported: true },
      wallet: null,
    },
    created: bank.nowS(),
    customer: null,
    customer_account: null,
    livemode: false,
    metadata: {},
    type: 'card',
  };
}
