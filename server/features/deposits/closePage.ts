import type { EntityManager } from 'typeorm';
import { enqueue } from '@/server/jobs/enqueue';
import { intendStep, lockLivePayment } from './paymentRows';

/**
 * A loan was cancelled: its payment page, where one is open or being opened, is to be closed after commit. Was it paid
 * meanwhile, the money goes back. The loan is locked by the caller.
 */
export async function closePageLater(tx: EntityManager, loanId: string, now: Date): Promise<void> {
  const payment = await lockLivePayment(tx, loanId);
  if (payment === null || (payment.state !== 'opening' && payment.state !== 'open')) return;
  await intendStep(tx, { payment, kind: 'expire', key: `expire:${payment.id}`, amountMinor: payment.amountMinor, now });
  await enqueue(tx, 'payment-steps', { schoolId: payment.schoolId, paymentId: payment.id }, { key: `payment-steps:${payment.id}` });
}
