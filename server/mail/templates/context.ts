/** What every letter may use beside its own data. */
export interface LetterContext {
  readonly publicUrl: string;
  /** From the addressee's account; absent for an address without one. */
  readonly recipientName?: string;
}

export interface SchoolLetterContext extends LetterContext {
  readonly school: { readonly name: string; readonly timeZone: string };
}
