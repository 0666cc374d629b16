import type { SettlementList, SettlementView } from '@shared/api/settlement';
import type { EntityManager } from 'typeorm';
import { forbidden, notFound } from '@/server/http/problem';
import { route, schema, type AnyRoute } from '@/server/http/route';
import { ObjectionAnswerDto, SettlementDto } from './settlement.dto';
import { answerObjection, decide, proposeKeep } from './settlement.service';
import { openSettlements, settlementView } from './settlementView';

async function viewFor(tx: EntityManager, loanId: string, accountId: string): Promise<SettlementView> {
  const view = await settlementView(tx, loanId);
  if (view === null) throw notFound('There is no such loan in this school. Go back to the desk and pick one.');
  if (view.borrower.id === accountId) throw forbidden('You borrowed this kit, so another admin settles it.', 'own_loan');
  return view;
}

export const settlementRoutes: AnyRoute[] = [
  route({
    method: 'get', path: '/settlements', permission: 'settle:write', summary: 'Loans whose deposit waits for a decision',
    response: schema<SettlementList>('SettlementList'), idempotent: false,
    handle: async ({ tx, actor }) => ({ items: await openSettlements(tx, actor.accountId) }),
  }),
  route({
    method: 'get', path: '/settlements/:loanId', permission: 'settle:write', summary: 'The money question of one loan',
    response: schema<SettlementView>('SettlementView'), idempotent: false,
    handle: ({ tx, params, actor }) => viewFor(tx, params.loanId, actor.accountId),
  }),
  route({
    method: 'put', path: '/settlements/:loanId/proposal', permission: 'settle:write', summary: 'Show the borrower what is meant to be kept, before anything is',
    request: SettlementDto, response: schema<SettlementView>('SettlementView'), idempotent: true,
    handle: async ({ tx, params, body, actor, now }) => {
      await proposeKeep(tx, params.loanId, body.items, { accountId: actor.accountId, now });
      return viewFor(tx, params.loanId, actor.accountId);
    },
  }),
  route({
    method: 'post', path: '/settlements/:loanId/decision', permission: 'settle:write', summary: 'Decide the deposit, once',
    request: SettlementDto, response: schema<SettlementView>('SettlementView'), idempotent: true,
    handle: async ({ tx, params, body, actor, now }) => {
      await decide(tx, params.loanId, body.items, { accountId: actor.accountId, now });
      return viewFor(tx, params.loanId, actor.accountId);
    },
  }),
  route({
    method: 'post', path: '/settlements/:loanId/objection-answer', permission: 'settle:write', summary: 'Answer the borrower’s objection',
    request: ObjectionAnswerDto, response: schema<SettlementView>('SettlementView'), idempotent: true,
    handle: async ({ tx, params, body, actor, now }) => {
      await answerObjection(tx, params.loanId, body.answer, { accountId: actor.accountId, now });
      return viewFor(tx, params.loanId, actor.accountId);
    },
  }),
];
