import { createHmac } from 'node:crypto';

/**
 * The `stripe-signature` header of a payload: HMAC-SHA-256 over "timestamp.payload"
 * (docs.stripe.com/webhooks#verify-manually).
 */
export function signatureHeader(payload: string, secret: string, timestampS: number): string {
  const signature = createHmac('sha256', secret).update(`${timestampS}.${payload}`).digest('hex');
  return `t=${timestampS},v1=${signature}`;
}
