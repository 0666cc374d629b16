import type { EntityManager } from 'typeorm';
import type { SettlementRequest, SettlementView } from '@shared/api/settlement';
import { formatMoney } from '@shared/money';
import { dayMs } from '@shared/lending';
import { forbidden, invalid, notFound, refused } from '@/server/http/problem';
import { recordCustody } from '@/server/features/custody/custody.service';
import { settleDeposit } from '@/server/features/deposits/settle';
import { backOnShelf } from '@/server/features/kits/standing';
import { lockLoan, moveLoan } from '@/server/features/loans/loanState';
import type { Loan } from '@/server/features/loans/loan.entity';
import { queueMail } from '@/server/mail/queueMail';
import { Settlement } from './settlement.entity';
import { SettlementItem } from './settlementItem.entity';
import { settlementView } from './settlementView';

interface By { accountId: string; now: Date }
type Items = SettlementRequest['items'];

/** Shows the borrower what the school means to keep, before anything is kept. Proposing again replaces the proposal. */
export async function proposeKeep(tx: EntityManager, loanId: string, items: Items, by: By): Promise<void> {
  const loan = await settleableLoan(tx, loanId, by.accountId);
  const view = await checkedItems(tx, loan, items);
  if (items.length === 0) throw invalid('items', 'Name at least one reason and amount, or decide at once to release the whole deposit.');
  await store(tx, loan, items, { state: 'proposed', proposedBy: by.accountId, proposedAt: by.now, decidedBy: null, decidedAt: null });
  await mailKept(tx, loan, view, items, 'keep-proposed', by.now);
}

/** Decides the deposit, once: keeps the items' sum, releases the rest, settles the loan. */
export async function decide(tx: EntityManager, loanId: string, items: Items, by: By): Promise<void> {
  const loan = await settleableLoan(tx, loanId, by.accountId);
  const view = await checkedItems(tx, loan, items);
  const keptMinor = sum(items);
  await store(tx, loan, items, { state: 'decided', decidedBy: by.accountId, decidedAt: by.now });
  await moveLoan(tx, loan, 'settled', by.now);
  await recordCustody(tx, { schoolId: loan.schoolId, kitId: loan.kitId, loanId, kind: 'deposit_decided', actorId: by.accountId, at: by.now });
  if (view.stones.every((stone) => stone.ending === 'same' || stone.ending === 'accepted' || stone.ending === 'mixed_up')) {
    await backOnShelf(tx, { kitId: loan.kitId, schoolId: loan.schoolId, reason: 'Every stone is settled', actorId: by.accountId, loanId, now: by.now });
  }
  await settleDeposit(tx, loanId, { keepMinor: keptMinor, actorId: by.accountId, now: by.now });
  await mailKept(tx, loan, view, items, 'deposit-settled', by.now);
}

/** The school's answer to a borrower's objection; it is given once. */
export async function answerObjection(tx: EntityManager, loanId: string, answer: string, by: By): Promise<void> {
  const loan = await lockLoan(tx, loanId);
  refuseOwn(loan, by.accountId);
  const rows = await tx.query<unknown[]>('SELECT 1 FROM objection WHERE loan_id = $1 AND answer IS NULL', [loanId]);
  if (rows.length === 0) throw refused('no_objection', 'There is no unanswered objection to this settlement.');
  await tx.query('UPDATE objection SET answer = $2, answered_by = $3, answered_at = $4 WHERE loan_id = $1', [loanId, answer, by.accountId, by.now]);
  await recordCustody(tx, { schoolId: loan.schoolId, kitId: loan.kitId, loanId, kind: 'objection_answered', actorId: by.accountId, at: by.now });
}

async function settleableLoan(tx: EntityManager, loanId: string, accountId: string): Promise<Loan> {
  const loan = await lockLoan(tx, loanId);
  refuseOwn(loan, accountId);
  if (loan.state === 'settled') throw refused('settled_already', 'This loan is settled already. A deposit is decided once; open the loan to see how.');
  if (loan.state !== 'set_aside') throw refused('not_set_aside', 'This kit is not set aside. Its deposit is released by itself when every stone is the same.');
  return loan;
}

