import type { EntityManager } from 'typeorm';

/** The money of a decided settlement has moved (or none had to): marks it done, once. */
export async function finishSettlement(tx: EntityManager, loanId: string, now: Date): Promise<void> {
  await tx.query("UPDATE settlement SET state = 'done', done_at = $2 WHERE loan_id = $1 AND state = 'decided'", [loanId, now]);
}
