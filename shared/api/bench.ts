import type { Attribute, VerdictResponse, VerdictWord, RecordGap, StoneFlag } from './evidence';
import type { PersonRef } from './common';
import type { BackState, StoneEnding } from './loans';
import type { ReadingEntry, ReadingView, RecordedValueView, PhotoView } from './kits';

/** GET /bench: returned kits and second readings wanted; never the reader's own loans */
export interface BenchRow {
  loanId: string;
  kitNumber: string;
  neutralTitle: string;
  state: 'returned' | 'checking' | 'set_aside';
  returnedAt: string;
  stoneCount: number;
  endedCount: number;
  /** This reader is wanted as second reader. */
  secondReadingWanted: boolean;
  mine: boolean;
}

/** GET /bench */
export interface BenchList { items: BenchRow[] }

/** POST /bench/:loanId/opening {code}: the check begins with a scan of the kit. Idempotent. */
export interface OpenBenchRequest { code: string }
/** POST /bench/:loanId/jars: each jar scanned or said missing */
export interface BenchJarRequest { code?: string; stoneId?: string; state: BackState; condition?: string }

/** GET /bench/:loanId */
export interface BenchView {
  loanId: string;
  kitId: string;
  kitNumber: string;
  neutralTitle: string;
  state: 'returned' | 'checking' | 'set_aside' | 'settled';
  opened: boolean;
  stones: BenchStone[];
  /** All stones have their end and no money question is open. */
  complete: boolean;
}

export type BenchStep =
  | 'scan' | 'read' | 'read_more' | 'second_reader' | 'two_people' | 'admin' | 'ended';

export interface BenchStone {
  stoneId: string;
  slot: string;
  neutralDescription: string;
  marks: string;
  flags: StoneFlag[];
  backState: BackState | null;
  backCondition: string;
  benchState: BackState | null;
  /** What is wanted next, for this reader. */
  step: BenchStep;
  ending: StoneEnding | null;
  /** Attributes to offer for a first, blind entry; the same for every stone of a kind of lab, never a hint of the record. */
  suggested: Attribute[];
  /** Null until this reader's own first entry is in. */
  opened: OpenedStone | null;
}

/** The record beside the readings, shown after the reader's own first entry. */
export interface OpenedStone {
  species: string;
  speciesName: string;
  record: RecordedValueView[];
  gaps: RecordGap[];
  readings: (ReadingView & { pass: 1 | 2 })[];
  photos: PhotoView[];
  verdicts: BenchVerdict[];
  acceptances: { by: PersonRef; reason: string; at: string }[];
}

export interface BenchVerdict {
  id: string;
  basis: 'first' | 'second' | 'pooled';
  verdict: VerdictWord;
  result: VerdictResponse;
  /** In words, e.g. "Extremely strong support for another stone. Glass fits best." */
  headline: string;
  computedAt: string;
}

/** POST /bench/:loanId/stones/:stoneId/readings (idempotent): a reader's entry; the answer holds the opened record and the verdict */
export interface BenchReadingsRequest { readings: ReadingEntry[] }
/** POST /bench/:loanId/stones/:stoneId/second-reading: ask a colleague */
/** POST /bench/:loanId/stones/:stoneId/acceptance: one of two people */
export interface AcceptStoneRequest { reason: string }
/** POST /bench/:loanId/stones/:stoneId/ending (admin): missing, damaged, or jars put right by hand */
export interface EndStoneRequest { ending: 'missing' | 'damaged' | 'mixed_up'; reason: string }

/** POST /verdicts/:verdictId/recomputation (staff): a stored verdict computed again from what was stored with it */
export interface RecomputedVerdict { stored: VerdictResponse; again: VerdictResponse; equal: boolean }
