import fc from 'fast-check';
import { computeVerdict, DEFAULT_SETTINGS, validateVerdictRequest } from '@shared/evidence';
import { requests } from './requests';

/** Anything JSON can carry, and what JavaScript adds to it. */
const anything = fc.anything({ withBigInt: true, withDate: true, withMap: true, withNullPrototype: true, withTypedArray: true, maxDepth: 4 });

/** A good request with one place overwritten by something else. */
const broken: fc.Arbitrary<unknown> = fc.tuple(requests, fc.constantFrom('species', 'values', 'flags', 'readings', 'reading', 'value', 'u', 'colour'), anything).map(([request, place, other]) => {
  const copy = JSON.parse(JSON.stringify(request)) as { recorded: Record<string, unknown>; readings: unknown };
  const [first] = copy.readings as Record<string, unknown>[];
  if (place === 'readings') copy.readings = other;
  else if (place === 'reading') (copy.readings as unknown[])[0] = other;
  else if ((place === 'value' || place === 'u') && first) first[place] = other;
  else copy.recorded[place] = other;
  return copy;
});

describe('validation of a verdict request', () => {
  it('never throws and always names a field in words', () => {
    fc.assert(fc.property(anything, (input) => {
      for (const { field, message } of validateVerdictRequest(input)) {
        expect(typeof field).toBe('string');
        expect(message.length).toBeGreaterThan(5);
      }
    }), { numRuns: 2000 });
  });

  it('refuses a broken request, or what it lets through gets a finite verdict', () => {
    fc.assert(fc.property(broken, (input) => {
      if (validateVerdictRequest(input).length > 0) return;
      const verdict = computeVerdict(input as Parameters<typeof computeVerdict>[0], DEFAULT_SETTINGS, { rankNext: false });
      expect(Number.isFinite(verdict.log10LR)).toBe(true);
    }), { numRuns: 1000 });
  });
});
