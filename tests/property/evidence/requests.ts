import fc from 'fast-check';
import type { Attribute, ReadingInput, RecordedStone, VerdictRequest } from '@shared/api/evidence';
import { CATEGORY_VALUES, STONE_COLOURS, STONE_FLAGS } from '@shared/api/evidence';
import { SPECIES_ROWS } from '@shared/gem';
import type { SpeciesRow } from '@shared/gem';
import { indexExtent } from '@shared/gem';

/** A stone of any species with a record as a school would keep it. */
export const recordedStones: fc.Arbitrary<RecordedStone> = fc.record({
  row: fc.constantFrom(...SPECIES_ROWS),
  colour: fc.option(fc.constantFrom(...STONE_COLOURS), { nil: undefined }),
  flags: fc.uniqueArray(fc.constantFrom(...STONE_FLAGS), { maxLength: 2 }),
  length: fc.double({ min: 4, max: 20, noNaN: true }),
  t: fc.double({ min: 0, max: 1, noNaN: true }),
  lacks: fc.uniqueArray(fc.constantFrom<Attribute>('length_mm', 'height_mm', 'sg', 'weight_ct', 'ri_spot', 'polariscope'), { maxLength: 2 }),
}).map(({ row, colour, flags, length, t, lacks }) => {
  const values = valuesOf(row, length, t);
  const kept = Object.fromEntries(Object.entries(values).filter(([attribute]) => !(lacks as readonly string[]).includes(attribute)));
  return { species: row.id, flags, values: kept, ...(colour === undefined ? {} : { colour }) };
});

function valuesOf(row: SpeciesRow, length: number, t: number): RecordedStone['values'] {
  const sg = row.sg[0] + t * (row.sg[1] - row.sg[0]);
  const { low, high } = indexExtent(row);
  const index = (low[0] + high[1]) / 2;
  return {
    length_mm: { value: length, u: 0.012 }, width_mm: { value: 0.75 * length, u: 0.012 }, height_mm: { value: 0.41 * length, u: 0.012 },
    weight_ct: { value: 0.005 * (Math.PI / 6) * 0.75 * 0.41 * length ** 3 * sg, u: 0.004 },
    sg: { value: sg, u: 0.02 },
    ri_spot: index > 1.81 ? { value: 'over_limit', limit: 1.81 } : { value: index, u: 0.005 },
    polariscope: 'DR',
  };
}

/** A reading of the recorded stone or of nearly anything else. */
export const readings: fc.Arbitrary<ReadingInput> = fc.oneof(
  fc.record({ attribute: fc.constantFrom('length_mm', 'width_mm', 'height_mm'), value: fc.double({ min: 1, max: 25, noNaN: true }), u: fc.constantFrom(0.014, 0.03) }),
  fc.record({ attribute: fc.constant('weight_ct'), value: fc.double({ min: 0.05, max: 40, noNaN: true }), u: fc.constantFrom(0.006, 0.0006) }),
  fc.record({ attribute: fc.constant('sg'), value: fc.double({ min: 1, max: 7, noNaN: true }), u: fc.constantFrom(0.02, 0.1) }),
  fc.record({ attribute: fc.constantFrom('ri_spot', 'ri_low', 'ri_high'), value: fc.double({ min: 1.35, max: 1.81, noNaN: true }), u: fc.constantFrom(0.0015, 0.006) }),
  fc.constant({ attribute: 'ri_spot', value: 'over_limit', limit: 1.81 }),
  ...(Object.keys(CATEGORY_VALUES) as (keyof typeof CATEGORY_VALUES)[]).map((attribute) => fc.record({
    attribute: fc.constant(attribute), value: fc.constantFrom(...CATEGORY_VALUES[attribute]), observer: fc.constantFrom('instructor', 'student'),
  })),
);

export const requests: fc.Arbitrary<VerdictRequest> = fc.record({
  recorded: recordedStones,
  readings: fc.array(readings, { minLength: 1, maxLength: 9 }),
});
