import { Column, Entity, PrimaryColumn } from 'typeorm';

/** What a borrower says against a settlement, at most once for a loan, and the school's answer. */
@Entity('objection')
export class Objection {
  @PrimaryColumn({ type: 'uuid', name: 'loan_id' })
  loanId: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'text' })
  text: string;

  @Column({ type: 'uuid', name: 'made_by' })
  madeBy: string;

  @Column({ type: 'timestamptz', name: 'made_at' })
  madeAt: Date;

  @Column({ type: 'text', nullable: true })
  answer: string | null;

  @Column({ type: 'uuid', name: 'answered_by', nullable: true })
  answeredBy: string | null;

  @Column({ type: 'timestamptz', name: 'answered_at', nullable: true })
  answeredAt: Date | null;
}
