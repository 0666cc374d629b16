import { Column, Entity, PrimaryColumn } from 'typeorm';
import { minorUnits } from '@/server/database/transformers';

export type SettlementState = 'proposed' | 'decided' | 'done';

/** How one loan's deposit was settled: proposed to the student, decided once by an admin, done when the payment service has moved the money. */
@Entity('settlement')
export class Settlement {
  @PrimaryColumn({ type: 'uuid', name: 'loan_id' })
  loanId: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'text' })
  state: SettlementState;

  @Column({ type: 'bigint', name: 'kept_minor', transformer: minorUnits })
  keptMinor: number;

  @Column({ type: 'bigint', name: 'released_minor', transformer: minorUnits })
  releasedMinor: number;

  @Column({ type: 'char', length: 3 })
  currency: string;

  @Column({ type: 'uuid', name: 'proposed_by', nullable: true })
  proposedBy: string | null;

  @Column({ type: 'timestamptz', name: 'proposed_at', nullable: true })
  proposedAt: Date | null;

  @Column({ type: 'uuid', name: 'decided_by', nullable: true })
  decidedBy: string | null;

  @Column({ type: 'timestamptz', name: 'decided_at', nullable: true })
  decidedAt: Date | null;

  @Column({ type: 'timestamptz', name: 'done_at', nullable: true })
  doneAt: Date | null;
}
