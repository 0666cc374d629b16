import type { VerdictWord } from '@shared/api/evidence';
import { ENGINE_VERSION } from '@shared/evidence';
import type { DemoSet } from './demoSets';
import type { KindResult, ReturnKind } from './evaluate';
import { RETURN_KINDS, simulate } from './evaluate';
import { calibration, logLikelihoodRatioCost, tradeOff } from './metrics';
import type { World } from './world';

const THRESHOLDS = [1.4, 1.6, 1.8, 2, 2.2, 2.4, 2.6, 2.8, 3];
const DECADES = [-4, -3, -2, -1, 0, 1, 2, 3, 4];

export type KindResults = Readonly<Record<ReturnKind, KindResult>>;

export interface Figures {
  readonly name: string;
  readonly returnsOfEachKind: number;
  readonly otherSpeciesSame: number;
  readonly sameSpeciesSame: number;
  readonly untouchedDifferent: number;
  readonly untouchedSettledFirst: number;
  readonly untouchedSettledAfterNext: number;
  readonly cllr: number;
  readonly cllrSameSpeciesOnly: number;
  readonly decided: Readonly<Record<ReturnKind, { first: Readonly<Record<VerdictWord, number>>; afterNext: Readonly<Record<VerdictWord, number>> }>>;
  readonly tradeOff: ReturnType<typeof tradeOff>;
  readonly calibration: ReturnType<typeof calibration>;
}

export function simulateAll(set: DemoSet, returns: number, seed: number, world: World): KindResults {
  const run = (kind: ReturnKind) => simulate(kind, { set, returns, seed, world, next: kind === 'untouched' });
  return { untouched: run('untouched'), otherSpecies: run('otherSpecies'), sameSpecies: run('sameSpecies'), chipped: run('chipped') };
}

/** Results of several sets as one. */
export function pool(results: readonly KindResults[]): KindResults {
  const join = (kind: ReturnKind): KindResult => {
    const parts = results.map((result) => result[kind]);
    const sum = (pick: (part: KindResult) => Record<VerdictWord, number>) => {
      const words: Record<VerdictWord, number> = { same: 0, different: 0, not_settled: 0 };
      for (const part of parts) for (const word of ['same', 'different', 'not_settled'] as const) words[word] += pick(part)[word];
      return words;
    };
    return {
      kind,
      returns: parts.reduce((total, part) => total + part.returns, 0),
      first: sum((part) => part.first),
      afterNext: sum((part) => part.afterNext),
      log10LRs: Float64Array.from(parts.flatMap((part) => [...part.log10LRs])),
      free: Uint8Array.from(parts.flatMap((part) => [...part.free])),
    };
  };
  return { untouched: join('untouched'), otherSpecies: join('otherSpecies'), sameSpecies: join('sameSpecies'), chipped: join('chipped') };
}

export function figuresOf(name: string, results: KindResults): Figures {
  const { untouched, otherSpecies, sameSpecies } = results;
  const n = untouched.returns;
  const substitutes = Float64Array.from([...otherSpecies.log10LRs, ...sameSpecies.log10LRs]);
  return {
    name,
    returnsOfEachKind: n,
    otherSpeciesSame: otherSpecies.first.same / n,
    sameSpeciesSame: sameSpecies.first.same / n,
    untouchedDifferent: untouched.first.different / n,
    untouchedSettledFirst: 1 - untouched.first.not_settled / n,
    untouchedSettledAfterNext: 1 - untouched.afterNext.not_settled / n,
    cllr: logLikelihoodRatioCost(untouched.log10LRs, substitutes),
    cllrSameSpeciesOnly: logLikelihoodRatioCost(untouched.log10LRs, sameSpecies.log10LRs),
    decided: Object.fromEntries(RETURN_KINDS.map((kind) => [kind, { first: results[kind].first, afterNext: results[kind].afterNext }])) as Figures['decided'],
    tradeOff: tradeOff(untouched, sameSpecies, THRESHOLDS),
    calibration: calibration(untouched.log10LRs, substitutes, DECADES),
  };
}

const TARGETS: readonly [words: string, value: (figures: Figures) => number, target: number, below: boolean, asPercent: boolean][] = [
  ['other-species substitutes called same stone', (f) => f.otherSpeciesSame, 0.0005, true, true],
  ['same-species, same-size substitutes called same stone', (f) => f.sameSpeciesSame, 0.002, true, true],
  ['untouched stones called different stone', (f) => f.untouchedDifferent, 0.0002, true, true],
  ['untouched stones settled on the first readings', (f) => f.untouchedSettledFirst, 0.9, false, true],
  ['… after the one next reading that is proposed', (f) => f.untouchedSettledAfterNext, 0.99, false, true],
  ['Cllr (substitutes: half other species, half the same)', (f) => f.cllr, 0.04, true, false],
];

/** The table, the trade-off between its second and fourth rows, decisions against truth and calibration, as text. */
export function describeFigures(figures: Figures): string {
  const percent = (value: number) => `${(100 * value).toFixed(3)} %`;
  const lines = [`${figures.name}: ${String(figures.returnsOfEachKind)} returns of each kind, engine ${ENGINE_VERSION}`];
  for (const [words, value, target, below, asPercent] of TARGETS) {
    const found = value(figures);
    const show = (x: number) => (asPercent ? percent(x) : x.toFixed(4));
    const met = below ? found <= target : found >= target;
    lines.push(`  ${words.padEnd(58)}${show(found).padStart(10)}   target ${below ? '≤' : '≥'} ${show(target)}${met ? '' : '   NOT MET'}`);
  }
  lines.push('  decided against truth (same / different / not settled):');
  for (const kind of RETURN_KINDS) {
    const { same, different, not_settled: open } = figures.decided[kind].first;
    lines.push(`    ${kind.padEnd(14)}${[same, different, open].map((count) => percent(count / figures.returnsOfEachKind).padStart(10)).join('')}`);
  }
  lines.push('  were the threshold of "same" elsewhere (LR: untouched settled / same-species substitutes passed):');
  lines.push(`    ${figures.tradeOff.map(({ log10LR, untouchedSame, substitutesSame }) => `${(10 ** log10LR).toFixed(0)}: ${(100 * untouchedSame).toFixed(1)}/${(100 * substitutesSame).toFixed(2)}`).join('   ')}`);
  lines.push('  calibration (log10 LR said: log10 of untouched over substitutes seen):');
  lines.push(`    ${figures.calibration.map(({ from, to, log10Ratio }) => `${String(from)}…${String(to)}: ${log10Ratio === null ? '–' : log10Ratio.toFixed(2)}`).join('   ')}`);
  return lines.join('\n');
}
