import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { CustodyDetail, CustodyKind } from './custodyKinds';

/** Append-only: one thing that happened to a kit or one of its stones. */
@Entity('custody_event')
export class CustodyEvent {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'bigint', insert: false, update: false })
  seq: string;

  @Column({ type: 'uuid', name: 'school_id' })
  schoolId: string;

  @Column({ type: 'uuid', name: 'kit_id' })
  kitId: string;

  @Column({ type: 'uuid', name: 'stone_id', nullable: true })
  stoneId: string | null;

  @Column({ type: 'uuid', name: 'loan_id', nullable: true })
  loanId: string | null;

  @Column({ type: 'text' })
  kind: CustodyKind;

  @Column({ type: 'uuid', name: 'actor_id', nullable: true })
  actorId: string | null;

  @Column({ type: 'uuid', name: 'for_account_id', nullable: true })
  forAccountId: string | null;

  @Column({ type: 'jsonb' })
  detail: CustodyDetail;

  @Column({ type: 'timestamptz' })
  at: Date;
}
