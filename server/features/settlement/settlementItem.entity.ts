import { Column, Entity, PrimaryColumn } from 'typeorm';
import { minorUnits } from '@/server/database/transformers';

/** One reason for which a part of a deposit is kept. */
@Entity('settlement_item')
export class SettlementItem {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'uuid', name: 'loan_id' })
  loanId: string;

  @Column({ type: 'uuid', name: 'stone_id', nullable: true })
  stoneId: string | null;

  @Column({ type: 'text' })
  reason: string;

  @Column({ type: 'bigint', name: 'amount_minor', transformer: minorUnits })
  amountMinor: number;
}
