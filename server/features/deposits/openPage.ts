import { withSchoolSystem } from '@/server/database/school';
import { PaymentRefused, PaymentServiceUnavailable } from '@/server/payments/payments.errors';
import type { OpenDepositPage } from '@/server/payments/payments.port';
import { neutralKit } from '@/server/features/loans/lendingRules';
import { lockLoan } from '@/server/features/loans/loanState';
import { Payment, PaymentStep } from './payment.entity';
import { changePayment, lockPayment } from './paymentRows';
import type { PaymentRef, PaymentWork } from './work';

export const openKey = (paymentId: string): string => `open:${paymentId}`;

/**
 * Opens the hosted page of a payment that is `opening`, or finds the one that an earlier, cut-off try opened: the same
 * key asks for the same page. Afterwards the payment is `open`; `cancelled` when the service refused to open it.
 * @throws PaymentServiceUnavailable when nobody answers; the payment stays `opening` and the next try goes on from there
 */
export async function openPage(work: PaymentWork, ref: PaymentRef): Promise<void> {
  const asked = await withSchoolSystem(work.db, ref.schoolId, async (tx) => {
    const payment = await tx.findOneBy(Payment, { id: ref.paymentId, state: 'opening' });
    if (payment === null) return null;
    const { kitId } = await lockLoan(tx, payment.loanId);
    return request(payment, (await neutralKit(tx, kitId)).kitNumber, work.publicUrl);
  });
  if (asked === null) return;
  try {
    const page = await work.payments.openDepositPage(asked);
    await record(work, ref, { state: 'open', sessionId: page.sessionId, sessionUrl: page.url, sessionExpiresAt: page.expiresAt });
  } catch (error) {
    // A key that was used for another request (the app's address changed meanwhile, say) tells nothing about the page.
    if (!(error instanceof PaymentRefused) || error.code === 'idempotency_key_reused') throw error;
    await record(work, ref, { state: 'cancelled' }, error.code);
    throw new PaymentServiceUnavailable('page_refused', `the page of payment ${ref.paymentId} was refused: ${error.code}`, { cause: error });
  }
}

/** Everything here follows from stored rows, so that a retry under the same key asks for the very same. */
function request(payment: Payment, kitNumber: string, publicUrl: string): OpenDepositPage {
  const back = `${publicUrl}/loans/${payment.loanId}`;
  return {
    paymentId: payment.id, schoolId: payment.schoolId, loanId: payment.loanId,
    amountMinor: payment.amountMinor, currency: payment.currency.trim(), capture: payment.mode,
    description: `Deposit for kit ${kitNumber}`,
    returnUrl: `${back}?payment=done`, cancelUrl: `${back}?payment=left`,
    expiresAt: payment.sessionExpiresAt ?? payment.createdAt,
    idempotencyKey: openKey(payment.id),
  };
}

function record(work: PaymentWork, ref: PaymentRef, change: Partial<Payment>, refusal?: string): Promise<void> {
  return withSchoolSystem(work.db, ref.schoolId, async (tx) => {
    const seen = await tx.findOneByOrFail(Payment, { id: ref.paymentId });
    await lockLoan(tx, seen.loanId);
    const payment = await lockPayment(tx, ref.paymentId);
    if (payment?.state !== 'opening') return;
    await changePayment(tx, payment, change);
    await tx.update(PaymentStep, { key: openKey(payment.id) }, {
      state: refusal === undefined ? 'done' : 'refused', doneAt: work.now(), lastError: refusal ?? null, attempts: () => 'attempts + 1',
    });
  });
}
