import type { Role } from '@shared/permissions';

/** The only words for a kit that a borrower may read before a stone is opened to them. Never the kit's true title. */
export interface NeutralKit {
  readonly kitNumber: string;
  readonly neutralTitle: string;
}

/** The only words for a stone that a borrower may read before it is opened: its letter and what anyone can see. */
export interface NeutralStone {
  readonly slot: string;
  readonly neutralDescription: string;
}

export interface Amount {
  readonly amountMinor: number;
  /** ISO 4217. */
  readonly currency: string;
}

interface LoanMail {
  readonly loanId: string;
  readonly kit: NeutralKit;
}

/** A stone of a settled loan. A keep has been proposed, so fairness wins and the stone may be named. */
export interface KeptItem extends Amount {
  /** Absent for an item that concerns the whole kit. */
  readonly slot?: string;
  /** What the school says the stone is, for instance "topaz, 8×6 oval". */
  readonly stone?: string;
  readonly reason: string;
}

/**
 * What each mail is made from. School mail gets the school's name and time zone from the school itself, and the
 * addressee's name from their account; times are ISO 8601 in UTC.
 *
 * Mail to borrowers holds no species, reading, verdict, figure or true title: there is no field for one, and the
 * renderer reads the fields listed here and nothing else. `keep-proposed` and `deposit-settled` alone may say more.
 * A second reader's mail is as blind, because they must not know what the first reader found.
 */
export interface MailData {
  /** Account mail: belongs to no school. */
  'password-reset': { readonly token: string; readonly expiresAt: string };
  'invitation': {
    readonly token: string;
    readonly expiresAt: string;
    readonly roles: readonly Role[];
    readonly inviterName: string;
    readonly inviteeName?: string;
  };
  /** Receipt of a take-out. */
  'loan-started': LoanMail & {
    readonly dueAt: string;
    readonly stones: readonly NeutralStone[];
    readonly deposit: (Amount & { readonly mode: 'hold' | 'charge' }) | null;
  };
  /** Receipt: the kit is in the return box. */
  'kit-returned': LoanMail & {
    readonly returnedAt: string;
    readonly missingSlots: readonly string[];
    readonly damagedSlots: readonly string[];
  };
  /** Every stone is the recorded one: the verdict and the release in one mail. */
  'deposit-released': LoanMail & { readonly deposit: (Amount & { readonly mode: 'hold' | 'charge' }) | null };
  'kit-set-aside': LoanMail & { readonly slots: readonly string[]; readonly deposit: Amount | null };
  /** To second instructors and admins: jars that want a second reader's readings or an admin's word. */
  'second-reading-wanted': LoanMail & { readonly slots: readonly string[] };
  /** The school proposes to keep something; nothing has moved yet. */
  'keep-proposed': LoanMail & { readonly kept: Amount; readonly released: Amount; readonly items: readonly KeptItem[]; readonly objectBy: string };
  'deposit-settled': LoanMail & { readonly kept: Amount; readonly released: Amount; readonly items: readonly KeptItem[]; readonly objectBy: string };
  /** The payment came after the booking had lapsed: it was cancelled (or paid back). */
  'payment-too-late': LoanMail & { readonly deposit: Amount & { readonly mode: 'hold' | 'charge' } };
  /** A hold that was about to lapse was charged whole, so that the check can be finished. Not a keep. */
  'hold-secured': LoanMail & { readonly deposit: Amount };
  /** To admins: a jar was not there at take-out, and the kit is set aside. */
  'jar-absent': LoanMail & { readonly slots: readonly string[] };
  /** To admins: a borrower objects to what is, or is meant to be, kept. */
  'objection-made': LoanMail;
  'loan-cancelled': LoanMail & { readonly reason: 'by_student' | 'by_staff' | 'abandoned' | 'jar_absent'; readonly absentSlots?: readonly string[] };
}

export type MailTemplate = keyof MailData;
export type AccountMailTemplate = 'password-reset';
export type SchoolMailTemplate = Exclude<MailTemplate, AccountMailTemplate>;
