import type { EntityManager } from 'typeorm';
import { lendingRules } from '@/server/features/loans/lendingRules';
import { noSuchLoan } from '@/server/features/loans/loanState';
import { balancesOf, ledgerSum, statementLines } from '@/server/ledger/ledger.service';
import type { DepositRow, MoneyView, StatementView } from '@shared/api/money';
import { accountKinds, accountWords, transferWords } from '@shared/money';

const depositsMax = 300;

/** What the school holds, owes back and has kept, each deposit that is not finished, and what waits at the payment service. */
export async function moneyView(tx: EntityManager): Promise<MoneyView> {
  const { currency } = await lendingRules(tx);
  const balances = await balancesOf(tx, { currency });
  return {
    currency,
    heldMinor: balances.card_holds,
    chargedMinor: 0 - balances.deposits_of_students,
    keptMinor: 0 - balances.kept_deposits,
    deposits: await deposits(tx),
    unfinishedSteps: await unfinishedSteps(tx),
    ledgerSumMinor: await ledgerSum(tx),
  };
}

async function deposits(tx: EntityManager): Promise<DepositRow[]> {
  const rows: (Omit<DepositRow, 'amountMinor' | 'captureBefore'> & { amountMinor: string; captureBefore: Date | null })[] = await tx.query(
    `SELECT p.loan_id AS "loanId", k.number AS "kitNumber", a.name AS "borrowerName", p.amount_minor AS "amountMinor", p.currency, p.mode, p.state,
            CASE WHEN p.state = 'held' THEN p.capture_before END AS "captureBefore", p.payment_intent_id AS "paymentIntentId"
       FROM payment p JOIN loan l ON l.id = p.loan_id JOIN kit k ON k.id = l.kit_id JOIN account a ON a.id = l.borrower_id
      WHERE p.state <> 'cancelled'
      ORDER BY p.state NOT IN ('opening', 'open', 'held', 'charged'), p.created_at DESC LIMIT ${depositsMax}`,
  );
  return rows.map((row) => ({ ...row, amountMinor: Number(row.amountMinor), captureBefore: row.captureBefore?.toISOString() ?? null }));
}

/** Steps waiting for the payment service, and those it refused while the deposit is not settled: they need a person. */
async function unfinishedSteps(tx: EntityManager): Promise<number> {
  const [row]: { count: number }[] = await tx.query(
    `SELECT count(*)::int AS count FROM payment_step s JOIN payment p ON p.id = s.payment_id
      WHERE s.state = 'intended'
         OR (s.state = 'refused' AND s.kind <> 'open' AND NOT EXISTS (SELECT 1 FROM settlement t WHERE t.loan_id = p.loan_id AND t.state = 'done'))`);
  return row?.count ?? 0;
}

/** Every posting of a loan's deposit with what it left in each account. Its words are neutral: they name the kit's number only. */
export async function statement(tx: EntityManager, loanId: string): Promise<StatementView> {
  const [loan]: { currency: string; kitNumber: string }[] = await tx.query(
    'SELECT l.currency, k.number AS "kitNumber" FROM loan l JOIN kit k ON k.id = l.kit_id WHERE l.id = $1', [loanId]);
  if (loan === undefined) throw noSuchLoan();
  const balances = await balancesOf(tx, { loanId });
  const lines = await statementLines(tx, loanId);
  return {
    loanId,
    currency: loan.currency,
    lines: lines.map((line) => ({
      id: line.id, at: line.at.toISOString(), text: `Deposit for kit ${loan.kitNumber}: ${transferWords[line.kind]}`,
      amountMinor: line.amountMinor, account: accountWords[line.account],
    })),
    balances: accountKinds.filter((kind) => balances[kind] !== 0).map((kind) => ({ account: accountWords[kind], amountMinor: balances[kind] })),
  };
}
