import { find, keep, newId } from '../bank';
import type { Bank } from '../bank';
import type { CustomerDocument, PaymentMethodDocument } from '../documents';
import { invalidRequest } from '../errors';

interface NewCustomer {
  email?: string | null;
  name?: string | null;
  description?: string | null;
  phone?: string | null;
  metadata?: Record<string, string>;
}

export function createCustomer(bank: Bank, given: NewCustomer): CustomerDocument {
  const customer = keep(bank, 'customer', {
    id: newId('cus', 14),
    object: 'customer',
    address: null,
    balance: 0,
    created: bank.nowS(),
    currency: null,
    default_source: null,
    delinquent: false,
    description: given.description ?? null,
    discount: null,
    email: given.email ?? null,
    invoice_prefix: newId('x', 8).slice(2).toUpperCase(),
    invoice_settings: { custom_fields: null, default_payment_method: null, footer: null, rendering_options: null },
    livemode: false,
    metadata: given.metadata ?? {},
    name: given.name ?? null,
    next_invoice_sequence: 1,
    phone: given.phone ?? null,
    preferred_locales: [],
    shipping: null,
    tax_exempt: 'none',
    test_clock: null,
  });
  bank.emit('customer.created', customer);
  return customer;
}

/** Ties a card to a customer; a card of another customer is refused. */
export function attachMethod(bank: Bank, method: PaymentMethodDocument, customerId: string): PaymentMethodDocument {
  const customer = find(bank, 'customer', customerId, 'customer');
  if (method.customer === customer.id) return method;
  if (method.customer !== null) {
    throw invalidRequest('The payment method you provided has already been attached to a customer.', { param: 'payment_method' });
  }
  method.customer = customer.id;
  bank.emit('payment_method.attached', method);
  return method;
}
