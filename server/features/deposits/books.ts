import type { EntityManager } from 'typeorm';
import { post } from '@/server/ledger/ledger.service';
import type { Movement } from '@shared/money';
import type { Payment } from './payment.entity';

/** Posts a movement of a payment whose row is locked. Every kind happens at most once to a payment, so its name is the key. */
export async function bookPayment(tx: EntityManager, payment: Payment, movement: Movement, at: Date, memo = ''): Promise<void> {
  const { schoolId, loanId, currency } = payment;
  await post(tx, { schoolId, loanId, paymentId: payment.id, currency, movement, key: `${movement.kind}:${payment.id}`, memo, at });
}
