import type { EntityManager } from 'typeorm';
import { withSchool } from '@/server/database/school';
import { loanFor, type LoanActor } from '@/server/features/loans/loanAccess';
import { lockLoan } from '@/server/features/loans/loanState';
import { loanView } from '@/server/features/loans/loanView';
import { claimKey, storeAnswer } from '@/server/http/idempotency';
import { refused, Unavailable } from '@/server/http/problem';
import { reply, type Reply } from '@/server/http/reply';
import type { IdempotentCall } from '@/server/http/route';
import { PaymentServiceUnavailable } from '@/server/payments/payments.errors';
import type { LoanView, OpenPaymentView } from '@shared/api/loans';
import { Loan } from '@/server/features/loans/loan.entity';
import { lookUpPayment } from './lookUp';
import { openPage } from './openPage';
import { Payment } from './payment.entity';
import { preparePayment, type Prepared } from './preparePayment';
import type { PaymentWork } from './work';

interface Asked {
  readonly loanId: string;
  readonly actor: LoanActor;
  readonly idempotency: IdempotentCall | undefined;
}

/**
 * Opens the payment page of a loan's deposit: intent, call, outcome in three steps, so that whatever is cut off goes on
 * with the same key. Asked again, it answers with the page that is open, or, where that was paid meanwhile, with the
 * kit being out. Without a deposit the kit goes out at once.
 */
export async function openDeposit(work: PaymentWork, asked: Asked): Promise<Reply<OpenPaymentView>> {
  const now = work.now();
  const first = await withSchool(work.db, asked.actor, async (tx) => {
    const before = asked.idempotency === undefined ? undefined : await claimKey(tx, asked.idempotency);
    if (before !== undefined && before !== 'unfinished') return { replay: reply(before.status, before.body as OpenPaymentView, { headers: { 'Idempotency-Hit': 'true' } }) };
    return { prepared: await prepare(tx, asked, now) };
  });
  if (first.replay !== undefined) return first.replay;
  if (first.prepared.kind !== 'out') await reachService(work, asked, first.prepared);
  return withSchool(work.db, asked.actor, (tx) => answer(tx, asked, work.now()));
}

async function prepare(tx: EntityManager, { loanId, actor }: Asked, now: Date): Promise<Prepared> {
  await loanFor(tx, loanId, actor);
  const loan = await lockLoan(tx, loanId);
  if (loan.state === 'out') return { kind: 'out' }; // an earlier try under the same key got this far
  return preparePayment(tx, loan, { actorId: actor.accountId, now });
}

/** Opens the page, or looks at the one that is open: it may have been paid or closed. */
async function reachService(work: PaymentWork, { actor }: Pick<Asked, 'actor'>, at: { kind: 'opening' | 'open'; paymentId: string }): Promise<void> {
  const ref = { schoolId: actor.schoolId, paymentId: at.paymentId };
  try {
    if (at.kind === 'opening') await openPage(work, ref);
    else await lookUpPayment(work, ref);
  } catch (error) {
    throw withWords(error);
  }
}

/** 503 in words for what the student can do; everything else is passed on. */
function withWords(error: unknown): unknown {
  if (!(error instanceof PaymentServiceUnavailable)) return error;
  return new Unavailable('payment_service_away', 'The payment service does not answer just now. The kit stays reserved for you: try again in a moment.');
}

async function answer(tx: EntityManager, { loanId, actor, idempotency }: Asked, now: Date): Promise<Reply<OpenPaymentView>> {
  const loan = await tx.findOneByOrFail(Loan, { id: loanId });
  const payment = await tx.findOneBy(Payment, { loanId, state: 'open' });
  const url = loan.state === 'reserved' ? (payment?.sessionUrl ?? null) : null;
  if (loan.state === 'reserved' && url === null) {
    throw refused('page_closed', 'That payment page was closed before it was paid, and nothing was taken. Try again to open a new one.');
  }
  const body: OpenPaymentView = { url, loan: await loanView(tx, loanId, actor.accountId, now) };
  if (idempotency !== undefined) await storeAnswer(tx, idempotency, { status: 200, body });
  return reply(200, body);
}

/** The student came back from the payment page: what it came to, at once, instead of waiting for the service's notice. */
export async function checkDeposit(work: PaymentWork, { loanId, actor }: Omit<Asked, 'idempotency'>): Promise<LoanView> {
  const payment = await withSchool(work.db, actor, async (tx) => {
    await loanFor(tx, loanId, actor);
    return tx.findOne(Payment, { where: { loanId }, order: { createdAt: 'DESC' } });
  });
  if (payment?.state === 'opening' || payment?.state === 'open') await reachService(work, { actor }, { kind: 'open', paymentId: payment.id });
  return withSchool(work.db, actor, (tx) => loanView(tx, loanId, actor.accountId, work.now()));
}
