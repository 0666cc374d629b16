import { find } from '../bank';
import type { Bank } from '../bank';
import type { PaymentMethodDocument, SessionDocument } from '../documents';
import { ApiError } from '../errors';
import { attachMethod, createCustomer } from './customers';
import { attemptPayment, failAttempt } from './intents';
import { createMethod } from './methods';
import type { CardInput } from './methods';
import { completeSession, emailDetails, intentFor, noteOf, setupFor } from './sessions';
import { attemptSetup, failSetup } from './setups';

/** What became of one press of the page's button. */
export type PageOutcome =
  | { kind: 'done'; url: string }
  | { kind: 'asks' }
  | { kind: 'declined'; message: string }
  | { kind: 'closed' };

/** Pays an open page by card. Declines leave the page open for another try. */
export function payOnPage(bank: Bank, session: SessionDocument, card: CardInput): PageOutcome {
  if (session.status !== 'open') return { kind: 'closed' };
  const note = noteOf(bank, session);
  note.notice = null;
  note.awaiting = null;
  session.customer_details = emailDetails(card.email ?? session.customer_email);
  let method: PaymentMethodDocument;
  try {
    method = createMethod(bank, card);
  } catch (error) {
    // A number or date that cannot be right: the page says so, and no attempt is made.
    if (!(error instanceof ApiError)) throw error;
    note.notice = error.body.message;
    return { kind: 'declined', message: error.body.message };
  }
  return attempt(bank, session, method, false);
}

/** The bank's own step for cards that ask: approve goes on, refuse counts as a decline. */
export function answerBank(bank: Bank, session: SessionDocument, approved: boolean): PageOutcome {
  const note = noteOf(bank, session);
  if (session.status !== 'open' || note.awaiting === null) return { kind: 'closed' };
  const method = find(bank, 'payment_method', note.awaiting);
  note.awaiting = null;
  if (approved) return attempt(bank, session, method, true);
  const message = 'Your bank could not confirm that it was you. Try again, or use another card.';
  if (session.mode === 'payment') {
    failAttempt(bank, intentFor(bank, session), { type: 'card_error', code: 'payment_intent_authentication_failure', message, payment_method: method });
  } else {
    failSetup(bank, setupFor(bank, session), { type: 'card_error', code: 'setup_intent_authentication_failure', message, payment_method: method });
  }
  note.notice = message;
  return { kind: 'declined', message };
}

function attempt(bank: Bank, session: SessionDocument, method: PaymentMethodDocument, authenticated: boolean): PageOutcome {
  const note = noteOf(bank, session);
  const authenticateUrl = `${bank.pageBase}/pay/${session.id}/bank`;
  const result = session.mode === 'payment'
    ? tryPayment(bank, session, { method, authenticated, authenticateUrl })
    : trySetup(bank, session, { method, authenticated, authenticateUrl });
  if (result.status === 'requires_action') {
    note.awaiting = method.id;
    return { kind: 'asks' };
  }
  if (result.message !== null) {
    note.notice = result.message;
    return { kind: 'declined', message: result.message };
  }
  completeSession(bank, session);
  return { kind: 'done', url: returnUrl(session) };
}

interface Step {
  method: PaymentMethodDocument;
  authenticated: boolean;
  authenticateUrl: string;
}

interface Result {
  status: string;
  /** Why it did not work, or null. */
  message: string | null;
}

function tryPayment(bank: Bank, session: SessionDocument, step: Step): Result {
  const note = noteOf(bank, session);
  const intent = intentFor(bank, session);
  attemptPayment(bank, intent, step);
  if (intent.last_payment_error !== null) return { status: intent.status, message: intent.last_payment_error.message ?? 'Your card was declined.' };
  const keepsCard = session.customer_creation === 'always' || note.setupFutureUsage !== null;
  if (intent.status !== 'requires_action' && (keepsCard || session.customer !== null)) {
    intent.customer = customerFor(bank, session);
    if (note.setupFutureUsage !== null) attachMethod(bank, step.method, intent.customer);
  }
  return { status: intent.status, message: null };
}

function trySetup(bank: Bank, session: SessionDocument, step: Step): Result {
  const setup = setupFor(bank, session);
  setup.customer ??= session.customer;
  if (session.customer_creation === 'always') setup.customer = customerFor(bank, session);
  attemptSetup(bank, setup, step);
  const message = setup.last_setup_error === null ? null : (setup.last_setup_error.message ?? 'Your card was declined.');
  return { status: setup.status, message };
}

function customerFor(bank: Bank, session: SessionDocument): string {
  session.customer ??= createCustomer(bank, { email: session.customer_details?.email ?? null }).id;
  return session.customer;
}

/** Where the student goes when done, with the session's id put in. */
export function returnUrl(session: SessionDocument): string {
  return (session.success_url ?? '').replaceAll('{CHECKOUT_SESSION_ID}', session.id);
}
