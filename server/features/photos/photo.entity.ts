import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A photo of a stone; the picture itself is in storage under `storageKey`. */
@Entity('photo')
export class Photo {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ name: 'school_id', type: 'uuid' })
  schoolId: string;

  @Column({ name: 'stone_id', type: 'uuid' })
  stoneId: string;

  @Column({ name: 'loan_id', type: 'uuid', nullable: true })
  loanId: string | null;

  @Column({ name: 'storage_key', type: 'text' })
  storageKey: string;

  @Column({ type: 'text' })
  mime: string;

  @Column({ type: 'integer' })
  width: number;

  @Column({ type: 'integer' })
  height: number;

  @Column({ type: 'text', default: '' })
  note: string;

  @Column({ name: 'created_by', type: 'uuid' })
  createdBy: string;

  @Column({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  createdAt: Date;

  @Column({ name: 'removed_at', type: 'timestamptz', nullable: true })
  removedAt: Date | null;
}
