import { MAX_READINGS, validateVerdictRequest } from '@shared/evidence';

const good = { recorded: { species: 'topaz', values: { weight_ct: { value: 1.5, u: 0.004 } } }, readings: [{ attribute: 'weight_ct', value: 1.5, u: 0.006 }] };
const withReading = (reading: unknown) => ({ ...good, readings: [good.readings[0], reading] });
const fieldsOf = (input: unknown) => validateVerdictRequest(input).map(({ field }) => field);

describe('a verdict request', () => {
  it('is taken when it is whole', () => {
    expect(validateVerdictRequest(good)).toEqual([]);
  });

  it.each([
    ['a negative weight', { attribute: 'weight_ct', value: -1, u: 0.01 }, ['readings[1].value']],
    ['a zero weight', { attribute: 'weight_ct', value: 0, u: 0.01 }, ['readings[1].value', 'readings[1].u']],
    ['an index below 1.3', { attribute: 'ri_spot', value: 1.2, u: 0.01 }, ['readings[1].value']],
    ['an index above 2.7', { attribute: 'ri_high', value: 2.71, u: 0.01 }, ['readings[1].value']],
    ['a missing uncertainty', { attribute: 'sg', value: 2.65 }, ['readings[1].u']],
    ['an uncertainty of zero', { attribute: 'sg', value: 2.65, u: 0 }, ['readings[1].u']],
    ['NaN', { attribute: 'length_mm', value: Number.NaN, u: 0.01 }, ['readings[1].value']],
    ['a number sent as text', { attribute: 'length_mm', value: '8', u: 0.01 }, ['readings[1].value']],
    ['a water reading not below air', { attribute: 'sg', airCt: 2, waterCt: 2, waterC: 20, uCt: 0.01 }, ['readings[1].waterCt']],
    ['water warmer than 40 °C', { attribute: 'sg', airCt: 2, waterCt: 1.2, waterC: 41, uCt: 0.01 }, ['readings[1].waterC']],
    ['weighings without uncertainty', { attribute: 'sg', airCt: 2, waterCt: 1.2, waterC: 20 }, ['readings[1].uCt']],
    ['an unknown attribute', { attribute: 'lustre', value: 1, u: 1 }, ['readings[1].attribute']],
    ['an unknown category', { attribute: 'polariscope', value: 'TR' }, ['readings[1].value']],
    ['an unknown strength', { attribute: 'uv_long', value: 'bright' }, ['readings[1].value']],
    ['a censored value without a limit', { attribute: 'ri_spot', value: 'over_limit' }, ['readings[1].limit']],
    ['a censored weight', { attribute: 'weight_ct', value: 'over_limit', limit: 1.81 }, ['readings[1].value']],
    ['an unknown observer', { attribute: 'polariscope', value: 'SR', observer: 'robot' }, ['readings[1].observer']],
    ['a reading that is no object', null, ['readings[1]']],
  ])('is refused for %s, naming the field', (_, reading, fields) => {
    expect(fieldsOf(withReading(reading))).toEqual(fields);
  });

  it.each([
    ['an unknown species', { ...good.recorded, species: 'paste' }, ['recorded.species']],
    ['an unknown flag', { ...good.recorded, flags: ['shiny'] }, ['recorded.flags[0]']],
    ['an unknown colour', { ...good.recorded, colour: 'teal' }, ['recorded.colour']],
    ['an unknown recorded attribute', { ...good.recorded, values: { hardness: 7 } }, ['recorded.values.hardness']],
    ['a recorded number without uncertainty', { ...good.recorded, values: { weight_ct: { value: 1.5 } } }, ['recorded.values.weight_ct.u']],
    ['a bare recorded number', { ...good.recorded, values: { weight_ct: 1.5 } }, ['recorded.values.weight_ct']],
    ['no values', { species: 'topaz' }, ['recorded.values']],
  ])('is refused for %s in the record', (_, recorded, fields) => {
    expect(fieldsOf({ ...good, recorded })).toEqual(fields);
  });

  it('is refused without readings, or with more than a bench takes', () => {
    expect(fieldsOf({ ...good, readings: [] })).toEqual(['readings']);
    expect(fieldsOf({ ...good, readings: Array.from({ length: MAX_READINGS + 1 }, () => good.readings[0]) })).toEqual(['readings']);
    expect(fieldsOf({ ...good, readings: 'none' })).toEqual(['readings']);
    expect(fieldsOf(undefined)).toEqual(['']);
  });

  it('cannot borrow a field from a prototype', () => {
    const borrowed = Object.create({ species: 'topaz', values: {} }) as unknown;
    expect(fieldsOf({ ...good, recorded: borrowed })).toEqual(['recorded.species', 'recorded.values']);
  });
});
