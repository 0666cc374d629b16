import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { Attribute, CategoryValue, Observer } from '@shared/api/evidence';

/**
 * One reading as it was taken: inserted, never changed or deleted (the application holds no such grant).
 * Exactly one of `value`, `category` and `overLimit` is set. Two weighings set `value` to the SG that follows from
 * them and keep all three figures; their `u` is then that of each weighing, in carats, and `uInstrument` stays null.
 */
@Entity('reading')
export class Reading {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ name: 'school_id', type: 'uuid' })
  schoolId: string;

  @Column({ name: 'stone_id', type: 'uuid' })
  stoneId: string;

  @Column({ type: 'text' })
  purpose: 'intake' | 'check';

  @Column({ name: 'loan_id', type: 'uuid', nullable: true })
  loanId: string | null;

  @Column({ name: 'submission_id', type: 'uuid', nullable: true })
  submissionId: string | null;

  @Column({ name: 'reader_id', type: 'uuid' })
  readerId: string;

  @Column({ type: 'text' })
  observer: Observer;

  @Column({ type: 'text' })
  attribute: Attribute;

  @Column({ type: 'double precision', nullable: true })
  value: number | null;

  @Column({ type: 'text', nullable: true })
  category: CategoryValue | null;

  /** The contact liquid's limit, where the stone read above it. */
  @Column({ name: 'over_limit', type: 'double precision', nullable: true })
  overLimit: number | null;

  @Column({ name: 'air_ct', type: 'double precision', nullable: true })
  airCt: number | null;

  @Column({ name: 'water_ct', type: 'double precision', nullable: true })
  waterCt: number | null;

  @Column({ name: 'water_c', type: 'double precision', nullable: true })
  waterC: number | null;

  /** Standard uncertainty in the attribute's unit (of each weighing, ct, where there are weighings); null for categories. */
  @Column({ type: 'double precision', nullable: true })
  u: number | null;

  /** The part of `u` that belongs to the instrument and is not reduced by repeats. */
  @Column({ name: 'u_instrument', type: 'double precision', nullable: true })
  uInstrument: number | null;

  @Column({ name: 'instrument_id', type: 'uuid', nullable: true })
  instrumentId: string | null;

  @Column({ type: 'text', default: '' })
  note: string;

  @Column({ name: 'taken_at', type: 'timestamptz' })
  takenAt: Date;

  /** Order within one entry. */
  @Column({ type: 'integer', default: 0 })
  position: number;
}
