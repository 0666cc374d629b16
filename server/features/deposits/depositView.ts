import type { EntityManager } from 'typeorm';
import { lendingRules } from '@/server/features/loans/lendingRules';
import { Loan } from '@/server/features/loans/loan.entity';
import { noSuchLoan } from '@/server/features/loans/loanState';
import type { DepositView, PaymentState } from '@shared/api/loans';
import { depositMode, depositWords, holdLastsMs } from '@shared/lending';

interface PaymentRow {
  loanId: string;
  mode: 'hold' | 'charge';
  state: PaymentState;
  captureBefore: Date | null;
  securedAt: Date | null;
  keptMinor: string;
}

/** How the deposit of a loan stands, for its borrower. */
export async function depositOf(tx: EntityManager, loanId: string, now: Date): Promise<DepositView> {
  const loan = await tx.findOneBy(Loan, { id: loanId });
  const view = loan === null ? undefined : (await depositsOf(tx, [loan], now)).get(loan.id);
  if (view === undefined) throw noSuchLoan();
  return view;
}

/** The same for many loans at once. */
export async function depositsOf(tx: EntityManager, loans: readonly Loan[], now: Date): Promise<Map<string, DepositView>> {
  const rules = await lendingRules(tx);
  // A cancelled payment counts only where there is no other.
  const rows: PaymentRow[] = await tx.query(
    `SELECT DISTINCT ON (p.loan_id) p.loan_id AS "loanId", p.mode, p.state, p.capture_before AS "captureBefore", p.secured_at AS "securedAt",
            (SELECT coalesce(-sum(g.amount_minor), 0)::text FROM ledger_transfer t JOIN ledger_posting g ON g.transfer_id = t.id
               JOIN ledger_account a ON a.id = g.account_id WHERE t.payment_id = p.id AND a.kind = 'kept_deposits') AS "keptMinor"
       FROM payment p WHERE p.loan_id = ANY($1) ORDER BY p.loan_id, (p.state = 'cancelled'), p.created_at DESC`,
    [loans.map((loan) => loan.id)],
  );
  const payments = new Map(rows.map((row) => [row.loanId, row]));
  return new Map(loans.map((loan) => [loan.id, toView(loan, payments.get(loan.id), plannedMode(loan, rules, now))]));
}

/** Hold or charge, before anything was paid: what the loan's times and the card's usual week allow. */
export function plannedMode(loan: Loan, rules: { lateGraceHours: number; checkingDays: number }, now: Date): 'hold' | 'charge' | 'none' {
  if (loan.depositMinor === 0) return 'none';
  return depositMode({ dueAt: loan.dueAt, ...rules, holdUntil: new Date(now.getTime() + holdLastsMs) });
}

const ended: readonly string[] = ['released', 'kept', 'part_kept', 'refunded'];

function toView(loan: Loan, payment: PaymentRow | undefined, planned: DepositView['mode']): DepositView {
  const about = { amountMinor: loan.depositMinor, currency: loan.currency };
  // A page that was closed unpaid leaves a reserved loan as it was: it may be paid on another.
  if (payment === undefined || (payment.state === 'cancelled' && loan.state === 'reserved')) {
    const unpaid = { ...about, mode: planned, state: 'none', keptMinor: 0, returnedMinor: 0 } as const;
    return { ...unpaid, captureBefore: null, explanation: depositWords({ ...unpaid, secured: false }) };
  }
  const keptMinor = Number(payment.keptMinor);
  const paid = {
    ...about, mode: payment.mode, state: payment.state, keptMinor,
    returnedMinor: ended.includes(payment.state) ? loan.depositMinor - keptMinor : 0,
  };
  return {
    ...paid,
    captureBefore: payment.state === 'held' ? (payment.captureBefore?.toISOString() ?? null) : null,
    explanation: depositWords({ ...paid, secured: payment.securedAt !== null }),
  };
}
