import type { BenchRow, BenchStep, BenchStone } from '@shared/api/bench';
import type { VerdictWord } from '@shared/api/evidence';
import type { StoneEnding } from '@shared/api/loans';
import type { BadgeState } from '@/components/ui';

interface Badge { state: BadgeState; label: string }

const endings: Readonly<Record<StoneEnding, Badge>> = {
  same: { state: 'same', label: 'same' },
  accepted: { state: 'same', label: 'accepted' },
  mixed_up: { state: 'same', label: 'put right' },
  missing: { state: 'different', label: 'missing' },
  damaged: { state: 'different', label: 'damaged' },
  different: { state: 'different', label: 'differs' },
};

const steps: Readonly<Record<BenchStep, Badge>> = {
  scan: { state: 'neutral', label: 'not seen yet' },
  read: { state: 'out', label: 'to read' },
  read_more: { state: 'open', label: 'not settled' },
  second_reader: { state: 'open', label: 'second reading' },
  two_people: { state: 'open', label: 'two people decide' },
  admin: { state: 'open', label: 'for the admin' },
  ended: { state: 'same', label: 'settled' },
};

export function stoneBadge(stone: Pick<BenchStone, 'ending' | 'step'>): Badge {
  return stone.ending === null ? steps[stone.step] : endings[stone.ending];
}

export const verdictBadge: Readonly<Record<VerdictWord, Badge>> = {
  same: { state: 'same', label: 'Same stone' },
  different: { state: 'different', label: 'Different stone' },
  not_settled: { state: 'open', label: 'Not settled' },
};

export const basisWords = { first: 'First reader', second: 'Second reader', pooled: 'All readings together' } as const;

export function rowBadge(row: BenchRow): Badge {
  if (row.secondReadingWanted) return { state: 'open', label: 'second reading wanted' };
  if (row.state === 'returned') return { state: 'out', label: 'to check' };
  if (row.state === 'set_aside') return { state: 'different', label: 'set aside' };
  return { state: 'open', label: `${row.endedCount} of ${row.stoneCount} settled` };
}
