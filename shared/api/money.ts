/** GET /money (admin) */
export interface MoneyView {
  currency: string;
  heldMinor: number;
  chargedMinor: number;
  keptMinor: number;
  deposits: DepositRow[];
  /** Steps at the payment service that have not finished. */
  unfinishedSteps: number;
  /** Sum of all ledger balances; anything but 0 is an error to report. */
  ledgerSumMinor: number;
}
export interface DepositRow {
  loanId: string;
  kitNumber: string;
  borrowerName: string;
  amountMinor: number;
  currency: string;
  mode: 'hold' | 'charge';
  state: string;
  captureBefore: string | null;
  paymentIntentId: string | null;
}

/** GET /loans/:loanId/statement (borrower or admin) */
export interface StatementView {
  loanId: string;
  currency: string;
  lines: { id: string; at: string; text: string; amountMinor: number; account: string }[];
  balances: { account: string; amountMinor: number }[];
}
