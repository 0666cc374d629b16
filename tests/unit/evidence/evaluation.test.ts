import { DEMO_SETS } from '../../evaluation/demoSets';
import { logLikelihoodRatioCost } from '../../evaluation/metrics';
import { figuresOf, pool, simulateAll } from '../../evaluation/report';
import { DEFAULT_WORLD } from '../../evaluation/world';

describe('the evaluation', () => {
  it('costs nothing for a perfect method and one bit for one that says nothing [Brümmer & du Preez 2006, from memory]', () => {
    expect(logLikelihoodRatioCost([30, 30], [-30, -30])).toBeCloseTo(0, 12);
    expect(logLikelihoodRatioCost([0, 0], [0])).toBeCloseTo(1, 12);
    expect(logLikelihoodRatioCost([-400], [400])).toBeCloseTo(400 * Math.log2(10), 6);
  });

  it('gives the same figures for the same seed', () => {
    const [set] = DEMO_SETS;
    if (set === undefined) throw new Error('there are demo sets');
    const run = () => figuresOf('run', simulateAll(set, 40, 3, DEFAULT_WORLD));
    expect(run()).toEqual(run());
  });

  it('finds the engine sound on a small sample: few wrong verdicts, most untouched stones settled', () => {
    // Bounds are wide, for 300 returns of each kind; `npm run evaluate` gives the figures themselves.
    const figures = figuresOf('all', pool(DEMO_SETS.map((set) => simulateAll(set, 100, 1, DEFAULT_WORLD))));
    expect(figures.untouchedDifferent).toBe(0);
    expect(figures.otherSpeciesSame).toBeLessThanOrEqual(1 / 300);
    expect(figures.sameSpeciesSame).toBeLessThanOrEqual(5 / 300);
    expect(figures.untouchedSettledFirst).toBeGreaterThan(0.85);
    expect(figures.untouchedSettledAfterNext).toBeGreaterThan(0.94);
    expect(figures.cllr).toBeLessThan(0.09);
  });
});
