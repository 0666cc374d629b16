import { withSchoolSystem, withSystem } from '@/server/database/school';
import { isUuid } from '@/server/http/uuid';
import type { JobDeps, JobHandler } from '@/server/jobs/deps';
import type { JobPayload } from '@/server/jobs/payloads';
import { PaymentRefused } from '@/server/payments/payments.errors';
import type { PaymentMetadata } from '@/server/payments/payments.port';
import { lookUpPayment, type LookUpOutcome } from './lookUp';
import { Payment, WebhookEvent } from './payment.entity';
import { takeSteps } from './takeSteps';
import type { PaymentRef } from './work';

/** Works off one notice of the inbox: finds whose payment it is about, looks that up anew and marks the notice done. */
export const paymentEvent: JobHandler<JobPayload<'payment-event'>> = async (deps, { eventId, paymentIntentId }) => {
  const event = await withSystem(deps.db, (tx) => tx.findOneBy(WebhookEvent, { id: eventId }));
  if (event === null || event.doneAt !== null) return;
  const outcome = await workOff(deps, event, paymentIntentId);
  await withSystem(deps.db, (tx) => tx.update(WebhookEvent, { id: eventId }, { doneAt: deps.now(), outcome }));
};

async function workOff(deps: JobDeps, event: WebhookEvent, paymentIntentId: string | null): Promise<LookUpOutcome> {
  const ref = (await refByObject(deps, event.objectId)) ?? (await refByObject(deps, paymentIntentId)) ?? (await refByMetadata(deps, event));
  if (ref === null) return 'not ours';
  const outcome = await lookUpPayment(deps, ref);
  if (outcome === 'too late, going back') await takeSteps(deps, ref);
  return outcome;
}

/** By an id that we stored with the payment, whichever school it is of. */
async function refByObject(deps: JobDeps, objectId: string | null): Promise<PaymentRef | null> {
  if (objectId === null) return null;
  const [row]: { id: string; schoolId: string }[] = await withSystem(deps.db, (tx) =>
    tx.query('SELECT id, school_id AS "schoolId" FROM find_payment($1)', [objectId]));
  return row === undefined ? null : { schoolId: row.schoolId, paymentId: row.id };
}

/**
 * By the ids that the object itself carries, for a page whose opening was cut off before its id was stored. They are
 * believed only where they name a payment of ours, of that school and that loan.
 */
async function refByMetadata(deps: JobDeps, event: WebhookEvent): Promise<PaymentRef | null> {
  const { schoolId, paymentId, loanId } = await metadataOf(deps, event);
  if (!isUuid(schoolId) || !isUuid(paymentId) || !isUuid(loanId)) return null;
  const isOurs = await withSchoolSystem(deps.db, schoolId, (tx) => tx.existsBy(Payment, { id: paymentId, schoolId, loanId }));
  return isOurs ? { schoolId, paymentId } : null;
}

const nobodys: PaymentMetadata = { schoolId: null, loanId: null, paymentId: null };

async function metadataOf({ payments }: JobDeps, event: WebhookEvent): Promise<PaymentMetadata> {
  try {
    if (event.objectKind === 'session') return (await payments.readSession(event.objectId)).metadata;
    if (event.objectKind === 'payment') return (await payments.readPayment(event.objectId)).metadata;
  } catch (error) {
    if (!(error instanceof PaymentRefused)) throw error; // no such object
  }
  return nobodys;
}
