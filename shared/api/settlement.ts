import type { PersonRef } from './common';
import type { LoanOutcome, StoneEnding } from './loans';

/** GET /settlements (admin): loans whose money waits for a person */
/** GET /settlements/:loanId (admin) */
export interface SettlementView {
  loanId: string;
  kitId: string;
  kitNumber: string;
  title: string;
  borrower: PersonRef;
  depositMinor: number;
  currency: string;
  /** Null until something is proposed. */
  outcome: LoanOutcome | null;
  stones: SettlementStone[];
  /** Every stone has its end: money can be decided. */
  ready: boolean;
  /** Why it cannot be decided yet, in words; empty when ready. */
  waitingFor: string;
}

export interface SettlementStone {
  stoneId: string;
  slot: string;
  speciesName: string;
  ending: StoneEnding | null;
  reason: string;
  /** Two readers, or an end that needs no verdict: money may be kept for it. */
  mayKeep: boolean;
  replacementValueMinor: number;
}

/** PUT /settlements/:loanId/proposal (admin): shown to the student before anything is kept */
/** POST /settlements/:loanId/decision (admin, idempotent): once; keeps the items' sum, releases the rest */
export interface SettlementRequest { items: { stoneId?: string; reason: string; amountMinor: number }[] }
/** POST /settlements/:loanId/objection-answer (admin) */
export interface ObjectionAnswerRequest { answer: string }

/** GET /settlements */
export interface SettlementList { items: SettlementView[] }
