import { withSchoolSystem } from '@/server/database/school';
import { PaymentConflict, PaymentError, PaymentRefused } from '@/server/payments/payments.errors';
import type { Payment as SeenPayment } from '@/server/payments/payments.port';
import { planCall, type DepositGoal } from '@shared/lending';
import { lookUpPayment } from './lookUp';
import { Payment, PaymentStep } from './payment.entity';
import { recordReached, refuseStep } from './recordStep';
import { keptBy } from './settle';
import type { PaymentRef, PaymentWork } from './work';

const stepsMax = 8;
const triesMax = 4;

/**
 * Takes every step that is intended for a payment, oldest first. Safe to call any number of times and from several
 * workers at once: what to ask is decided from what the service shows, every call carries the step's own key, and the
 * outcome is recorded once.
 * @throws PaymentServiceUnavailable when the service does not answer; the step stays intended
 */
export async function takeSteps(work: PaymentWork, ref: PaymentRef): Promise<void> {
  for (let taken = 0; taken < stepsMax; taken += 1) {
    const next = await nextStep(work, ref);
    if (next === null) return;
    try {
      await takeStep(work, next);
    } catch (error) {
      await noteFailure(work, ref, next.step, error);
      throw error;
    }
  }
}

interface Next {
  readonly payment: Payment;
  readonly step: PaymentStep;
}

function nextStep(work: PaymentWork, ref: PaymentRef): Promise<Next | null> {
  return withSchoolSystem(work.db, ref.schoolId, async (tx) => {
    const payment = await tx.findOneBy(Payment, { id: ref.paymentId });
    const step = await tx.findOne(PaymentStep, { where: { paymentId: ref.paymentId, state: 'intended' }, order: { createdAt: 'ASC', kind: 'ASC' } });
    return payment === null || step === null ? null : { payment, step };
  });
}

function takeStep(work: PaymentWork, next: Next): Promise<void> {
  if (next.step.kind === 'open' || next.step.kind === 'expire') return closePage(work, next);
  const goal: DepositGoal = next.step.kind === 'secure' ? { kind: 'secure' } : { kind: 'settle', keepMinor: keptBy(next.step, next.payment) };
  return reach(work, next, goal);
}

/** `open` and `expire` end with what the look-up finds: paid after all, or closed. */
async function closePage(work: PaymentWork, { payment, step }: Next): Promise<void> {
  const ref = { schoolId: payment.schoolId, paymentId: payment.id };
  await lookUpPayment(work, ref);
  const now = await withSchoolSystem(work.db, ref.schoolId, (tx) => tx.findOneByOrFail(Payment, { id: payment.id }));
  if (step.kind === 'expire' && now.state === 'open' && now.sessionId !== null) {
    try {
      await work.payments.expireSession(now.sessionId, step.key);
    } catch (error) {
      if (!(error instanceof PaymentConflict)) throw error; // it was paid or had expired a moment ago: the look-up tells which
    }
    await lookUpPayment(work, ref);
  }
  await withSchoolSystem(work.db, ref.schoolId, (tx) =>
    tx.update(PaymentStep, { id: step.id, state: 'intended' }, { state: 'done', doneAt: work.now() }));
}

/** Asks the service for the call that reaches the goal; where somebody was faster, looks again and plans anew. */
async function reach(work: PaymentWork, next: Next, goal: DepositGoal): Promise<void> {
  const intentId = next.payment.paymentIntentId;
  if (intentId === null) return refuseStep(work, next, 'not_paid', null);
  for (let attempt = 1; ; attempt += 1) {
    const seen = await work.payments.readPayment(intentId);
    try {
      const reached = await call(work, next.step, seen, goal);
      if (typeof reached === 'string') await refuseStep(work, next, reached, seen);
      else await recordReached(work, next, goal, reached);
      return;
    } catch (error) {
      if (error instanceof PaymentConflict && attempt < triesMax) continue;
      if (error instanceof PaymentRefused || error instanceof PaymentConflict) return refuseStep(work, next, error.code, seen);
      throw error;
    }
  }
}

/** @returns the payment as it then is, or why the goal is out of reach */
async function call(work: PaymentWork, step: PaymentStep, seen: SeenPayment, goal: DepositGoal): Promise<SeenPayment | string> {
  const plan = planCall(seen, goal);
  switch (plan.call) {
    case 'none':
      return seen;
    case 'lost':
      return plan.reason;
    case 'cancel_hold':
      return work.payments.cancelHold(seen.id, `${step.key}:cancel`);
    case 'capture':
      return work.payments.capture(seen.id, plan.amountMinor, `${step.key}:capture`);
    case 'refund': {
      const refund = await work.payments.refund({ paymentIntentId: seen.id, amountMinor: plan.amountMinor, key: `${step.key}:refund` });
      return refund.status === 'failed' ? 'refund_failed' : { ...seen, refundedMinor: seen.refundedMinor + plan.amountMinor };
    }
  }
}

function noteFailure(work: PaymentWork, ref: PaymentRef, step: PaymentStep, error: unknown): Promise<unknown> {
  const lastError = error instanceof PaymentError ? error.code : error instanceof Error ? error.name : 'unknown';
  return withSchoolSystem(work.db, ref.schoolId, (tx) =>
    tx.update(PaymentStep, { id: step.id, state: 'intended' }, { attempts: () => 'attempts + 1', lastError: lastError.slice(0, 500) }));
}
