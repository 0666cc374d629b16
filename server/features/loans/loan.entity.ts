import { Column, Entity, PrimaryColumn } from 'typeorm';
import { minorUnits } from '@/server/database/transformers';
import type { BackState, CancelReason, LoanState, StoneEnding } from '@shared/api/loans';

/** One lending of one kit to one person, from the reservation to the last word about its deposit. */
@Entity('loan')
export class Loan {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'uuid', name: 'kit_id' })
  kitId: string;

  @Column({ type: 'uuid', name: 'borrower_id' })
  borrowerId: string;

  /** Changed by `moveLoan` alone. */
  @Column({ type: 'text' })
  state: LoanState;

  @Column({ type: 'text', name: 'cancel_reason', nullable: true })
  cancelReason: CancelReason | null;

  @Column({ type: 'timestamptz', name: 'reserved_at' })
  reservedAt: Date;

  @Column({ type: 'timestamptz', name: 'reserved_until' })
  reservedUntil: Date;

  @Column({ type: 'timestamptz', name: 'out_at', nullable: true })
  outAt: Date | null;

  @Column({ type: 'timestamptz', name: 'due_at' })
  dueAt: Date;

  @Column({ type: 'timestamptz', name: 'returned_at', nullable: true })
  returnedAt: Date | null;

  @Column({ type: 'timestamptz', name: 'settled_at', nullable: true })
  settledAt: Date | null;

  @Column({ type: 'timestamptz', name: 'cancelled_at', nullable: true })
  cancelledAt: Date | null;

  @Column({ type: 'uuid', name: 'terms_version_id', nullable: true })
  termsVersionId: string | null;

  @Column({ type: 'timestamptz', name: 'terms_accepted_at', nullable: true })
  termsAcceptedAt: Date | null;

  @Column({ type: 'bigint', name: 'deposit_minor', transformer: minorUnits })
  depositMinor: number;

  @Column({ type: 'char', length: 3 })
  currency: string;

  @Column({ type: 'timestamptz', name: 'bench_opened_at', nullable: true })
  benchOpenedAt: Date | null;

  @Column({ type: 'integer', default: 1 })
  version: number;
}

/** One jar of a loan: seen at take-out, said of at return, seen at the bench, and its end. */
@Entity('loan_stone')
export class LoanStone {
  @PrimaryColumn({ type: 'uuid', name: 'loan_id' })
  loanId: string;

  @PrimaryColumn({ type: 'uuid', name: 'stone_id' })
  stoneId: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'text' })
  slot: string;

  @Column({ type: 'timestamptz', name: 'out_seen_at', nullable: true })
  outSeenAt: Date | null;

  @Column({ type: 'text', name: 'out_condition', default: '' })
  outCondition: string;

  @Column({ type: 'text', name: 'back_state', nullable: true })
  backState: BackState | null;

  @Column({ type: 'timestamptz', name: 'back_at', nullable: true })
  backAt: Date | null;

  @Column({ type: 'text', name: 'back_condition', default: '' })
  backCondition: string;

  @Column({ type: 'text', name: 'bench_state', nullable: true })
  benchState: BackState | null;

  @Column({ type: 'timestamptz', name: 'bench_at', nullable: true })
  benchAt: Date | null;

  @Column({ type: 'text', nullable: true })
  ending: StoneEnding | null;

  @Column({ type: 'timestamptz', name: 'ended_at', nullable: true })
  endedAt: Date | null;

  @Column({ type: 'uuid', name: 'ended_by', nullable: true })
  endedBy: string | null;

  @Column({ type: 'text', name: 'end_reason', default: '' })
  endReason: string;

  @Column({ type: 'timestamptz', name: 'second_reading_wanted_at', nullable: true })
  secondReadingWantedAt: Date | null;
}
