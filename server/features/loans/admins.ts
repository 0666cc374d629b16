import type { EntityManager } from 'typeorm';
import { queueMail, type MailRequest } from '@/server/mail/queueMail';
import { neutralKit } from './lendingRules';
import type { Loan } from './loan.entity';

/** What admins are told of: a jar that was not there at take-out, or an objection that waits for their answer. */
type AdminNews = { readonly template: 'jar-absent'; readonly slots: readonly string[] } | { readonly template: 'objection-made' };

/** Mails the school's present admins; a borrower who is an admin hears of their own loan as its borrower only. */
export async function mailAdmins(tx: EntityManager, loan: Loan, news: AdminNews): Promise<void> {
  const about = { loanId: loan.id, kit: await neutralKit(tx, loan.kitId) };
  for (const toAccountId of await adminIds(tx)) {
    if (toAccountId === loan.borrowerId) continue;
    const to = { schoolId: loan.schoolId, toAccountId, dedupeKey: `${news.template}:${loan.id}` };
    const mail: MailRequest = news.template === 'jar-absent'
      ? { ...to, template: news.template, data: { ...about, slots: news.slots } }
      : { ...to, template: news.template, data: about };
    await queueMail(tx, mail);
  }
}

async function adminIds(tx: EntityManager): Promise<string[]> {
  const rows: { id: string }[] = await tx.query(
    "SELECT account_id AS id FROM membership WHERE school_id = current_school() AND ended_at IS NULL AND 'admin' = ANY(roles) ORDER BY account_id");
  return rows.map(({ id }) => id);
}
