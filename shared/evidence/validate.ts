import type { Attribute, FieldError, NumericAttribute } from '../api/evidence';
import {
  ATTRIBUTES, CATEGORY_VALUES, NUMERIC_ATTRIBUTES, OBSERVERS, REFRACTIVE_ATTRIBUTES, STONE_COLOURS, STONE_FLAGS, STONE_SHAPES,
} from '../api/evidence';
import { WATER_MAX_C, WATER_MIN_C } from '../gem/water';
import { isSpeciesId } from '../gem/species';

/** More readings of one stone than any bench takes; a longer list is a mistake or an attack. */
export const MAX_READINGS = 60;
/** More mistakes than a person will read at once. */
const MAX_ERRORS = 50;

type Fields = Readonly<Record<string, unknown>>;
type Report = (field: string, message: string) => void;

/** What a number of each attribute may be; the upper ends are beyond any stone of a teaching set. */
const LIMITS: Readonly<Record<NumericAttribute, { above: number; to: number; words: string }>> = {
  weight_ct: { above: 0, to: 100_000, words: 'a weight is more than 0 ct' },
  length_mm: { above: 0, to: 1000, words: 'a length is more than 0 mm' },
  width_mm: { above: 0, to: 1000, words: 'a width is more than 0 mm' },
  height_mm: { above: 0, to: 1000, words: 'a height is more than 0 mm' },
  sg: { above: 0.5, to: 25, words: 'a specific gravity lies between 0.5 and 25' },
  ri_spot: { above: 1.3, to: 2.7, words: 'a refractive index lies between 1.3 and 2.7' },
  ri_low: { above: 1.3, to: 2.7, words: 'a refractive index lies between 1.3 and 2.7' },
  ri_high: { above: 1.3, to: 2.7, words: 'a refractive index lies between 1.3 and 2.7' },
};

/**
 * Everything that keeps a request from being weighed, each with the dotted path of its field; empty means it is a
 * `VerdictRequest`. Takes any parsed JSON and never throws.
 */
export function validateVerdictRequest(input: unknown): FieldError[] {
  const errors: FieldError[] = [];
  const report: Report = (field, message) => {
    if (errors.length < MAX_ERRORS) errors.push({ field, message });
  };
  if (!isFields(input)) return [{ field: '', message: 'Send an object with "recorded" and "readings".' }];
  checkRecorded(own(input, 'recorded'), 'recorded', report);
  checkReadings(own(input, 'readings'), report);
  checkList(own(input, 'unavailable'), 'unavailable', ATTRIBUTES, 'attribute', report);
  return errors;
}

/** The same for a recorded stone by itself, as an intake form sends it. */
export function validateRecordedStone(input: unknown, field = 'recorded'): FieldError[] {
  const errors: FieldError[] = [];
  checkRecorded(input, field, (path, message) => {
    if (errors.length < MAX_ERRORS) errors.push({ field: path, message });
  });
  return errors;
}

function checkRecorded(input: unknown, field: string, report: Report): void {
  if (!isFields(input)) {
    report(field, 'Send the recorded stone as an object with "species" and "values".');
    return;
  }
  if (!isSpeciesId(own(input, 'species'))) report(`${field}.species`, 'Use a species id listed by GET /api/v1/species.');
  const colour = own(input, 'colour');
  if (colour !== undefined && !isOneOf(STONE_COLOURS, colour)) report(`${field}.colour`, `Use one of: ${STONE_COLOURS.join(', ')}.`);
  const shape = own(input, 'shape');
  if (shape !== undefined && !isOneOf(STONE_SHAPES, shape)) report(`${field}.shape`, `Use one of: ${STONE_SHAPES.join(', ')}.`);
  checkList(own(input, 'flags'), `${field}.flags`, STONE_FLAGS, 'flag', report);
  const values = own(input, 'values');
  if (!isFields(values)) {
    report(`${field}.values`, 'Send the recorded values as an object; it may be empty.');
    return;
  }
  for (const attribute of Object.keys(values)) {
    const path = `${field}.values.${attribute}`;
    if (!isOneOf(ATTRIBUTES, attribute)) report(path, `Unknown attribute. Use one of: ${ATTRIBUTES.join(', ')}.`);
    else checkRecordedValue(attribute, own(values, attribute), path, report);
  }
}

function checkRecordedValue(attribute: Attribute, value: unknown, path: string, report: Report): void {
  if (!isNumericName(attribute)) {
    checkCategory(attribute, value, path, report);
    return;
  }
  if (!isFields(value)) {
    report(path, 'Send a number as { "value": …, "u": … } with its standard uncertainty.');
    return;
  }
  if (attribute === 'sg' && own(value, 'airCt') !== undefined) checkWeighing(value, path, report);
  else checkNumber(attribute, value, path, report);
  const n = own(value, 'n');
  if (n !== undefined && !(isNumber(n) && Number.isInteger(n) && n >= 1)) report(`${path}.n`, 'A number of readings is a whole number from 1.');
  checkInstrument(value, path, report);
}

function checkReadings(input: unknown, report: Report): void {
  if (!Array.isArray(input)) {
    report('readings', 'Send the readings as a list.');
    return;
  }
  if (input.length === 0) report('readings', 'Send at least one reading.');
  if (input.length > MAX_READINGS) {
    report('readings', `Send at most ${String(MAX_READINGS)} readings of one stone.`);
    return;
  }
  input.forEach((reading: unknown, i) => { checkReading(reading, `readings[${String(i)}]`, report); });
}

