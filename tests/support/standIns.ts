import { randomUUID } from 'node:crypto';
import { Readable } from 'node:stream';
import { PaymentConflict, PaymentRefused, WebhookRefused } from '@/server/payments/payments.errors';
import type { PaymentPort } from '@/server/payments/payments.port';
import { FileNotFound, type StoragePort } from '@/server/storage/storage.port';

/** Files in memory. */
export function memoryStorage(): StoragePort {
  const files = new Map<string, { content: Buffer; mime: string }>();
  return {
    put: async (key, content, mime) => { files.set(key, { content, mime }); },
    get: async (key) => {
      const file = files.get(key);
      if (!file) throw new FileNotFound();
      return { stream: Readable.from([file.content]), mime: file.mime, sizeBytes: file.content.length };
    },
    delete: async (key) => { files.delete(key); },
  };
}

/**
 * A payment service at which nobody ever pays: pages open and stay open. For tests that are not about payment; those that
 * are use the fake of `server/payments/fake`.
 */
export function idlePayments(): PaymentPort {
  const unknown = (): never => { throw new PaymentRefused('resource_missing', 'no such object'); };
  return {
    openDepositPage: async ({ expiresAt }) => ({ sessionId: `cs_test_${randomUUID()}`, url: 'http://localhost:8090/pay', expiresAt }),
    readSession: async () => unknown(),
    expireSession: async () => { throw new PaymentConflict('already_expired', 'the page is closed'); },
    readPayment: async () => unknown(),
    capture: async () => unknown(),
    cancelHold: async () => unknown(),
    refund: async () => unknown(),
    readRefund: async () => unknown(),
    parseWebhook: () => { throw new WebhookRefused('bad_signature', 'not signed by the service'); },
  };
}
