import type { CategoryAttribute, NumericAttribute, ReadingInput, RefractiveAttribute } from '@shared/api/evidence';
import { specificGravity } from '@shared/gem';
import type { ReadingView } from '@shared/api/kits';
import type { Reading } from './reading.entity';

/** A stored reading as the evidence engine takes it. */
export function readingInput(reading: Reading): ReadingInput {
  const { observer, attribute } = reading;
  const context = {
    observer,
    ...(reading.instrumentId === null ? {} : { instrument: reading.instrumentId }),
    ...(reading.uInstrument === null ? {} : { uInstrument: reading.uInstrument }),
  };
  if (reading.category !== null) return { ...context, attribute: attribute as CategoryAttribute, value: reading.category };
  if (reading.overLimit !== null) return { ...context, attribute: attribute as RefractiveAttribute, value: 'over_limit', limit: reading.overLimit };
  const weighing = weighingOf(reading);
  if (weighing !== null) return { ...context, attribute: 'sg', ...weighing, uCt: uncertaintyOf(reading) };
  if (reading.value === null) throw new Error(`Reading ${reading.id} holds no value.`);
  return { ...context, attribute: attribute as NumericAttribute, value: reading.value, u: uncertaintyOf(reading) };
}

/** The two weighings behind an SG, or null. */
export function weighingOf({ airCt, waterCt, waterC }: Reading): ReadingView['weighing'] {
  return airCt === null || waterCt === null || waterC === null ? null : { airCt, waterCt, waterC };
}

/** The standard uncertainty of what the reading shows: of the derived SG where it was weighed; null for categories and censored indices. */
export function shownUncertainty(reading: Reading): number | null {
  const weighing = weighingOf(reading);
  if (weighing === null) return reading.u;
  return specificGravity({ ...weighing, uCt: uncertaintyOf(reading) }).u;
}

function uncertaintyOf(reading: Reading): number {
  if (reading.u === null) throw new Error(`Reading ${reading.id} has a number without an uncertainty.`);
  return reading.u;
}
