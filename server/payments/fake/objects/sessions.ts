import { find, keep, newId } from '../bank';
import type { Bank } from '../bank';
import type { IntentDocument, SessionDocument, SetupIntentDocument } from '../documents';
import { invalidRequest } from '../errors';
import type { SessionNote } from '../state';
import { cancelIntent, createIntent } from './intents';
import { cancelSetup, createSetup } from './setups';

export interface NewSession {
  mode: 'payment' | 'setup';
  amountMinor: number | null;
  currency: string | null;
  successUrl: string;
  cancelUrl: string | null;
  expiresAtS: number;
  customerId: string | null;
  customerEmail: string | null;
  customerCreation: 'always' | 'if_required' | null;
  clientReferenceId: string | null;
  submitMessage: string | null;
  metadata: Record<string, string>;
  note: SessionNote;
}

export function createSession(bank: Bank, given: NewSession): SessionDocument {
  const id = newId('cs_test', 50);
  bank.state.sessionNotes[id] = given.note;
  return keep(bank, 'checkout.session', {
    id,
    object: 'checkout.session',
    adaptive_pricing: { enabled: false },
    after_expiration: null,
    allow_promotion_codes: null,
    amount_subtotal: given.amountMinor,
    amount_total: given.amountMinor,
    automatic_tax: { enabled: false, liability: null, provider: null, status: null },
    billing_address_collection: null,
    cancel_url: given.cancelUrl,
    client_reference_id: given.clientReferenceId,
    client_secret: null,
    collected_information: null,
    consent: null,
    consent_collection: null,
    created: bank.nowS(),
    currency: given.currency,
    currency_conversion: null,
    custom_fields: [],
    custom_text: {
      after_submit: null,
      shipping_address: null,
      submit: given.submitMessage === null ? null : { message: given.submitMessage },
      terms_of_service_acceptance: null,
    },
    customer: given.customerId,
    customer_account: null,
    customer_creation: given.customerCreation,
    customer_details: emailDetails(given.customerEmail),
    customer_email: given.customerEmail,
    discounts: [],
    expires_at: given.expiresAtS,
    integration_identifier: null,
    invoice: null,
    invoice_creation: null,
    livemode: false,
    locale: null,
    managed_payments: null,
    metadata: given.metadata,
    mode: given.mode,
    origin_context: null,
    payment_intent: null,
    payment_link: null,
    payment_method_collection: 'always',
    payment_method_configuration_details: null,
    payment_method_options: { card: { request_three_d_secure: 'automatic' } },
    payment_method_types: ['card'],
    payment_status: given.mode === 'payment' ? 'unpaid' : 'no_payment_required',
    permissions: null,
    phone_number_collection: { enabled: false },
    recovered_from: null,
    saved_payment_method_options: null,
    setup_intent: null,
    shipping_address_collection: null,
    shipping_cost: null,
    shipping_options: [],
    status: 'open',
    submit_type: null,
    subscription: null,
    success_url: given.successUrl,
    total_details: given.mode === 'payment' ? { amount_discount: 0, amount_shipping: 0, amount_tax: 0 } : null,
    ui_mode: 'hosted_page',
    url: `${bank.pageBase}/pay/${id}`,
    wallet_options: null,
  });
}

export function emailDetails(email: string | null): SessionDocument['customer_details'] {
  if (email === null) return null;
  return { address: null, business_name: null, email, individual_name: null, name: null, phone: null, tax_exempt: 'none', tax_ids: null };
}

export function noteOf(bank: Bank, session: SessionDocument): SessionNote {
  const note = bank.state.sessionNotes[session.id];
  if (note === undefined) throw new Error(`session ${session.id} has no note`);
  return note;
}

/** The session's payment; Stripe makes it when the student first tries to pay. */
export function intentFor(bank: Bank, session: SessionDocument): IntentDocument {
  if (session.payment_intent !== null) return find(bank, 'payment_intent', session.payment_intent);
  const note = noteOf(bank, session);
  const intent = createIntent(bank, {
    amountMinor: session.amount_total ?? 0,
    currency: session.currency ?? 'usd',
    captureMethod: note.captureMethod,
    customerId: session.customer,
    description: note.description,
    metadata: note.intentMetadata,
    receiptEmail: note.receiptEmail,
    setupFutureUsage: note.setupFutureUsage,
  });
  session.payment_intent = intent.id;
  return intent;
}

export function setupFor(bank: Bank, session: SessionDocument): SetupIntentDocument {
  if (session.setup_intent !== null) return find(bank, 'setup_intent', session.setup_intent);
  const note = noteOf(bank, session);
  const setup = createSetup(bank, { customerId: session.customer, description: note.description, metadata: note.intentMetadata });
  session.setup_intent = setup.id;
  return setup;
}

/** The student is done. With a hold nothing is paid yet: `payment_status` stays `unpaid`. */
export function completeSession(bank: Bank, session: SessionDocument): void {
  session.status = 'complete';
  session.url = null;
  if (session.payment_intent !== null && find(bank, 'payment_intent', session.payment_intent).status === 'succeeded') {
    session.payment_status = 'paid';
  }
  bank.emit('checkout.session.completed', session);
}

/** Closes an open page, at its time or when asked to, and ends the payment it may have begun. */
export function expireSession(bank: Bank, session: SessionDocument): void {
  if (session.status !== 'open') {
    throw invalidRequest(
      `Only Checkout Sessions with a status in ["open"] can be expired. This Checkout Session has a status of "${session.status}".`,
    );
  }
  session.status = 'expired';
  session.url = null;
  noteOf(bank, session).awaiting = null;
  if (session.payment_intent !== null) cancelIntent(bank, find(bank, 'payment_intent', session.payment_intent), null, null);
  if (session.setup_intent !== null) cancelSetup(bank, find(bank, 'setup_intent', session.setup_intent), null);
  bank.emit('checkout.session.expired', session);
}