function checkReading(input: unknown, path: string, report: Report): void {
  if (!isFields(input)) {
    report(path, 'Send each reading as an object with an attribute and a value.');
    return;
  }
  const attribute = own(input, 'attribute');
  const observer = own(input, 'observer');
  if (observer !== undefined && !isOneOf(OBSERVERS, observer)) report(`${path}.observer`, `Use one of: ${OBSERVERS.join(', ')}.`);
  const explained = own(input, 'explained');
  if (explained !== undefined && explained !== 'damage') report(`${path}.explained`, 'The only explanation is "damage".');
  checkInstrument(input, path, report);
  if (!isOneOf(ATTRIBUTES, attribute)) report(`${path}.attribute`, `Use one of: ${ATTRIBUTES.join(', ')}.`);
  else if (!isNumericName(attribute)) checkCategory(attribute, own(input, 'value'), `${path}.value`, report);
  else if (attribute === 'sg' && own(input, 'value') === undefined) checkWeighing(input, path, report);
  else checkNumber(attribute, input, path, report);
}

function checkNumber(attribute: NumericAttribute, fields: Fields, path: string, report: Report): void {
  const value = own(fields, 'value');
  if (value === 'over_limit') {
    const limit = own(fields, 'limit');
    if (!isOneOf(REFRACTIVE_ATTRIBUTES, attribute)) report(`${path}.value`, 'Only a refractive index can be over the limit.');
    else if (!(isNumber(limit) && limit >= 1.3 && limit <= 2.7)) report(`${path}.limit`, "Give the contact liquid's limit, between 1.3 and 2.7.");
    return;
  }
  const { above, to, words } = LIMITS[attribute];
  const low = above === 0 ? isNumber(value) && value > 0 : isNumber(value) && value >= above;
  if (!(isNumber(value) && low && value <= to)) report(`${path}.value`, `Check the number: ${words}.`);
  checkUncertainty(own(fields, 'u'), isNumber(value) ? value : to, `${path}.u`, report);
}

function checkUncertainty(u: unknown, value: number, path: string, report: Report): void {
  if (u === undefined) report(path, 'Give the standard uncertainty of this number.');
  else if (!(isNumber(u) && u > 0)) report(path, 'A standard uncertainty is a number above 0.');
  else if (u > Math.abs(value) || u < 1e-9 * Math.abs(value)) report(path, 'This uncertainty does not fit the value. Check the unit.');
}

function checkWeighing(fields: Fields, path: string, report: Report): void {
  const [air, water, waterC, u, uWaterC] = ['airCt', 'waterCt', 'waterC', 'uCt', 'uWaterC'].map((name) => own(fields, name));
  if (!(isNumber(air) && air > 0 && air <= LIMITS.weight_ct.to)) report(`${path}.airCt`, 'Check the weight in air: it is more than 0 ct.');
  if (!(isNumber(water) && water > 0)) report(`${path}.waterCt`, 'Check the weight in water: it is more than 0 ct.');
  else if (isNumber(air) && water >= air) report(`${path}.waterCt`, 'The weight in water must be below the weight in air.');
  else if (isNumber(air) && !(air / (air - water) <= LIMITS.sg.to)) report(`${path}.waterCt`, `Check both weighings: ${LIMITS.sg.words}.`);
  if (!(isNumber(waterC) && waterC >= WATER_MIN_C && waterC <= WATER_MAX_C)) report(`${path}.waterC`, 'Give the water temperature, from 0 to 40 °C.');
  checkUncertainty(u, isNumber(air) ? air : LIMITS.weight_ct.to, `${path}.uCt`, report);
  if (uWaterC !== undefined && !(isNumber(uWaterC) && uWaterC >= 0 && uWaterC <= WATER_MAX_C)) report(`${path}.uWaterC`, 'The uncertainty of the temperature lies between 0 and 40 °C.');
}

function checkInstrument(fields: Fields, path: string, report: Report): void {
  const instrument = own(fields, 'instrument');
  if (instrument !== undefined && !(typeof instrument === 'string' && instrument.length <= 100)) report(`${path}.instrument`, 'An instrument is named by its id, at most 100 characters.');
  const part = own(fields, 'uInstrument');
  if (part !== undefined && !(isNumber(part) && part >= 0)) report(`${path}.uInstrument`, "The instrument's own part of the uncertainty is 0 or more.");
}

function checkCategory(attribute: Exclude<Attribute, NumericAttribute>, value: unknown, path: string, report: Report): void {
  const allowed: readonly string[] = CATEGORY_VALUES[attribute];
  if (!isOneOf(allowed, value)) report(path, `Use one of: ${allowed.join(', ')}.`);
}

function checkList(input: unknown, path: string, allowed: readonly string[], what: string, report: Report): void {
  if (input === undefined) return;
  if (!Array.isArray(input)) {
    report(path, `Send a list; each ${what} is one of: ${allowed.join(', ')}.`);
    return;
  }
  if (input.length > allowed.length) {
    report(path, `Name each ${what} once.`);
    return;
  }
  input.forEach((entry: unknown, i) => {
    if (!isOneOf(allowed, entry)) report(`${path}[${String(i)}]`, `Unknown ${what}. Use one of: ${allowed.join(', ')}.`);
  });
}

function isFields(value: unknown): value is Fields {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** An own property only, so that a body cannot borrow one from a prototype. */
function own(fields: Fields, name: string): unknown {
  return Object.hasOwn(fields, name) ? fields[name] : undefined;
}

function isNumber(value: unknown): value is number {
  return typeof value === 'number' && Number.isFinite(value);
}

function isOneOf<T extends string>(allowed: readonly T[], value: unknown): value is T {
  return typeof value === 'string' && (allowed as readonly string[]).includes(value);
}

function isNumericName(attribute: Attribute): attribute is NumericAttribute {
  return (NUMERIC_ATTRIBUTES as readonly Attribute[]).includes(attribute);
}
