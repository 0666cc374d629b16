import type { Attribute, RecordedStone, RecordGap } from '../api/evidence';
import { caresOf, isTransparentEnough } from '../gem/cares';
import { findSpecies } from '../gem/species';

/**
 * What a stone's record still lacks before a verdict can rest on it; empty when it is complete enough.
 * Asked of every stone: weight and the three sizes. Of stones that let light through: the polariscope reaction. Then one
 * test that tells the species: a refractive index, or SG. A stone that contact liquid would harm is asked for SG, a porous
 * one for neither (its weight and sizes must do).
 */
export function recordGaps(stone: RecordedStone): RecordGap[] {
  const row = findSpecies(stone.species);
  if (row === undefined) return [{ attribute: null, message: 'Choose the species of this stone.' }];
  const { values } = stone;
  const cares = caresOf(row, stone.flags);
  const gaps: RecordGap[] = [];
  const ask = (attribute: Attribute, message: string) => {
    if (values[attribute] === undefined) gaps.push({ attribute, message });
  };
  ask('weight_ct', 'Weigh the stone, twice or more.');
  ask('length_mm', 'Measure the length with the calipers.');
  ask('width_mm', 'Measure the width with the calipers.');
  ask('height_mm', 'Measure the height with the calipers.');
  if (isTransparentEnough(row)) ask('polariscope', 'Turn the stone in the polariscope and record its reaction.');
  const told = [values.ri_spot, values.ri_low, values.ri_high, values.sg].some((value) => value !== undefined);
  if (!told && !cares.porous) {
    gaps.push(cares.sparesContactLiquid
      ? { attribute: 'sg', message: 'Weigh the stone in water for its specific gravity; contact liquid would harm it.' }
      : { attribute: 'ri_spot', message: 'Read a refractive index (spot or flat back), or weigh the stone in water.' });
  }
  return gaps;
}
