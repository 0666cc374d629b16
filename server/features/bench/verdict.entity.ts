import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { EngineSettings } from '@shared/evidence';
import type { VerdictRequest, VerdictResponse, VerdictWord } from '@shared/api/evidence';

export type VerdictBasis = 'first' | 'second' | 'pooled';

/** Append-only: what the engine said, with everything it was told, so that it can be computed again to the same digits. */
@Entity('verdict')
export class Verdict {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'uuid', name: 'loan_id' })
  loanId: string;

  @Column({ type: 'uuid', name: 'stone_id' })
  stoneId: string;

  @Column({ type: 'text' })
  basis: VerdictBasis;

  @Column({ type: 'text' })
  verdict: VerdictWord;

  @Column({ type: 'double precision', name: 'log10_lr' })
  log10Lr: number;

  @Column({ type: 'text' })
  engine: string;

  /** The engine settings in full, defaults included. */
  @Column({ type: 'jsonb' })
  settings: EngineSettings;

  @Column({ type: 'jsonb' })
  request: VerdictRequest;

  @Column({ type: 'jsonb' })
  result: VerdictResponse;

  @Column({ type: 'timestamptz', name: 'computed_at' })
  computedAt: Date;

  @Column({ type: 'bigint', insert: false, update: false })
  seq: string;
}
