import { keep, newId } from '../bank';
import type { Bank } from '../bank';
import { declineMessages } from '../cards';
import type { PaymentMethodDocument, SetupIntentDocument } from '../documents';
import { ApiError, invalidRequest } from '../errors';
import { attachMethod } from './customers';
import { outcomeOf } from './methods';

interface NewSetup {
  customerId?: string | null;
  description?: string | null;
  metadata?: Record<string, string>;
  usage?: 'off_session' | 'on_session';
}

/** The wish to keep a card, with its owner's consent, for a later hold or charge. */
export function createSetup(bank: Bank, given: NewSetup): SetupIntentDocument {
  const id = newId('seti');
  const setup = keep(bank, 'setup_intent', {
    id,
    object: 'setup_intent',
    application: null,
    automatic_payment_methods: null,
    cancellation_reason: null,
    client_secret: `${id}_${newId('secret')}`,
    created: bank.nowS(),
    customer: given.customerId ?? null,
    description: given.description ?? null,
    excluded_payment_method_types: null,
    flow_directions: null,
    last_setup_error: null,
    latest_attempt: null,
    livemode: false,
    mandate: null,
    metadata: given.metadata ?? {},
    next_action: null,
    on_behalf_of: null,
    payment_method: null,
    payment_method_configuration_details: null,
    payment_method_options: null,
    payment_method_types: ['card'],
    single_use_mandate: null,
    status: 'requires_payment_method',
    usage: given.usage ?? 'off_session',
  });
  bank.emit('setup_intent.created', setup);
  return setup;
}

export interface SetupAttempt {
  method: PaymentMethodDocument;
  authenticated?: boolean;
  authenticateUrl: string;
}

/** Tries to keep the card; afterwards `succeeded`, `requires_action`, or back at `requires_payment_method` with an error. */
export function attemptSetup(bank: Bank, setup: SetupIntentDocument, { method, authenticated = false, authenticateUrl }: SetupAttempt): void {
  if (!['requires_payment_method', 'requires_confirmation', 'requires_action'].includes(setup.status)) {
    throw invalidRequest(`You cannot confirm this SetupIntent because it has a status of ${setup.status}.`, { code: 'setup_intent_unexpected_state' });
  }
  const outcome = outcomeOf(bank, method);
  setup.last_setup_error = null;
  setup.next_action = null;
  setup.payment_method = method.id;
  if (outcome.kind === 'asks' && !authenticated) {
    setup.status = 'requires_action';
    setup.next_action = { type: 'redirect_to_url', redirect_to_url: { return_url: null, url: authenticateUrl } };
    bank.emit('setup_intent.requires_action', setup);
    return;
  }
  if (outcome.kind === 'declined') {
    failSetup(bank, setup, {
      type: 'card_error',
      code: outcome.code,
      message: declineMessages[outcome.declineCode ?? outcome.code] ?? 'Your card was declined.',
      payment_method: method,
      ...(outcome.declineCode === undefined ? {} : { decline_code: outcome.declineCode }),
    });
    return;
  }
  if (setup.customer !== null) attachMethod(bank, method, setup.customer);
  setup.status = 'succeeded';
  bank.emit('setup_intent.succeeded', setup);
}

export function failSetup(bank: Bank, setup: SetupIntentDocument, error: NonNullable<SetupIntentDocument['last_setup_error']>): void {
  setup.status = 'requires_payment_method';
  setup.payment_method = null;
  setup.next_action = null;
  setup.last_setup_error = error;
  bank.emit('setup_intent.setup_failed', setup);
}

export function setupDeclineOf(setup: SetupIntentDocument): ApiError | null {
  const last = setup.last_setup_error;
  if (last === null) return null;
  return new ApiError(402, {
    type: 'card_error',
    message: last.message ?? 'Your card was declined.',
    code: last.code ?? 'card_declined',
    ...(last.decline_code === undefined ? {} : { decline_code: last.decline_code }),
  });
}

export function cancelSetup(bank: Bank, setup: SetupIntentDocument, reason: 'abandoned' | 'duplicate' | 'requested_by_customer' | null): void {
  if (setup.status === 'succeeded' || setup.status === 'canceled') {
    throw invalidRequest(`You cannot cancel this SetupIntent because it has a status of ${setup.status}.`, { code: 'setup_intent_unexpected_state' });
  }
  setup.status = 'canceled';
  setup.cancellation_reason = reason;
  bank.emit('setup_intent.canceled', setup);
}
