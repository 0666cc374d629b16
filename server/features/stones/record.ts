import type { EntityManager } from 'typeorm';
import type { RecordedStone, RecordGap } from '@shared/api/evidence';
import type { RecordedValueView } from '@shared/api/kits';

/** What the school's un-struck intake readings say of one stone. */
export interface StoneRecord {
  readonly stoneId: string;
  /** For the evidence engine. */
  readonly recorded: RecordedStone;
  /** For the screen. */
  readonly values: RecordedValueView[];
  readonly gaps: RecordGap[];
}

/** The record of one stone of this school. Throws `NotFound` where there is none. */
export declare function recordOf(tx: EntityManager, stoneId: string): Promise<StoneRecord>;
/** The records of several stones, by stone id; a stone that does not exist is left out. */
export declare function recordsOf(tx: EntityManager, stoneIds: readonly string[]): Promise<Map<string, StoneRecord>>;
