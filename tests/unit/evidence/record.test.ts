import type { ReadingInput, RecordedStone } from '@shared/api/evidence';
import { estimateRecord, recordGaps } from '@shared/evidence';

describe('a record from intake readings', () => {
  const weigh = (value: number): ReadingInput => ({ attribute: 'weight_ct', value, u: 0.006, uInstrument: 0.003, instrument: 'balance-1' });

  it('is the mean, whose repeatability shrinks with √n while the balance’s own part stays [GUM 4.2, 5.1]', () => {
    const found = estimateRecord([weigh(1.57), weigh(1.56), weigh(1.565), weigh(1.565)]).weight_ct;
    expect(found).toMatchObject({ n: 4, instrument: 'balance-1', uInstrument: 0.003 });
    expect(found?.value).toBeCloseTo(1.565, 9);
    expect(found?.u).toBeCloseTo(Math.hypot(0.003, Math.sqrt((0.006 ** 2 - 0.003 ** 2) / 4)), 9);
  });

  it('believes the scatter where it exceeds what the instrument promises', () => {
    const values = [1.5, 1.6, 1.7];
    const found = estimateRecord(values.map(weigh)).weight_ct;
    expect(found?.u).toBeCloseTo(Math.hypot(0.1 / Math.sqrt(3), 0.003), 6);
  });

  it('turns weighings into SG, keeps the category most readers saw, and what is over the limit', () => {
    const found = estimateRecord([
      { attribute: 'sg', airCt: 2, waterCt: 1.24528, waterC: 20, uCt: 0.006 },
      { attribute: 'polariscope', value: 'SR' }, { attribute: 'polariscope', value: 'ADR' }, { attribute: 'polariscope', value: 'ADR' },
      { attribute: 'ri_spot', value: 'over_limit', limit: 1.81 },
    ]);
    expect(found).toMatchObject({ polariscope: 'ADR', ri_spot: { value: 'over_limit', limit: 1.81 } });
    expect(found.sg).toMatchObject({ n: 1 });
    expect(found.sg && 'value' in found.sg ? found.sg.value : 0).toBeCloseTo(2.645, 2);
    expect(Object.keys(found).sort()).toEqual(['polariscope', 'ri_spot', 'sg']);
  });
});

describe('what a record lacks', () => {
  const number = { value: 2, u: 0.01 };
  const body = { weight_ct: number, length_mm: number, width_mm: number, height_mm: number };
  const lacking = (species: string, values: RecordedStone['values'], flags: RecordedStone['flags'] = []) => recordGaps({ species, flags, values }).map(({ attribute }) => attribute);

  it('is nothing for a stone with weight, sizes, polariscope and one test of its species', () => {
    expect(lacking('topaz', { ...body, polariscope: 'DR', ri_spot: { value: 1.62, u: 0.006 } })).toEqual([]);
    expect(lacking('topaz', { ...body, polariscope: 'DR', sg: { value: 3.56, u: 0.02 } })).toEqual([]);
  });

  it('is each missing measurement, by name', () => {
    expect(lacking('topaz', {})).toEqual(['weight_ct', 'length_mm', 'width_mm', 'height_mm', 'polariscope', 'ri_spot']);
  });

  it('never asks for contact liquid where it would harm, nor for water where the stone drinks', () => {
    expect(lacking('amber', { ...body, polariscope: 'ADR' })).toEqual(['sg']);
    expect(lacking('opal', { ...body, polariscope: 'AGG' })).toEqual([]);
    expect(lacking('turquoise', body)).toEqual([]);
  });

  it('asks for the species first where there is none', () => {
    const gaps = recordGaps({ species: 'unknown', values: {} });
    expect(gaps.map(({ attribute }) => attribute)).toEqual([null]);
    expect(gaps[0]?.message).toContain('species');
  });
});
