import type { Database } from '@/server/database/data-source';
import { withSystem } from '@/server/database/school';
import { BadRequest } from '@/server/http/problem';
import { enqueue } from '@/server/jobs/enqueue';
import { WebhookRefused } from '@/server/payments/payments.errors';
import type { PaymentNotice, PaymentPort } from '@/server/payments/payments.port';

export interface Delivery {
  readonly rawBody: Buffer;
  readonly signature: string | undefined;
  readonly now: Date;
}

/**
 * Takes one notice of the payment service into the inbox: verified over its raw bytes, stored once under its own id
 * together with its job, and answered. What it means is found out later, by looking the object up.
 * @throws BadRequest for a missing, forged or stale signature and for bytes that are no notice
 */
export async function receiveNotice(on: { db: Database; payments: PaymentPort }, delivery: Delivery): Promise<void> {
  const notice = verified(on.payments, delivery);
  await withSystem(on.db, async (tx) => {
    const made: unknown[] = await tx.query(
      `INSERT INTO webhook_event (id, type, object_kind, object_id, event_at, received_at)
       VALUES ($1, $2, $3, $4, $5, $6) ON CONFLICT (id) DO NOTHING RETURNING id`,
      [notice.id, notice.type, notice.objectKind, notice.objectId, notice.createdAt, delivery.now],
    );
    if (made.length === 0) return; // heard before
    await enqueue(tx, 'payment-event', { eventId: notice.id, paymentIntentId: notice.paymentIntentId });
  });
}

function verified(payments: PaymentPort, { rawBody, signature }: Delivery): PaymentNotice {
  try {
    return payments.parseWebhook(rawBody, signature);
  } catch (error) {
    if (!(error instanceof WebhookRefused)) throw error;
    throw new BadRequest('webhook_refused', 'The signature does not fit this body. Send the bytes as they were signed, with the signing secret of this address.');
  }
}
