import { PageQuery } from '@/server/http/paging';
import { route, schema, type AnyRoute } from '@/server/http/route';
import type { Page } from '@shared/api/common';
import type { BrowseKit, LoanView, StaffLoanRow, StaffLoanView } from '@shared/api/loans';
import { acceptTerms } from './acceptTerms';
import { browseKits } from './browse';
import { cancelByPerson } from './cancelByPerson';
import { loanFor } from './loanAccess';
import { AcceptTermsDto, CancelLoanDto, ObjectionDto, ReturnLoanDto, SeeJarDto, StaffLoansQuery, StartLoanDto } from './loans.dto';
import { loanView } from './loanView';
import { myLoans } from './myLoans';
import { objectToLoan } from './objectToLoan';
import { returnLoan } from './returnLoan';
import { seeJar } from './seeJar';
import { staffLoan, staffLoans } from './staffLoans';
import { startLoan } from './startLoan';

/** Answers of this list that go to a borrower are `LoanView`s: blind, whoever the borrower is. */
export const loansRoutes: AnyRoute[] = [
  route({
    method: 'get', path: '/browse/kits', permission: 'kit:browse', summary: 'Kits to take out, under their neutral titles',
    query: PageQuery, response: schema<Page<BrowseKit>>('Page<BrowseKit>'), idempotent: false,
    handle: ({ tx, query, now }) => browseKits(tx, query, now),
  }),
  route({
    method: 'get', path: '/loans', permission: 'loan:own', summary: 'My own loans, newest first',
    query: PageQuery, response: schema<Page<LoanView>>('Page<LoanView>'), idempotent: false,
    handle: ({ tx, actor, query, now }) => myLoans(tx, actor.accountId, query, now),
  }),
  route({
    method: 'post', path: '/loans', permission: 'loan:own', summary: 'Reserve a kit at once, for oneself or, as staff, for somebody else',
    request: StartLoanDto, response: schema<LoanView>('LoanView'), status: 201, idempotent: true,
    handle: async ({ tx, actor, body, now }) => loanView(tx, await startLoan(tx, body, actor, now), actor.accountId, now),
  }),
  route({
    method: 'get', path: '/loans/:loanId', permission: 'loan:own', summary: 'One loan as its borrower sees it',
    response: schema<LoanView>('LoanView'), idempotent: false,
    handle: async ({ tx, actor, params, now }) => {
      await loanFor(tx, params.loanId, actor);
      return loanView(tx, params.loanId, actor.accountId, now);
    },
  }),
  route({
    method: 'post', path: '/loans/:loanId/jars', permission: 'loan:own', summary: 'One jar seen at take-out, or absent',
    request: SeeJarDto, response: schema<LoanView>('LoanView'), idempotent: true,
    handle: async ({ tx, actor, params, body, now }) => {
      await seeJar(tx, params.loanId, body, actor, now);
      return loanView(tx, params.loanId, actor.accountId, now);
    },
  }),
  route({
    method: 'post', path: '/loans/:loanId/terms', permission: 'loan:own', summary: 'Accept the lending terms as they stand',
    request: AcceptTermsDto, response: schema<LoanView>('LoanView'), idempotent: true,
    handle: async ({ tx, actor, params, body, now }) => {
      await acceptTerms(tx, params.loanId, body.termsVersionId, actor, now);
      return loanView(tx, params.loanId, actor.accountId, now);
    },
  }),
  route({
    method: 'post', path: '/loans/:loanId/cancel', permission: 'loan:own', summary: 'Give a reserved kit back before it went out',
    request: CancelLoanDto, response: schema<LoanView>('LoanView'), idempotent: true,
    handle: async ({ tx, actor, params, body, now }) => {
      await cancelByPerson(tx, params.loanId, body.reason, actor, now);
      return loanView(tx, params.loanId, actor.accountId, now);
    },
  }),
  route({
    method: 'post', path: '/loans/:loanId/return', permission: 'loan:own', summary: 'Put the kit in the return box, with a word on every jar',
    request: ReturnLoanDto, response: schema<LoanView>('LoanView'), idempotent: true,
    handle: async ({ tx, actor, params, body, now }) => {
      await returnLoan(tx, params.loanId, body, actor, now);
      return loanView(tx, params.loanId, actor.accountId, now);
    },
  }),
  route({
    method: 'post', path: '/loans/:loanId/objection', permission: 'loan:own', summary: 'Object to what is, or is meant to be, kept',
    request: ObjectionDto, response: schema<LoanView>('LoanView'), idempotent: true,
    handle: async ({ tx, actor, params, body, now }) => {
      await objectToLoan(tx, params.loanId, body.text, actor, now);
      return loanView(tx, params.loanId, actor.accountId, now);
    },
  }),
  route({
    method: 'get', path: '/staff/loans', permission: 'loan:read', summary: 'Loans of the school, newest first',
    query: StaffLoansQuery, response: schema<Page<StaffLoanRow>>('Page<StaffLoanRow>'), idempotent: false,
    handle: ({ tx, actor, query, now }) => staffLoans(tx, actor.accountId, query, now),
  }),
  route({
    method: 'get', path: '/staff/loans/:loanId', permission: 'loan:read', summary: 'One loan for staff, never for its borrower',
    response: schema<StaffLoanView>('StaffLoanView'), idempotent: false,
    handle: ({ tx, actor, params, now }) => staffLoan(tx, params.loanId, actor.accountId, now),
  }),
];
