import { Column, Entity, PrimaryColumn } from 'typeorm';

/** Append-only: one of the two people who accept a stone that no reading settles, with the reason. */
@Entity('stone_acceptance')
export class StoneAcceptance {
  @PrimaryColumn({ type: 'uuid', name: 'loan_id' })
  loanId: string;

  @PrimaryColumn({ type: 'uuid', name: 'stone_id' })
  stoneId: string;

  @PrimaryColumn({ type: 'uuid', name: 'account_id' })
  accountId: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'text' })
  reason: string;

  @Column({ type: 'timestamptz' })
  at: Date;
}
