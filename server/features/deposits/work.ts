import type { Database } from '@/server/database/data-source';
import type { PaymentPort } from '@/server/payments/payments.port';

/** What the work with the payment service needs; a job's dependencies and a route's services both have it. */
export interface PaymentWork {
  readonly db: Database;
  readonly payments: PaymentPort;
  readonly publicUrl: string;
  readonly now: () => Date;
}

/** One payment, by ids that were found before its school's rows can be read. */
export interface PaymentRef {
  readonly schoolId: string;
  readonly paymentId: string;
}
