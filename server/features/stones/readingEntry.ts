import type { EntityManager } from 'typeorm';
import { In } from 'typeorm';
import type { Attribute, CategoryAttribute, FieldError, NumericAttribute, RefractiveAttribute } from '@shared/api/evidence';
import { CATEGORY_VALUES, NUMERIC_ATTRIBUTES, REFRACTIVE_ATTRIBUTES } from '@shared/api/evidence';
import type { ReadingEntry } from '@shared/api/kits';
import { DEFAULT_SETTINGS } from '@shared/evidence/settings';
import { specificGravity, WATER_MAX_C, WATER_MIN_C } from '@shared/gem';
import { Instrument } from '@/server/features/instruments/instrument.entity';
import { isUuid } from '@/server/http/uuid';
import { invalid } from '@/server/http/problem';
import type { Reading } from './reading.entity';
import { implausible, INSTRUMENT_FOR, PLAUSIBLE } from './readingLimits';

/** The columns of a reading that follow from what was entered and from the instrument's register entry. */
export type ReadingColumns = Pick<
  Reading,
  'attribute' | 'value' | 'category' | 'overLimit' | 'airCt' | 'waterCt' | 'waterC' | 'u' | 'uInstrument' | 'instrumentId' | 'note'
>;

export type ReadingRowResult = { readonly row: ReadingColumns } | { readonly errors: FieldError[] };

/** A reading may lie this far above the liquid's limit before it cannot have been read: the width of the shadow edge. */
const EDGE_RI = 0.005;

/**
 * Turns one entry into the columns of a reading. Fields in errors are the entry's own (`value`, `waterCt`, …); use
 * `prepareReadings` for a whole list with dotted paths.
 * @param instrument the register entry `entry.instrumentId` names, or null where it names none
 */
export function toReadingRow(entry: ReadingEntry, instrument: Instrument | null): ReadingRowResult {
  const errors = [...instrumentErrors(entry, instrument), ...formErrors(entry)];
  if (errors.length > 0) return { errors };
  const columns = isNumeric(entry.attribute) ? numberColumns(entry, entry.attribute, instrument) : { category: entry.category ?? null };
  if ('errors' in columns) return columns;
  return { row: { ...nothingRead, ...columns, attribute: entry.attribute, instrumentId: instrument?.id ?? null, note: entry.note?.trim() ?? '' } };
}

/**
 * Every entry of a request as columns, instruments looked up in this school.
 * Throws `Invalid` naming each wrong field, e.g. `readings[2].value`.
 */
export async function prepareReadings(tx: EntityManager, entries: readonly ReadingEntry[], path = 'readings'): Promise<ReadingColumns[]> {
  const ids = entries.flatMap(({ instrumentId }) => (isUuid(instrumentId) ? [instrumentId] : []));
  const found = ids.length > 0 ? await tx.find(Instrument, { where: { id: In([...new Set(ids)]) } }) : [];
  const byId = new Map(found.map((instrument) => [instrument.id, instrument]));
  const errors: FieldError[] = [];
  const rows = entries.flatMap((entry, index) => {
    const result = toReadingRow(entry, byId.get(entry.instrumentId?.toLowerCase() ?? '') ?? null);
    if ('row' in result) return [result.row];
    errors.push(...result.errors.map(({ field, message }) => ({ field: `${path}[${index}].${field}`, message })));
    return [];
  });
  if (errors.length > 0) throw invalid(errors);
  return rows;
}

const nothingRead = { value: null, category: null, overLimit: null, airCt: null, waterCt: null, waterC: null, u: null, uInstrument: null };

const isNumeric = (attribute: Attribute): attribute is NumericAttribute => NUMERIC_ATTRIBUTES.some((one) => one === attribute);
const isRefractive = (attribute: Attribute): attribute is RefractiveAttribute => REFRACTIVE_ATTRIBUTES.some((one) => one === attribute);

const kindWords = { balance: 'a balance', caliper: 'a caliper', refractometer: 'a refractometer', polariscope: 'a polariscope', uv_lamp: 'a UV lamp', thermometer: 'a thermometer' };

function instrumentErrors({ attribute, instrumentId }: ReadingEntry, instrument: Instrument | null): FieldError[] {
  const wanted = INSTRUMENT_FOR[attribute];
  const say = (message: string): FieldError[] => [{ field: 'instrumentId', message }];
  if (instrument === null) {
    if (instrumentId !== undefined) return say('This instrument is not in the register. Choose one that is.');
    return isNumeric(attribute) && wanted !== null ? say(`Say which instrument was used: ${kindWords[wanted]} of the register.`) : [];
  }
  if (wanted === null) return say('The register has no instrument for this. Leave it out.');
  if (instrument.kind !== wanted) return say(`This is read with ${kindWords[wanted]}, not ${kindWords[instrument.kind]}. Choose another instrument.`);
  if (instrument.retiredAt !== null) return say(`${instrument.name} is retired. Choose an instrument in use.`);
  return [];
}

