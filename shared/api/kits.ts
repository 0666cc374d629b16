import type { CategoryValue, Attribute, MeasuredValue, OverLimit, RecordGap, StoneColour, StoneFlag, StoneShape } from './evidence';
import type { PersonRef } from './common';

export type KitStanding = 'lendable' | 'set_aside' | 'retired';
export type StoneStanding = 'in_kit' | 'missing' | 'damaged' | 'different' | 'retired';
/** Where a kit is now: its standing, or the state of its open loan; `incomplete` when a record is not yet complete enough to lend it. */
export type KitPlace = 'shelf' | 'incomplete' | 'reserved' | 'out' | 'returned' | 'checking' | 'set_aside' | 'retired';

/** GET /kits (staff): one row of the list */
export interface KitRow {
  id: string;
  number: string;
  title: string;
  neutralTitle: string;
  place: KitPlace;
  stoneCount: number;
  gapCount: number;
  openLoanId: string | null;
  dueAt: string | null;
}

/** GET /kits/:kitId (staff) */
export interface KitView extends KitRow {
  standing: KitStanding;
  standingReason: string;
  version: number;
  stones: StoneRow[];
  label: LabelRef | null;
  /** Sum of its stones' replacement values. */
  replacementValueMinor: number;
  depositMinor: number;
  currency: string;
}

export interface LabelRef { code: string; issuedAt: string }

export interface StoneRow {
  id: string;
  slot: string;
  species: string;
  speciesName: string;
  neutralDescription: string;
  standing: StoneStanding;
  gaps: RecordGap[];
  label: LabelRef | null;
  values: RecordedValueView[];
}

/** One recorded value with the readings behind it. */
export interface RecordedValueView {
  attribute: Attribute;
  /** A number with its uncertainty, an index over the liquid's limit, or a category. */
  value: MeasuredValue | OverLimit | CategoryValue;
  readingCount: number;
}

/** GET /stones/:stoneId (staff) */
export interface StoneView extends StoneRow {
  kitId: string;
  kitNumber: string;
  colour: StoneColour | null;
  shape: StoneShape;
  nominalSize: string;
  marks: string;
  source: string;
  replacementValueMinor: number;
  currency: string;
  flags: StoneFlag[];
  version: number;
  readings: ReadingView[];
  photos: PhotoView[];
}

export interface ReadingView {
  id: string;
  attribute: Attribute;
  value: number | 'over_limit' | CategoryValue;
  u: number | null;
  limit: number | null;
  weighing: { airCt: number; waterCt: number; waterC: number } | null;
  instrument: { id: string; name: string } | null;
  reader: PersonRef;
  takenAt: string;
  note: string;
  struck: { reason: string; by: PersonRef; at: string } | null;
}

/** POST /stones/:stoneId/photos (multipart: the file as `photo`, a `note`, the `loanId` whose return it documents) answers a PhotoView; GET and DELETE /photos/:photoId; GET /photos/:photoId/thumbnail (staff) */
export interface PhotoView { id: string; url: string; thumbnailUrl: string; width: number; height: number; note: string; createdAt: string }

/** POST /kits */
export interface NewKitRequest { number: string; title: string; neutralTitle: string }
/** PATCH /kits/:kitId; lending again after it was set aside needs a reason */
export interface KitChange { version: number; title?: string; neutralTitle?: string; standing?: KitStanding; standingReason?: string }

/** POST /kits/:kitId/stones */
export interface NewStoneRequest {
  slot: string;
  species: string;
  colour?: StoneColour | null;
  shape: StoneShape;
  nominalSize?: string;
  neutralDescription: string;
  marks?: string;
  source?: string;
  replacementValueMinor: number;
  flags?: StoneFlag[];
}
/** PATCH /stones/:stoneId */
export interface StoneChange extends Partial<NewStoneRequest> { version: number; standing?: StoneStanding }

/**
 * One reading as it is entered, at intake and at the bench. Exactly one of `value`, `category`, `overLimit: true` or the three weighing fields.
 * The uncertainty comes from the instrument's register entry.
 */
export interface ReadingEntry {
  attribute: Attribute;
  value?: number;
  category?: CategoryValue;
  overLimit?: boolean;
  airCt?: number;
  waterCt?: number;
  waterC?: number;
  instrumentId?: string;
  note?: string;
}
/** POST /stones/:stoneId/readings (intake). Idempotent. */
export interface IntakeReadingsRequest { readings: ReadingEntry[] }
/** POST /readings/:readingId/strike */
export interface StrikeRequest { reason: string }
