export const SHEET_PAGES = ['A4', 'Letter'] as const;
export const SHEET_SIZES = ['small', 'medium', 'large'] as const;
export type SheetPage = (typeof SHEET_PAGES)[number];
export type SheetSize = (typeof SHEET_SIZES)[number];

/** POST /labels: new labels for the kit and all its jars, or for those named; earlier ones become void. Idempotent. */
export interface IssueLabelsRequest { kitId: string; stoneIds?: string[]; includeKit?: boolean }
export interface IssuedLabel { id: string; code: string; kitNumber: string; slot: string | null }
export interface IssuedLabels { labels: IssuedLabel[]; voidedCount: number }

/** POST /labels/sheet answers application/pdf; `startAt` is 1 for the first place of the sheet */
export interface LabelSheetRequest { kitIds: string[]; page: SheetPage; size: SheetSize; startAt: number }

/** GET /labels/:code (signed in, any role): what was scanned, blind */
export type ScannedLabel =
  | { kind: 'kit'; valid: true; kitId: string; kitNumber: string; neutralTitle: string; openLoanId: string | null; mine: boolean; lendable: boolean }
  | { kind: 'jar'; valid: true; kitId: string; kitNumber: string; stoneId: string; slot: string; neutralDescription: string; openLoanId: string | null; mine: boolean }
  | { kind: 'void'; valid: false; kitNumber: string; slot: string | null; voidedAt: string };