/** Exactly one way of saying what was read, and one that the attribute has. */
function formErrors(entry: ReadingEntry): FieldError[] {
  const { attribute, value, category, overLimit, airCt, waterCt, waterC } = entry;
  const weighed = [airCt, waterCt, waterC].some((one) => one !== undefined);
  const forms = [value !== undefined, category !== undefined, overLimit === true, weighed].filter(Boolean).length;
  if ((entry.note?.length ?? 0) > 300) return [{ field: 'note', message: 'Use at most 300 characters.' }];
  if (attribute === 'sg') {
    if (weighed && forms === 1) return [];
    return [{ field: 'airCt', message: 'Give the weight in air, the weight in water and the temperature of the water; the SG follows from them.' }];
  }
  if (!isNumeric(attribute)) return category !== undefined && forms === 1 ? categoryErrors(attribute, category) : [choose(attribute)];
  if (forms !== 1 || weighed || category !== undefined) return [{ field: 'value', message: 'Give one number.' }];
  if (overLimit === true && !isRefractive(attribute)) return [{ field: 'overLimit', message: 'Only a refractive index can be over the limit. Give a number.' }];
  return [];
}

function categoryErrors(attribute: CategoryAttribute, category: string): FieldError[] {
  return CATEGORY_VALUES[attribute].some((one) => one === category) ? [] : [choose(attribute)];
}

function choose(attribute: CategoryAttribute): FieldError {
  return { field: 'category', message: `Choose one of ${CATEGORY_VALUES[attribute].join(', ')}.` };
}

type NumberColumns = Partial<ReadingColumns> | { readonly errors: FieldError[] };

function numberColumns(entry: ReadingEntry, attribute: NumericAttribute, instrument: Instrument | null): NumberColumns {
  const u = (attribute === 'ri_spot' ? instrument?.spotUncertainty : instrument?.standardUncertainty) ?? null;
  if (u === null) return wrong('instrumentId', `The register does not say how uncertain a reading of ${instrument?.name ?? 'this instrument'} is. Add it there first.`);
  if (attribute === 'sg') return weighingColumns(entry, u);
  const limit = instrument?.liquidLimitRi ?? null;
  if (entry.overLimit === true) {
    return limit === null ? wrong('overLimit', `The register does not say how high ${instrument?.name ?? 'this instrument'} reads. Add it there first.`) : { overLimit: limit };
  }
  const value = entry.value ?? Number.NaN;
  const message = implausible(attribute, value);
  if (message !== undefined) return wrong('value', message);
  if (isRefractive(attribute) && limit !== null && value > limit + EDGE_RI) {
    return wrong('value', `${instrument?.name ?? 'This instrument'} reads up to ${limit}. Enter it as over the limit.`);
  }
  return { value, u, uInstrument: u * DEFAULT_SETTINGS.instrumentShare };
}

/** `uInstrument` stays open: the engine works out the instrument's part of the SG's uncertainty from the weighings. */
function weighingColumns(entry: ReadingEntry, u: number): NumberColumns {
  const { airCt = Number.NaN, waterCt = Number.NaN, waterC = Number.NaN } = entry;
  const air = implausible('weight_ct', airCt);
  if (air !== undefined) return wrong('airCt', air);
  if (!(waterCt >= 0 && waterCt < airCt)) return wrong('waterCt', 'The reading in water must be 0 or more and below the reading in air. Weigh again.');
  if (!(waterC >= WATER_MIN_C && waterC <= WATER_MAX_C)) return wrong('waterC', `The water must be between ${WATER_MIN_C} and ${WATER_MAX_C} °C.`);
  const { value } = specificGravity({ airCt, waterCt, waterC, uCt: u });
  if (implausible('sg', value) !== undefined) {
    return wrong('waterCt', `These weights give a specific gravity of ${value.toFixed(2)}; it lies between ${PLAUSIBLE.sg.min} and ${PLAUSIBLE.sg.max}. Weigh again.`);
  }
  return { value, airCt, waterCt, waterC, u };
}

const wrong = (field: string, message: string): { errors: FieldError[] } => ({ errors: [{ field, message }] });
