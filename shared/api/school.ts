/** How much a deposit is, from the replacement value of a kit's stones. */
export type DepositRule =
  | { kind: 'fixed'; amountMinor: number }
  /** `percent` of the kit's replacement value, at least `minimumMinor` and, where given, at most `maximumMinor`. */
  | { kind: 'share'; percent: number; minimumMinor: number; maximumMinor: number | null };

/** GET /school: every member may read it */
export interface SchoolView {
  id: string;
  name: string;
  /** IANA name, e.g. Europe/Dublin. */
  timeZone: string;
  /** ISO 4217. */
  currency: string;
  /** HH:MM in the school's time zone: loans are due at this time of their last day. */
  closingTime: string;
  loanDays: number;
  depositRule: DepositRule;
  lateGraceHours: number;
  /** How many days a bench check may take; counts when choosing between a hold and a charge. */
  checkingDays: number;
  /** How long an unpaid reservation keeps the kit. */
  reservationMinutes: number;
  /** How long a student may object after a settlement. */
  objectionDays: number;
}

/** PATCH /school (admin): only what changes */
export type SchoolChange = Partial<Omit<SchoolView, 'id'>>;

/** GET /school/terms */
export interface TermsView { current: TermsVersionView; versions: TermsVersionView[] }
export interface TermsVersionView { id: string; version: number; text: string; createdAt: string }
/** POST /school/terms (admin) */
export interface NewTermsRequest { text: string }
