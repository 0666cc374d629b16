import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { Payment, PaymentStep, type StepKind } from './payment.entity';

/** The loan's payment that was not cancelled, locked. Lock the loan first. */
export function lockLivePayment(tx: EntityManager, loanId: string): Promise<Payment | null> {
  return tx
    .createQueryBuilder(Payment, 'payment')
    .setLock('pessimistic_write')
    .where("payment.loanId = :loanId AND payment.state <> 'cancelled'", { loanId })
    .getOne();
}

/** A payment of this school, locked. Lock its loan first. */
export function lockPayment(tx: EntityManager, paymentId: string): Promise<Payment | null> {
  return tx.findOne(Payment, { where: { id: paymentId }, lock: { mode: 'pessimistic_write' } });
}

export interface NewStep {
  readonly payment: Payment;
  readonly kind: StepKind;
  /** Unique: a step that is already there under this key is returned as it is. */
  readonly key: string;
  readonly amountMinor: number;
  readonly now: Date;
}

/** Writes what is about to be asked of the payment service, before it is asked. */
export async function intendStep(tx: EntityManager, step: NewStep): Promise<PaymentStep & { isNew: boolean }> {
  const made: { id: string }[] = await tx.query(
    `INSERT INTO payment_step (id, school_id, payment_id, kind, key, amount_minor, created_at)
     VALUES ($1, $2, $3, $4, $5, $6, $7) ON CONFLICT (key) DO NOTHING RETURNING id`,
    [randomUUID(), step.payment.schoolId, step.payment.id, step.kind, step.key, step.amountMinor, step.now],
  );
  const row = await tx.findOneByOrFail(PaymentStep, { key: step.key });
  return Object.assign(row, { isNew: made.length === 1 });
}

/** Changes a payment the caller has locked, and the object with it. */
export async function changePayment(tx: EntityManager, payment: Payment, change: Partial<Payment>): Promise<void> {
  await tx.update(Payment, { id: payment.id }, { ...change, version: () => 'version + 1' });
  Object.assign(payment, change, { version: payment.version + 1 });
}
