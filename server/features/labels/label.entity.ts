import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A printed code. Without a stone it is the kit's own label, otherwise that jar's. Reprinting voids the earlier one. */
@Entity('label')
export class Label {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ name: 'school_id', type: 'uuid' })
  schoolId: string;

  @Column({ type: 'character', length: 12 })
  code: string;

  @Column({ name: 'kit_id', type: 'uuid' })
  kitId: string;

  @Column({ name: 'stone_id', type: 'uuid', nullable: true })
  stoneId: string | null;

  @Column({ name: 'issued_by', type: 'uuid' })
  issuedBy: string;

  @Column({ name: 'issued_at', type: 'timestamptz' })
  issuedAt: Date;

  @Column({ name: 'voided_at', type: 'timestamptz', nullable: true })
  voidedAt: Date | null;
}
