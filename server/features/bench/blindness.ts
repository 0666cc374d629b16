import type { EntityManager } from 'typeorm';
import { forbidden } from '@/server/http/problem';

/** Why a member of staff may not see a kit's record just now; null when they may. */
export type BlindReason = 'own_loan' | 'reading_blind' | null;

/**
 * Staff are blind to a kit's titles, species, readings, photos, figures and verdicts
 * - while they are its borrower, until the loan is settled or cancelled; and
 * - as instructors, while a returned kit still wants their own first reading of a stone that somebody must read
 *   (a second reader must not know the record or the first readings before theirs are in).
 */
export async function blindReason(tx: EntityManager, accountId: string, kitId: string): Promise<BlindReason> {
  const [row] = await tx.query<{ own: boolean; reading: boolean }[]>(
    `SELECT l.borrower_id = $1 AS own,
            EXISTS (SELECT 1 FROM loan_stone s
                     WHERE s.loan_id = l.id AND s.ending IS NULL AND s.second_reading_wanted_at IS NOT NULL
                       AND NOT EXISTS (SELECT 1 FROM bench_submission b
                                        WHERE b.loan_id = s.loan_id AND b.stone_id = s.stone_id AND b.reader_id = $1))
              AND EXISTS (SELECT 1 FROM membership m
                           WHERE m.school_id = l.school_id AND m.account_id = $1 AND m.ended_at IS NULL AND 'instructor' = ANY (m.roles)) AS reading
       FROM loan l WHERE l.kit_id = $2 AND l.state NOT IN ('settled', 'cancelled')`,
    [accountId, kitId],
  );
  if (row?.own === true) return 'own_loan';
  return row?.reading === true ? 'reading_blind' : null;
}

/** Refuses with 403 and words when the account is blind to the kit. */
export async function refuseBlind(tx: EntityManager, accountId: string, kitId: string): Promise<void> {
  const reason = await blindReason(tx, accountId, kitId);
  if (reason === 'own_loan') {
    throw forbidden('You have this kit on loan, so its record stays closed to you until the loan is settled. Ask a colleague.', 'own_loan');
  }
  if (reason === 'reading_blind') {
    throw forbidden('A second reading of this kit is wanted. Its record opens to you once your own readings are in: go to the bench.', 'reading_blind');
  }
}
