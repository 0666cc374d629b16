import fc from 'fast-check';
import type { NumericAttribute, RecordedStone, VerdictRequest } from '@shared/api/evidence';
import { computeVerdict, DEFAULT_SETTINGS, validateVerdictRequest } from '@shared/evidence';
import { likelihoods, poolReadings } from '@shared/evidence/likelihood';
import { prepareRecord } from '@shared/evidence/record';
import { requests, recordedStones } from './requests';

const quiet = { rankNext: false };

/** p(readings | the recorded stone), up to a factor that does not depend on where the reading fell. */
function ownLikelihood(request: VerdictRequest): number {
  const record = prepareRecord(request.recorded, DEFAULT_SETTINGS);
  return likelihoods(record, poolReadings(record, request.readings)).own.at(-1) ?? 1;
}

describe('a verdict', () => {
  it('is finite, sums its contributions and is allowed by its own rule, whatever was read', () => {
    fc.assert(fc.property(requests, (request) => {
      expect(validateVerdictRequest(request)).toEqual([]);
      const found = computeVerdict(request, DEFAULT_SETTINGS, quiet);
      expect(Number.isFinite(found.log10LR)).toBe(true);
      const sum = found.contributions.reduce((total, { log10LR }) => total + log10LR, 0);
      expect(sum).toBeCloseTo(found.log10LR, 8);
      if (found.verdict === 'same') expect(found.log10LR).toBeGreaterThanOrEqual(2);
      if (found.verdict === 'different') expect(found.log10LR).toBeLessThanOrEqual(-4);
      expect(found.alternatives.reduce((total, { share }) => total + share, 0)).toBeLessThanOrEqual(1 + 1e-9);
    }));
  });

  it('does not depend on the order of the readings, to the last digit', () => {
    fc.assert(fc.property(requests.chain((request) => fc.tuple(
      fc.constant(request), fc.shuffledSubarray(request.readings, { minLength: request.readings.length }),
    )), ([request, shuffled]) => {
      const one = computeVerdict(request, DEFAULT_SETTINGS, quiet);
      const other = computeVerdict({ ...request, readings: shuffled }, DEFAULT_SETTINGS, quiet);
      expect(other).toEqual(one);
    }));
  });

  it('is the same every time it is computed', () => {
    fc.assert(fc.property(requests, (request) => {
      expect(computeVerdict(request)).toEqual(computeVerdict(request));
    }), { numRuns: 10 });
  });

  it('changes nothing for a recorded value nobody read again and that says nothing of the others', () => {
    // Recorded optics beyond the polariscope stand alone: without a reading they must not move the verdict.
    fc.assert(fc.property(requests, (request) => {
      const unread = request.readings.filter(({ attribute }) => attribute !== 'uv_long' && attribute !== 'optic_sign');
      fc.pre(unread.length > 0);
      const plain = computeVerdict({ ...request, readings: unread }, DEFAULT_SETTINGS, quiet);
      const values: RecordedStone['values'] = { ...request.recorded.values, uv_long: 'strong', optic_sign: '-' };
      const more = computeVerdict({ recorded: { ...request.recorded, values }, readings: unread }, DEFAULT_SETTINGS, quiet);
      expect(more.log10LR).toBe(plain.log10LR);
      expect(more.contributions).toEqual(plain.contributions);
    }));
  });
});

describe('p(readings | the recorded stone)', () => {
  const numeric: readonly NumericAttribute[] = ['length_mm', 'width_mm', 'height_mm', 'weight_ct', 'sg', 'ri_spot', 'ri_low', 'ri_high'];

  it('never rises as a reading moves away from the record, on either side', () => {
    fc.assert(fc.property(
      recordedStones, fc.constantFrom(...numeric), fc.constantFrom(-1, 1), fc.double({ min: 0, max: 12, noNaN: true }), fc.double({ min: 0, max: 6, noNaN: true }), fc.boolean(),
      (recorded, attribute, side, near, step, damaged) => {
        const stone = withFlats(recorded);
        const entry = stone.values[attribute];
        fc.pre(entry !== undefined && 'u' in entry);
        const centre = centreOf(stone, attribute);
        const u = attribute.startsWith('ri') ? 0.004 : 0.01;
        const at = (distance: number) => ownLikelihood({
          recorded: stone,
          readings: [{ attribute, value: centre + side * distance * u, u, ...(damaged ? { explained: 'damage' as const } : {}) }],
        });
        expect(at(near + step)).toBeLessThanOrEqual(at(near) * (1 + 1e-12));
      },
    ), { numRuns: 1000 });
  });

  /** Some stones with their flat readings, so that the spot is judged against an interval. */
  function withFlats(stone: RecordedStone): RecordedStone {
    const spot = stone.values.ri_spot;
    if (spot === undefined || !('u' in spot)) return stone;
    return { ...stone, values: { ...stone.values, ri_low: { value: spot.value - 0.004, u: 0.0015 }, ri_high: { value: spot.value + 0.005, u: 0.0015 } } };
  }

  function centreOf(stone: RecordedStone, attribute: NumericAttribute): number {
    const { ri_low: low, ri_high: high } = stone.values;
    if (attribute === 'ri_spot' && low && high && 'u' in low && 'u' in high) return (low.value + high.value) / 2;
    const entry = stone.values[attribute];
    if (entry === undefined || !('u' in entry)) throw new Error('only recorded numbers have a centre');
    return entry.value;
  }
});
