import { loanFor } from '@/server/features/loans/loanAccess';
import { noSuchLoan } from '@/server/features/loans/loanState';
import { route, schema, type AnyRoute } from '@/server/http/route';
import type { MoneyView, StatementView } from '@shared/api/money';
import { may } from '@shared/permissions';
import { moneyView, statement } from './money.service';

export const moneyRoutes: AnyRoute[] = [
  route({
    method: 'get', path: '/money', permission: 'money:read', summary: 'Deposits held, charged and kept, and what waits at the payment service',
    response: schema<MoneyView>('MoneyView'), idempotent: false,
    handle: ({ tx }) => moneyView(tx),
  }),
  route({
    method: 'get', path: '/loans/:loanId/statement', permission: 'loan:own', summary: 'Every movement of one deposit, for its borrower or an admin',
    response: schema<StatementView>('StatementView'), idempotent: false,
    handle: async ({ tx, actor, params }) => {
      const loan = await loanFor(tx, params.loanId, actor);
      if (loan.borrowerId !== actor.accountId && !may(actor.roles, 'money:read')) throw noSuchLoan();
      return statement(tx, params.loanId);
    },
  }),
];
