import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { StoneColour, StoneFlag, StoneShape } from '@shared/api/evidence';
import type { StoneStanding } from '@shared/api/kits';
import { minorUnits } from '@/server/database/transformers';

@Entity('stone')
export class Stone {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ name: 'school_id', type: 'uuid' })
  schoolId: string;

  @Column({ name: 'kit_id', type: 'uuid' })
  kitId: string;

  /** One capital letter, the jar's place in its kit. */
  @Column({ type: 'text' })
  slot: string;

  @Column({ type: 'text' })
  species: string;

  @Column({ type: 'text', nullable: true })
  colour: StoneColour | null;

  @Column({ type: 'text' })
  shape: StoneShape;

  @Column({ name: 'nominal_size', type: 'text', default: '' })
  nominalSize: string;

  /** What students see of the stone. */
  @Column({ name: 'neutral_description', type: 'text' })
  neutralDescription: string;

  @Column({ type: 'text', default: '' })
  marks: string;

  @Column({ type: 'text', default: '' })
  source: string;

  @Column({ name: 'replacement_value_minor', type: 'bigint', transformer: minorUnits })
  replacementValueMinor: number;

  @Column({ type: 'text', array: true, default: '{}' })
  flags: StoneFlag[];

  @Column({ type: 'text', default: 'in_kit' })
  standing: StoneStanding;

  @Column({ type: 'integer', default: 1 })
  version: number;

  @Column({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  createdAt: Date;
}
