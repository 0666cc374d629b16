import type { VerdictWord } from '@shared/api/evidence';
import type { StoneEnding } from '@shared/api/loans';

/** What the bench knows of one stone of a loan. */
export interface StoneProgress {
  readonly ending: StoneEnding | null;
  readonly benchState: 'seen' | 'missing' | 'damaged' | null;
  readonly firstReaderId: string | null;
  readonly secondReaderId: string | null;
  /** Newest verdict on each basis. */
  readonly first: VerdictWord | null;
  readonly second: VerdictWord | null;
  readonly pooled: VerdictWord | null;
  readonly secondReadingWanted: boolean;
  readonly acceptedBy: readonly string[];
}

/** The end that verdicts alone give: same, or different once two readers found it; null while a person or reading is wanted. */
export function endingFromVerdicts(stone: Pick<StoneProgress, 'first' | 'second' | 'pooled'>): StoneEnding | null {
  if (stone.second === null) return stone.first === 'same' ? 'same' : null;
  if (stone.first === 'different' && stone.second === 'different') return 'different';
  // The two readers do not agree: all readings are pooled, and a pooled "different" still rests on one reader's finding only.
  return stone.pooled === 'same' ? 'same' : null;
}

export type StoneStep = 'scan' | 'read' | 'read_more' | 'second_reader' | 'two_people' | 'admin' | 'ended';

/**
 * What is wanted next for a stone, for this reader.
 * `read` is a first, blind entry; `read_more` adds to one's own; `admin` waits for the admin's word on a missing or damaged stone.
 */
export function nextStep(stone: StoneProgress, readerId: string, readingsLeft: boolean): StoneStep {
  if (stone.ending !== null) return 'ended';
  if (stone.benchState === null) return 'scan';
  if (stone.benchState === 'missing' || stone.benchState === 'damaged') return 'admin';
  if (stone.firstReaderId === null) return 'read';
  if (stone.secondReaderId !== null) return 'two_people';
  if (stone.first === 'different' || stone.secondReadingWanted) return stone.firstReaderId === readerId ? 'second_reader' : 'read';
  if (stone.firstReaderId !== readerId) return 'second_reader';
  return readingsLeft ? 'read_more' : 'two_people';
}
