import { Column, Entity, PrimaryColumn } from 'typeorm';

/** Append-only: a loan keeps the version its borrower accepted. */
@Entity('terms_version')
export class TermsVersion {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ name: 'school_id', type: 'uuid' })
  schoolId: string;

  @Column({ type: 'integer' })
  version: number;

  @Column({ type: 'text' })
  text: string;

  @Column({ name: 'created_by', type: 'uuid', nullable: true })
  createdBy: string | null;

  @Column({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  createdAt: Date;
}
