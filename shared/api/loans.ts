import type { PersonRef } from './common';

export type LoanState = 'reserved' | 'out' | 'returned' | 'checking' | 'set_aside' | 'settled' | 'cancelled';
export type CancelReason = 'by_student' | 'by_staff' | 'abandoned' | 'jar_absent';
export type StoneEnding = 'same' | 'accepted' | 'missing' | 'damaged' | 'different' | 'mixed_up';
export type BackState = 'seen' | 'missing' | 'damaged';
export type PaymentState = 'opening' | 'open' | 'held' | 'charged' | 'released' | 'kept' | 'part_kept' | 'refunded' | 'cancelled';

/** GET /browse/kits (student): kits that can be taken out now, under neutral titles */
export interface BrowseKit { id: string; number: string; neutralTitle: string; stoneCount: number; available: boolean; depositMinor: number; currency: string; dueAtIfTakenNow: string }

/** POST /loans {code | kitId, borrowerId?}: reserves the kit at once; staff may name a borrower. Idempotent. */
export interface StartLoanRequest { code?: string; kitId?: string; borrowerId?: string }
/** POST /loans/:loanId/jars: one jar scanned (code) or ticked by staff (stoneId), with its condition; `absent` stops the loan */
export interface SeeJarRequest { code?: string; stoneId?: string; condition?: string; absent?: boolean }
/** POST /loans/:loanId/terms */
export interface AcceptTermsRequest { termsVersionId: string }
/** POST /loans/:loanId/payment (idempotent): the hosted page to pay the deposit on; `null` when no deposit is due and the kit is out */
export interface OpenPaymentView { url: string | null; loan: LoanView }
/** POST /loans/:loanId/cancel */
export interface CancelLoanRequest { reason?: string }
/** POST /loans/:loanId/return: what is said of every jar. Idempotent. */
export interface ReturnLoanRequest { stones: { stoneId: string; state: BackState; condition?: string }[] }
/** POST /loans/:loanId/objection */
export interface ObjectionRequest { text: string }

/** GET /loans/:loanId for the borrower, and for staff who are the borrower: blind. Also the items of GET /loans (mine). */
export interface LoanView {
  id: string;
  state: LoanState;
  kitId: string;
  kitNumber: string;
  neutralTitle: string;
  reservedUntil: string;
  outAt: string | null;
  dueAt: string;
  returnedAt: string | null;
  settledAt: string | null;
  cancelReason: CancelReason | null;
  overdue: boolean;
  jars: LoanJar[];
  terms: { versionId: string; text: string; acceptedAt: string | null };
  deposit: DepositView;
  /** What the borrower may do now. */
  actions: LoanAction[];
  outcome: LoanOutcome | null;
  version: number;
}
export type LoanAction = 'scan_jars' | 'accept_terms' | 'pay' | 'cancel' | 'return' | 'object';

export interface LoanJar {
  stoneId: string;
  slot: string;
  neutralDescription: string;
  outSeenAt: string | null;
  outCondition: string;
  backState: BackState | null;
  backCondition: string;
}

export interface DepositView {
  amountMinor: number;
  currency: string;
  mode: 'hold' | 'charge' | 'none';
  state: PaymentState | 'none';
  /** Said before paying: held on the card or charged and paid back, and why. */
  explanation: string;
  keptMinor: number;
  returnedMinor: number;
  /** A hold lapses here by itself. */
  captureBefore: string | null;
}

/** Open only once a settlement is proposed or decided, or every stone was the same. */
export interface LoanOutcome {
  state: 'proposed' | 'decided' | 'done';
  keptMinor: number;
  releasedMinor: number;
  currency: string;
  items: { reason: string; amountMinor: number; slot: string | null }[];
  /** What became of each jar; findings are present only where money is proposed to be kept for that stone. */
  stones: { slot: string; neutralDescription: string; ending: StoneEnding | null; finding: string | null }[];
  objectUntil: string | null;
  objection: { text: string; madeAt: string; answer: string | null; answeredAt: string | null } | null;
}

/** GET /staff/loans?state=… and GET /staff/loans/:loanId (admin, instructor; refused for one's own loan) */
export interface StaffLoanRow {
  id: string;
  kitId: string;
  kitNumber: string;
  title: string;
  borrower: PersonRef;
  state: LoanState;
  dueAt: string;
  overdue: boolean;
  depositMinor: number;
  currency: string;
  depositState: PaymentState | 'none';
  /** A short word on what is open, e.g. which jar differs. */
  open: string;
}
export interface StaffLoanView extends StaffLoanRow { loan: LoanView; custody: CustodyEventView[]; ownLoan: boolean }

/** GET /kits/:kitId/custody and GET /stones/:stoneId/custody (staff) */
export interface CustodyEventView {
  id: string;
  kind: string;
  /** In words, e.g. "Taken out by Ada Student". */
  text: string;
  at: string;
  actor: PersonRef | null;
  slot: string | null;
  loanId: string | null;
}
