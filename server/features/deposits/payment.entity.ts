import { Column, Entity, PrimaryColumn } from 'typeorm';
import { minorUnits } from '@/server/database/transformers';
import type { PaymentState } from '@shared/api/loans';

/** The deposit of one loan at the payment service. A loan has at most one payment that is not `cancelled`. */
@Entity('payment')
export class Payment {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'uuid', name: 'loan_id' })
  loanId: string;

  @Column({ type: 'text' })
  mode: 'hold' | 'charge';

  /** A hold that was captured whole to keep it from lapsing is `charged` with `securedAt`: still the student's money. */
  @Column({ type: 'text' })
  state: PaymentState;

  @Column({ type: 'bigint', name: 'amount_minor', transformer: minorUnits })
  amountMinor: number;

  @Column({ type: 'char', length: 3 })
  currency: string;

  @Column({ type: 'text', name: 'session_id', nullable: true })
  sessionId: string | null;

  @Column({ type: 'text', name: 'session_url', nullable: true })
  sessionUrl: string | null;

  /** Chosen before the page is opened and kept, because a retry under the same key must ask for the same. */
  @Column({ type: 'timestamptz', name: 'session_expires_at', nullable: true })
  sessionExpiresAt: Date | null;

  @Column({ type: 'text', name: 'payment_intent_id', nullable: true })
  paymentIntentId: string | null;

  @Column({ type: 'text', name: 'charge_id', nullable: true })
  chargeId: string | null;

  /** When the hold lapses by itself, as the service said; null unless it is or was a hold. */
  @Column({ type: 'timestamptz', name: 'capture_before', nullable: true })
  captureBefore: Date | null;

  @Column({ type: 'timestamptz', name: 'secured_at', nullable: true })
  securedAt: Date | null;

  @Column({ type: 'timestamptz', name: 'created_at' })
  createdAt: Date;

  @Column({ type: 'integer', default: 1 })
  version: number;
}

export type StepKind = 'open' | 'expire' | 'secure' | 'keep' | 'release' | 'refund';

/** One step at the payment service: written before the call with its key, completed after it; a job finishes what was cut off. */
@Entity('payment_step')
export class PaymentStep {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'uuid', name: 'payment_id' })
  paymentId: string;

  @Column({ type: 'text' })
  kind: StepKind;

  @Column({ type: 'text' })
  key: string;

  /** What the step moves: the whole for `open`, `expire`, `secure` and `release`, the part for `keep` and `refund`. */
  @Column({ type: 'bigint', name: 'amount_minor', transformer: minorUnits })
  amountMinor: number;

  @Column({ type: 'text', default: 'intended' })
  state: 'intended' | 'done' | 'refused';

  @Column({ type: 'integer', default: 0 })
  attempts: number;

  @Column({ type: 'text', name: 'last_error', nullable: true })
  lastError: string | null;

  @Column({ type: 'timestamptz', name: 'created_at' })
  createdAt: Date;

  @Column({ type: 'timestamptz', name: 'done_at', nullable: true })
  doneAt: Date | null;
}

/** The inbox: one row for each notice of the payment service, whose id is unique, so that a doubled one is one. */
@Entity('webhook_event')
export class WebhookEvent {
  @PrimaryColumn({ type: 'text' })
  id: string;

  @Column({ type: 'text' })
  type: string;

  @Column({ type: 'text', name: 'object_kind' })
  objectKind: string;

  @Column({ type: 'text', name: 'object_id' })
  objectId: string;

  @Column({ type: 'timestamptz', name: 'event_at' })
  eventAt: Date;

  @Column({ type: 'timestamptz', name: 'received_at' })
  receivedAt: Date;

  @Column({ type: 'timestamptz', name: 'done_at', nullable: true })
  doneAt: Date | null;

  @Column({ type: 'text', nullable: true })
  outcome: string | null;
}
