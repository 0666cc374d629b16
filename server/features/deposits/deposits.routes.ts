import { route, schema, nothing, type AnyRoute } from '@/server/http/route';
import type { LoanView, OpenPaymentView } from '@shared/api/loans';
import { checkDeposit, openDeposit } from './openDeposit';
import { receiveNotice } from './webhook';

export const depositsRoutes: AnyRoute[] = [
  route({
    method: 'post', path: '/loans/:loanId/payment', permission: 'loan:own', summary: 'The page to pay the deposit on; without a deposit the kit is out',
    response: schema<OpenPaymentView>('OpenPaymentView'), idempotent: true, transaction: 'none',
    handle: ({ db, services, actor, params, now, idempotency }) =>
      openDeposit({ db, payments: services.payments, publicUrl: services.config.publicUrl, now: () => now }, { loanId: params.loanId, actor, idempotency }),
  }),
  route({
    method: 'post', path: '/loans/:loanId/payment/check', permission: 'loan:own', summary: 'Back from the payment page: what it came to',
    response: schema<LoanView>('LoanView'), idempotent: false, transaction: 'none',
    handle: ({ db, services, actor, params, now }) =>
      checkDeposit({ db, payments: services.payments, publicUrl: services.config.publicUrl, now: () => now }, { loanId: params.loanId, actor }),
  }),
  route({
    method: 'post', path: '/webhooks/stripe', permission: 'public', summary: 'Notices of the payment service, signed over their raw bytes',
    response: nothing(), idempotent: false, transaction: 'none', body: 'raw',
    handle: async ({ db, services, rawBody, header, now }) => {
      await receiveNotice({ db, payments: services.payments }, { rawBody, signature: header('stripe-signature'), now });
      return undefined;
    },
  }),
];
