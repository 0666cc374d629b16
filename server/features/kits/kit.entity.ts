import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { KitStanding } from '@shared/api/kits';

@Entity('kit')
export class Kit {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ name: 'school_id', type: 'uuid' })
  schoolId: string;

  @Column({ type: 'text' })
  number: string;

  /** For staff; it may say what the stones are. */
  @Column({ type: 'text' })
  title: string;

  /** What students see. */
  @Column({ name: 'neutral_title', type: 'text' })
  neutralTitle: string;

  @Column({ type: 'text', default: 'lendable' })
  standing: KitStanding;

  @Column({ name: 'standing_reason', type: 'text', default: '' })
  standingReason: string;

  @Column({ type: 'integer', default: 1 })
  version: number;

  @Column({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  createdAt: Date;
}
