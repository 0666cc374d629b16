import type { EntityManager } from 'typeorm';
import { In } from 'typeorm';
import { depositsOf } from '@/server/features/deposits/depositView';
import { outcomeOf } from '@/server/features/settlement/outcome';
import type { DepositView, LoanAction, LoanJar, LoanOutcome, LoanView } from '@shared/api/loans';
import { Loan } from './loan.entity';
import { noSuchLoan } from './loanState';
import { mayObject } from './objectToLoan';

/**
 * A loan as its borrower may see it: neutral titles and descriptions, slot letters, and nothing of what a stone is. Its
 * queries do not read species, values or verdicts; only an outcome that is open to the borrower says more.
 */
export async function loanView(tx: EntityManager, loanId: string, viewerId: string, now: Date): Promise<LoanView> {
  const [view] = await loanViews(tx, [loanId], viewerId, now);
  if (view === undefined) throw noSuchLoan();
  return view;
}

interface Parts {
  kits: Map<string, { number: string; neutralTitle: string }>;
  terms: Map<string, { versionId: string; text: string }>;
  currentTerms: { versionId: string; text: string };
  jars: Map<string, LoanJar[]>;
  deposits: Map<string, DepositView>;
}

/** The same for many loans, in the order of `loanIds`. */
export async function loanViews(tx: EntityManager, loanIds: readonly string[], viewerId: string, now: Date): Promise<LoanView[]> {
  if (loanIds.length === 0) return [];
  const loans = new Map((await tx.findBy(Loan, { id: In([...loanIds]) })).map((loan) => [loan.id, loan]));
  const parts = await readParts(tx, [...loans.values()], now);
  const views: LoanView[] = [];
  for (const id of loanIds) {
    const loan = loans.get(id);
    if (loan === undefined) continue;
    views.push(toView(loan, parts, { outcome: await outcomeOf(tx, id), isBorrower: loan.borrowerId === viewerId, now }));
  }
  return views;
}

async function readParts(tx: EntityManager, loans: readonly Loan[], now: Date): Promise<Parts> {
  const kits: { id: string; number: string; neutralTitle: string }[] = await tx.query(
    'SELECT id, number, neutral_title AS "neutralTitle" FROM kit WHERE id = ANY($1)', [loans.map((loan) => loan.kitId)]);
  const accepted = loans.flatMap((loan) => loan.termsVersionId ?? []);
  const terms: { versionId: string; text: string; version: number }[] = await tx.query(
    `SELECT id AS "versionId", text, version FROM terms_version
      WHERE id = ANY($1) OR version = (SELECT max(version) FROM terms_version) ORDER BY version DESC`, [accepted]);
  const jars: (Omit<LoanJar, 'outSeenAt'> & { loanId: string; outSeenAt: Date | null })[] = await tx.query(
    `SELECT ls.loan_id AS "loanId", ls.stone_id AS "stoneId", ls.slot, s.neutral_description AS "neutralDescription",
            ls.out_seen_at AS "outSeenAt", ls.out_condition AS "outCondition", ls.back_state AS "backState", ls.back_condition AS "backCondition"
       FROM loan_stone ls JOIN stone s ON s.id = ls.stone_id WHERE ls.loan_id = ANY($1) ORDER BY ls.slot`, [loans.map((loan) => loan.id)]);
  const byLoan = new Map<string, LoanJar[]>(loans.map((loan) => [loan.id, []]));
  for (const { loanId, outSeenAt, ...jar } of jars) byLoan.get(loanId)?.push({ ...jar, outSeenAt: outSeenAt?.toISOString() ?? null });
  return {
    kits: new Map(kits.map((kit) => [kit.id, kit])),
    terms: new Map(terms.map((row) => [row.versionId, row])),
    currentTerms: terms[0] ?? { versionId: '', text: '' },
    jars: byLoan,
    deposits: await depositsOf(tx, loans, now),
  };
}

function toView(loan: Loan, parts: Parts, at: { outcome: LoanOutcome | null; isBorrower: boolean; now: Date }): LoanView {
  const kit = parts.kits.get(loan.kitId);
  const jars = parts.jars.get(loan.id) ?? [];
  const deposit = parts.deposits.get(loan.id);
  if (kit === undefined || deposit === undefined) throw noSuchLoan();
  const terms = (loan.termsVersionId === null ? undefined : parts.terms.get(loan.termsVersionId)) ?? parts.currentTerms;
  return {
    id: loan.id,
    state: loan.state,
    kitId: loan.kitId,
    kitNumber: kit.number,
    neutralTitle: kit.neutralTitle,
    reservedUntil: loan.reservedUntil.toISOString(),
    outAt: loan.outAt?.toISOString() ?? null,
    dueAt: loan.dueAt.toISOString(),
    returnedAt: loan.returnedAt?.toISOString() ?? null,
    settledAt: loan.settledAt?.toISOString() ?? null,
    cancelReason: loan.cancelReason,
    overdue: isOverdue(loan, at.now),
    jars,
    terms: { versionId: terms.versionId, text: terms.text, acceptedAt: loan.termsAcceptedAt?.toISOString() ?? null },
    deposit,
    actions: actionsOf(loan, jars, at),
    outcome: at.outcome,
    version: loan.version,
  };
}

export const isOverdue = (loan: Pick<Loan, 'state' | 'dueAt'>, now: Date): boolean => loan.state === 'out' && loan.dueAt < now;

function actionsOf(loan: Loan, jars: readonly LoanJar[], at: { outcome: LoanOutcome | null; isBorrower: boolean; now: Date }): LoanAction[] {
  if (loan.state === 'out') return ['return'];
  if (loan.state === 'reserved') {
    const allSeen = jars.every((jar) => jar.outSeenAt !== null);
    const accepted = loan.termsAcceptedAt !== null;
    return [...(allSeen ? [] : ['scan_jars' as const]), ...(accepted ? [] : ['accept_terms' as const]), ...(allSeen && accepted ? ['pay' as const] : []), 'cancel'];
  }
  return at.isBorrower && mayObject(at.outcome, at.now) ? ['object'] : [];
}
