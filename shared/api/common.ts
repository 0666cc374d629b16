/** What several requests share. Times are ISO 8601 in UTC, ids are UUIDs, money is whole minor units of an ISO 4217 currency. */
export type Role = 'student' | 'instructor' | 'admin';

export interface Money { amountMinor: number; currency: string }

/** One page of a list; `nextCursor` is null on the last page and is passed back as `?cursor=`. */
export interface Page<T> { items: T[]; nextCursor: string | null }

export interface PersonRef { id: string; name: string }

/** RFC 9457 problem document with our own members. */
export interface ProblemDocument {
  type: string;
  title: string;
  status: number;
  /** For people, ending with the next step. */
  detail: string;
  /** For machines. */
  code: string;
  errors: { field: string; message: string }[];
  requestId: string;
}
