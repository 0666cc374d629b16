import type { EntityManager } from 'typeorm';

/** The school's present admins, for mail. */
export async function adminIds(tx: EntityManager): Promise<string[]> {
  const rows: { id: string }[] = await tx.query(
    "SELECT account_id AS id FROM membership WHERE school_id = current_school() AND ended_at IS NULL AND 'admin' = ANY(roles) ORDER BY account_id");
  return rows.map(({ id }) => id);
}
