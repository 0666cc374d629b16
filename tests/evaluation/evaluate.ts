import type { VerdictWord } from '@shared/api/evidence';
import type { EngineSettings } from '@shared/evidence';
import { computeVerdict, DEFAULT_SETTINGS } from '@shared/evidence';
import type { DemoSet, Slot } from './demoSets';
import { Random } from './random';
import type { Stone, World } from './world';
import { CHEAP_READINGS, chipped, drawStone, drawSubstituteSpecies, readStone, recordStone, speciesOf } from './world';

export const RETURN_KINDS = ['untouched', 'otherSpecies', 'sameSpecies', 'chipped'] as const;
export type ReturnKind = (typeof RETURN_KINDS)[number];

export interface KindResult {
  readonly kind: ReturnKind;
  readonly returns: number;
  readonly first: Record<VerdictWord, number>;
  /** Verdicts after the one next reading that the engine proposes, where it proposes one. */
  readonly afterNext: Record<VerdictWord, number>;
  readonly log10LRs: Float64Array;
  /** True where nothing in the readings would keep a high LR from being "same". */
  readonly free: Uint8Array;
}

export interface EvaluationOptions {
  readonly set: DemoSet;
  readonly returns: number;
  readonly seed: number;
  readonly world: World;
  readonly settings?: EngineSettings;
  readonly next?: boolean;
}

/** Simulates returns of one kind over a demo set: what came back, what was read, what the engine said, and once more after its next reading. */
export function simulate(kind: ReturnKind, { set, returns, seed, world, settings = DEFAULT_SETTINGS, next = true }: EvaluationOptions): KindResult {
  const random = new Random(seed * 31 + RETURN_KINDS.indexOf(kind));
  const result: KindResult = { kind, returns, first: empty(), afterNext: empty(), log10LRs: new Float64Array(returns), free: new Uint8Array(returns) };
  for (let i = 0; i < returns; i += 1) {
    const slot = random.pick(set.slots);
    const original = drawStone(speciesOf(slot), slot, random, world);
    const recorded = recordStone(original, slot, random, true);
    const returned = returnedStone(kind, original, slot, random, world);
    const readings = CHEAP_READINGS.map((attribute) => readStone(returned, attribute, random, world));
    const verdict = computeVerdict({ recorded, readings }, settings, { rankNext: next });
    result.first[verdict.verdict] += 1;
    result.log10LRs[i] = verdict.log10LR;
    result.free[i] = verdict.contributions.every(({ z }) => z === null || Math.abs(z) <= settings.rule.farZ) ? 1 : 0;
    const proposed = verdict.next[0];
    if (proposed === undefined) {
      result.afterNext[verdict.verdict] += 1;
      continue;
    }
    const again = computeVerdict({ recorded, readings: [...readings, readStone(returned, proposed.attribute, random, world)] }, settings, { rankNext: false });
    result.afterNext[again.verdict] += 1;
  }
  return result;
}

function returnedStone(kind: ReturnKind, original: Stone, slot: Slot, random: Random, world: World): Stone {
  if (kind === 'untouched') return original;
  if (kind === 'chipped') return chipped(original, random, world.chipMeanCt);
  return drawStone(kind === 'sameSpecies' ? original.row : drawSubstituteSpecies(slot, slot.colour, random), slot, random, world);
}

function empty(): Record<VerdictWord, number> {
  return { same: 0, different: 0, not_settled: 0 };
}
