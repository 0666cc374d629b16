import { Column, Entity, PrimaryColumn } from 'typeorm';

/** Says, later and with a reason, that a reading was a slip. The reading stays and stays visible. */
@Entity('reading_strike')
export class ReadingStrike {
  @PrimaryColumn({ name: 'reading_id', type: 'uuid' })
  readingId: string;

  @Column({ name: 'school_id', type: 'uuid' })
  schoolId: string;

  @Column({ name: 'struck_by', type: 'uuid' })
  struckBy: string;

  @Column({ type: 'text' })
  reason: string;

  @Column({ name: 'struck_at', type: 'timestamptz' })
  struckAt: Date;
}
