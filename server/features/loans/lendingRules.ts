import type { EntityManager } from 'typeorm';
import type { DepositRule } from '@shared/api/school';

/** The school's settings that a loan follows. */
export interface LendingRules {
  readonly timeZone: string;
  readonly closingTime: string;
  readonly currency: string;
  readonly loanDays: number;
  readonly depositRule: DepositRule;
  readonly lateGraceHours: number;
  readonly checkingDays: number;
  readonly reservationMinutes: number;
  readonly objectionDays: number;
}

/** The rules of the school of this unit of work. */
export async function lendingRules(tx: EntityManager): Promise<LendingRules> {
  const [rules]: LendingRules[] = await tx.query(
    `SELECT time_zone AS "timeZone", closing_time AS "closingTime", currency, loan_days AS "loanDays", deposit_rule AS "depositRule",
            late_grace_hours AS "lateGraceHours", checking_days AS "checkingDays", reservation_minutes AS "reservationMinutes",
            objection_days AS "objectionDays"
       FROM school WHERE id = current_school()`,
  );
  if (rules === undefined) throw new Error('a unit of work without a school asked for its lending rules');
  return rules;
}

/** The only words for a kit that may leave the school's staff: its number and neutral title. */
export async function neutralKit(tx: EntityManager, kitId: string): Promise<{ kitNumber: string; neutralTitle: string }> {
  const [kit]: { kitNumber: string; neutralTitle: string }[] = await tx.query(
    'SELECT number AS "kitNumber", neutral_title AS "neutralTitle" FROM kit WHERE id = $1',
    [kitId],
  );
  if (kit === undefined) throw new Error(`loan of a kit that is not there: ${kitId}`);
  return kit;
}
