import type { EntityManager } from 'typeorm';
import { withSchoolSystem } from '@/server/database/school';
import type { Loan } from '@/server/features/loans/loan.entity';
import { neutralKit } from '@/server/features/loans/lendingRules';
import { lockLoan } from '@/server/features/loans/loanState';
import { takeOut } from '@/server/features/loans/takeOut';
import { enqueue } from '@/server/jobs/enqueue';
import { queueMail } from '@/server/mail/queueMail';
import type { Payment as SeenPayment, PaymentMetadata, PaymentSession } from '@/server/payments/payments.port';
import { bookPayment } from './books';
import { openPage } from './openPage';
import { Payment, PaymentStep } from './payment.entity';
import { changePayment, intendStep, lockPayment } from './paymentRows';
import { settleKey } from './settle';
import type { PaymentRef, PaymentWork } from './work';

/** In a few words, for the webhook inbox: what looking a payment up came to. */
export type LookUpOutcome = 'kit is out' | 'too late, going back' | 'page closed' | 'hold ended' | 'hold secured' | 'nothing new' | 'not ours';

interface Seen {
  readonly session: PaymentSession | null;
  readonly payment: SeenPayment | null;
}

/**
 * Looks a payment up at the service and applies what became of it: the one way by which a completed, expired or ended
 * payment reaches us, whether a notice, a returning student or a sweep asked. No transaction is open during the calls;
 * then the loan is locked and one listed transition is applied or none, so any number of askers come to one effect.
 *
 * @throws PaymentError of the port when the service cannot be asked
 */
export async function lookUpPayment(work: PaymentWork, ref: PaymentRef): Promise<LookUpOutcome> {
  await openPage(work, ref); // only where it is still `opening`: a try that was cut off
  const known = await withSchoolSystem(work.db, ref.schoolId, (tx) => tx.findOneBy(Payment, { id: ref.paymentId }));
  if (known === null) return 'not ours';
  const seen = await look(work, known);
  if (!belongs(known, seen)) return 'not ours';
  return withSchoolSystem(work.db, ref.schoolId, async (tx) => {
    const loan = await lockLoan(tx, known.loanId);
    const payment = await lockPayment(tx, known.id);
    return payment === null ? 'not ours' : apply(tx, { loan, payment, seen, now: work.now() });
  });
}

async function look({ payments }: PaymentWork, known: Payment): Promise<Seen> {
  const session = known.sessionId === null || !isUnpaid(known) ? null : await payments.readSession(known.sessionId);
  const intentId = known.paymentIntentId ?? session?.paymentIntentId ?? null;
  return { session, payment: intentId === null ? null : await payments.readPayment(intentId) };
}

/** What the service shows must carry our own ids and the amount we asked for; anything else is somebody else's object. */
function belongs(known: Payment, { session, payment }: Seen): boolean {
  const ours = (metadata: PaymentMetadata): boolean =>
    metadata.schoolId === known.schoolId && metadata.loanId === known.loanId && metadata.paymentId === known.id;
  if (session !== null && !ours(session.metadata)) return false;
  if (payment === null) return true;
  return ours(payment.metadata) && payment.amountMinor === known.amountMinor && payment.currency.toUpperCase() === known.currency.trim();
}

const isUnpaid = ({ state }: Payment): boolean => state === 'opening' || state === 'open';

interface Case {
  readonly loan: Loan;
  readonly payment: Payment;
  readonly seen: Seen;
  readonly now: Date;
}

async function apply(tx: EntityManager, at: Case): Promise<LookUpOutcome> {
  const { payment, seen } = at;
  const status = seen.payment?.status;
  if (isUnpaid(payment)) {
    if (seen.payment !== null && (status === 'held' || status === 'charged')) return paid(tx, at, seen.payment);
    return seen.session?.status === 'expired' || status === 'cancelled' ? closed(tx, at) : 'nothing new';
  }
  // Our own steps record what they did; without one, the hold ended or was captured by itself or by hand.
  if (payment.state !== 'held' || seen.payment === null || (await hasOpenSteps(tx, payment))) return 'nothing new';
  if (status === 'cancelled') {
    await bookPayment(tx, payment, { kind: 'hold_released', amountMinor: payment.amountMinor }, at.now, 'ended at the payment service');
    await changePayment(tx, payment, { state: 'released' });
    return 'hold ended';
  }
  if (status === 'charged' && seen.payment.receivedMinor === payment.amountMinor) {
    await bookPayment(tx, payment, { kind: 'hold_secured', amountMinor: payment.amountMinor }, at.now, 'captured at the payment service');
    await changePayment(tx, payment, { state: 'charged', securedAt: at.now, chargeId: seen.payment.chargeId });
    return 'hold secured';
  }
  return 'nothing new';
}

async function paid(tx: EntityManager, { loan, payment, now }: Case, seen: SeenPayment): Promise<LookUpOutcome> {
  const isHeld = seen.status === 'held';
  await bookPayment(tx, payment, { kind: isHeld ? 'hold_placed' : 'deposit_charged', amountMinor: payment.amountMinor }, now);
  await changePayment(tx, payment, {
    state: isHeld ? 'held' : 'charged', paymentIntentId: seen.id, chargeId: seen.chargeId, captureBefore: seen.captureBefore,
  });
  await endPageSteps(tx, payment, now);
  if (loan.state === 'reserved') {
    await takeOut(tx, loan, { actorId: null, mode: payment.mode, now });
    return 'kit is out';
  }
  await giveBack(tx, loan, payment, now);
  return 'too late, going back';
}

/** The reservation had lapsed or was cancelled when the payment completed: nothing is kept, and the student is told. */
async function giveBack(tx: EntityManager, loan: Loan, payment: Payment, now: Date): Promise<void> {
  const kind = payment.state === 'held' ? 'release' : 'refund';
  await intendStep(tx, { payment, kind, key: settleKey(payment), amountMinor: payment.amountMinor, now });
  await enqueue(tx, 'payment-steps', { schoolId: payment.schoolId, paymentId: payment.id }, { key: `payment-steps:${payment.id}` });
  await queueMail(tx, {
    schoolId: loan.schoolId, toAccountId: loan.borrowerId, template: 'payment-too-late', dedupeKey: `payment-too-late:${payment.id}`,
    data: {
      loanId: loan.id, kit: await neutralKit(tx, loan.kitId),
      deposit: { amountMinor: payment.amountMinor, currency: payment.currency, mode: payment.mode },
    },
  });
}

/** The page is gone and nothing was paid. A loan that is still reserved may open another. */
async function closed(tx: EntityManager, { payment, now }: Case): Promise<LookUpOutcome> {
  await changePayment(tx, payment, { state: 'cancelled' });
  await endPageSteps(tx, payment, now);
  return 'page closed';
}

async function endPageSteps(tx: EntityManager, payment: Payment, now: Date): Promise<void> {
  await tx.query(
    "UPDATE payment_step SET state = 'done', done_at = $2 WHERE payment_id = $1 AND state = 'intended' AND kind IN ('open', 'expire')",
    [payment.id, now],
  );
}

function hasOpenSteps(tx: EntityManager, payment: Payment): Promise<boolean> {
  return tx.existsBy(PaymentStep, { paymentId: payment.id, state: 'intended' });
}