function refuseOwn(loan: Loan, accountId: string): void {
  if (loan.borrowerId === accountId) throw forbidden('You borrowed this kit, so another admin settles it.', 'own_loan');
}

const sum = (items: Items): number => items.reduce((total, item) => total + item.amountMinor, 0);

/** Refuses items for a stone that has no ground for a keep, and a sum above the deposit. */
async function checkedItems(tx: EntityManager, loan: Loan, items: Items): Promise<SettlementView> {
  const view = await settlementView(tx, loan.id);
  if (view === null) throw notFound();
  if (!view.ready) throw refused('not_ready', view.waitingFor);
  items.forEach((item, index) => {
    const stone = view.stones.find((one) => one.stoneId === item.stoneId);
    if (item.stoneId !== undefined && stone === undefined) throw invalid(`items[${index}].stoneId`, 'This stone is not part of the loan. Pick one of its jars.');
    if (stone !== undefined && !stone.mayKeep) {
      throw invalid(`items[${index}].stoneId`, `Jar ${stone.slot} ended as ${(stone.ending ?? 'open').replace('_', ' ')}, so nothing can be kept for it.`);
    }
  });
  const kept = sum(items);
  if (kept > 0 && !view.stones.some((stone) => stone.mayKeep)) {
    throw invalid('items', 'No stone of this loan gives a reason to keep money. Release the deposit.');
  }
  if (kept > loan.depositMinor) {
    throw invalid('items', `The items come to ${formatMoney(kept, loan.currency)}, more than the deposit of ${formatMoney(loan.depositMinor, loan.currency)}. Lower them.`);
  }
  return view;
}

async function store(tx: EntityManager, loan: Loan, items: Items, change: Partial<Settlement> & { state: Settlement['state'] }): Promise<void> {
  const keptMinor = sum(items);
  const row = { schoolId: loan.schoolId, keptMinor, releasedMinor: loan.depositMinor - keptMinor, currency: loan.currency, ...change };
  await tx.upsert(Settlement, { loanId: loan.id, ...row }, ['loanId']);
  await tx.delete(SettlementItem, { loanId: loan.id });
  if (items.length === 0) return;
  await tx.createQueryBuilder().insert().into(SettlementItem)
    .values(items.map((item) => ({ schoolId: loan.schoolId, loanId: loan.id, stoneId: item.stoneId ?? null, reason: item.reason, amountMinor: item.amountMinor })))
    .updateEntity(false).execute();
}

async function mailKept(tx: EntityManager, loan: Loan, view: SettlementView, items: Items, template: 'keep-proposed' | 'deposit-settled', now: Date): Promise<void> {
  const [row] = await tx.query<{ kitNumber: string; neutralTitle: string; days: number }[]>(
    `SELECT k.number AS "kitNumber", k.neutral_title AS "neutralTitle", s.objection_days AS days
       FROM kit k JOIN school s ON s.id = k.school_id WHERE k.id = $1`, [loan.kitId]);
  if (row === undefined) return;
  const kept = sum(items);
  const data = {
    loanId: loan.id,
    kit: { kitNumber: row.kitNumber, neutralTitle: row.neutralTitle },
    kept: { amountMinor: kept, currency: loan.currency },
    released: { amountMinor: loan.depositMinor - kept, currency: loan.currency },
    items: items.map((item) => {
      const stone = view.stones.find((one) => one.stoneId === item.stoneId);
      return { amountMinor: item.amountMinor, currency: loan.currency, reason: item.reason, ...(stone ? { slot: stone.slot, stone: stone.speciesName } : {}) };
    }),
    objectBy: new Date(now.getTime() + row.days * dayMs).toISOString(),
  };
  const to = { schoolId: loan.schoolId, toAccountId: loan.borrowerId, data };
  if (template === 'deposit-settled') await queueMail(tx, { ...to, template, dedupeKey: `deposit-settled:${loan.id}` });
  else await queueMail(tx, { ...to, template, dedupeKey: `keep-proposed:${loan.id}:${now.getTime()}` });
}
