import type { ReadingInput } from '@shared/api/evidence';
import { computeVerdict, DEFAULT_SETTINGS } from '@shared/evidence';
import { Random } from '../../evaluation/random';

/** Mean log10 LR of true matches when every error is `scale` times as large, and said to be so. */
function meanSupport(scale: number, n: number): number {
  const random = new Random(20_260_101);
  let sum = 0;
  for (let i = 0; i < n; i += 1) {
    const truth = { length_mm: 8.03, width_mm: 6.02, height_mm: 3.4, weight_ct: 1.17, ri_spot: 1.548 } as const;
    const read = (attribute: keyof typeof truth, u: number) => ({ value: truth[attribute] + u * random.normal(), u });
    const u = { length_mm: 0.01, width_mm: 0.01, height_mm: 0.01, weight_ct: 0.004, ri_spot: 0.004 } as const;
    const attributes = Object.keys(truth) as (keyof typeof truth)[];
    const values = Object.fromEntries(attributes.map((attribute) => [attribute, read(attribute, u[attribute] * scale)]));
    const readings = attributes.map((attribute): ReadingInput => ({ attribute, ...read(attribute, u[attribute] * scale) }));
    sum += computeVerdict({ recorded: { species: 'amethyst', colour: 'violet', values }, readings }, DEFAULT_SETTINGS, { rankNext: false }).log10LR;
  }
  return sum / n;
}

it('supports a true match more, on average, the more accurate the instruments are', () => {
  const supports = [4, 2, 1, 0.5].map((scale) => meanSupport(scale, 400));
  for (let i = 1; i < supports.length; i += 1) expect(supports[i]).toBeGreaterThan(supports[i - 1] ?? Infinity);
});
