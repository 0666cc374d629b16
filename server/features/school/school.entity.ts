import { Column, Entity, PrimaryColumn } from 'typeorm';
import type { DepositRule } from '@shared/api/school';

@Entity('school')
export class School {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'text' })
  name: string;

  @Column({ name: 'time_zone', type: 'text' })
  timeZone: string;

  @Column({ type: 'char', length: 3 })
  currency: string;

  @Column({ name: 'closing_time', type: 'text', default: '17:00' })
  closingTime: string;

  @Column({ name: 'loan_days', type: 'integer', default: 3 })
  loanDays: number;

  @Column({ name: 'deposit_rule', type: 'jsonb' })
  depositRule: DepositRule;

  @Column({ name: 'late_grace_hours', type: 'integer', default: 24 })
  lateGraceHours: number;

  @Column({ name: 'checking_days', type: 'integer', default: 2 })
  checkingDays: number;

  @Column({ name: 'reservation_minutes', type: 'integer', default: 45 })
  reservationMinutes: number;

  @Column({ name: 'objection_days', type: 'integer', default: 14 })
  objectionDays: number;

  @Column({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  createdAt: Date;
}
