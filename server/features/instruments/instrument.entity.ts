import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { InstrumentKind } from '@shared/api/instruments';

/** One instrument of a school's register. Units: ct for a balance, mm for a caliper, refractive index, °C. */
@Entity('instrument')
export class Instrument {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ name: 'school_id', type: 'uuid' })
  schoolId: string;

  @Column({ type: 'text' })
  kind: InstrumentKind;

  @Column({ type: 'text' })
  name: string;

  @Column({ type: 'double precision', nullable: true })
  resolution: number | null;

  /** Of one reading, k = 1. */
  @Column({ name: 'standard_uncertainty', type: 'double precision', nullable: true })
  standardUncertainty: number | null;

  @Column({ name: 'spot_uncertainty', type: 'double precision', nullable: true })
  spotUncertainty: number | null;

  @Column({ name: 'liquid_limit_ri', type: 'double precision', nullable: true })
  liquidLimitRi: number | null;

  @Column({ name: 'retired_at', type: 'timestamptz', nullable: true })
  retiredAt: Date | null;

  @Column({ type: 'integer', default: 1 })
  version: number;
}
