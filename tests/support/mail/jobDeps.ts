import pino from 'pino';
import type { Database } from '@/server/database/data-source';
import type { JobDeps } from '@/server/jobs/deps';
import { createPaymentPort } from '@/server/payments/stripe.adapter';
import { RecordingMail } from './recordingMail';

export interface TestJobDeps extends JobDeps {
  readonly mail: RecordingMail;
  /** Everything that was logged, as JSON lines. */
  readonly lines: string[];
}

/** Job dependencies with a recording mail service, and a payment port that would reach nobody (port 9 discards). */
export function testJobDeps(db: Database): TestJobDeps {
  const lines: string[] = [];
  return {
    db,
    mail: new RecordingMail(),
    payments: createPaymentPort({ secretKey: 'sk_test_none', webhookSecret: 'whsec_none', apiBase: { host: '127.0.0.1', port: 9, protocol: 'http' } }),
    publicUrl: 'https://lend.portellery.example',
    now: () => new Date(),
    log: pino({ level: 'debug' }, { write: (line: string) => { lines.push(line); } }),
    lines,
  };
}
