import { Column, Entity, PrimaryColumn } from 'typeorm';

/** Append-only: one entry that a reader handed in for a stone. The first of each reader is blind. */
@Entity('bench_submission')
export class BenchSubmission {
  @PrimaryColumn({ type: 'uuid' })
  id: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'uuid', name: 'loan_id' })
  loanId: string;

  @Column({ type: 'uuid', name: 'stone_id' })
  stoneId: string;

  @Column({ type: 'uuid', name: 'reader_id' })
  readerId: string;

  /** 1 for the first reader, 2 for the second. */
  @Column({ type: 'smallint' })
  pass: 1 | 2;

  @Column({ type: 'boolean' })
  blind: boolean;

  @Column({ type: 'timestamptz', name: 'submitted_at' })
  submittedAt: Date;
}
