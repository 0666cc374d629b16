import type { ReadingInput, RecordedStone } from '@shared/api/evidence';
import { computeVerdict } from '@shared/evidence';

const values: RecordedStone['values'] = {
  weight_ct: { value: 1.17, u: 0.004 }, length_mm: { value: 8.02, u: 0.012 }, width_mm: { value: 6.01, u: 0.012 }, height_mm: { value: 3.4, u: 0.012 },
  ri_spot: { value: 1.548, u: 0.005 }, sg: { value: 2.65, u: 0.02 }, polariscope: 'DR', optic_figure: 'quartz',
};
const amethyst: RecordedStone = { species: 'amethyst', colour: 'violet', values };
const attributesOf = (recorded: RecordedStone, readings: ReadingInput[], unavailable: 'sg'[] = []) => (
  computeVerdict({ recorded, readings, unavailable }).next.map(({ attribute }) => attribute));

const polariscope: ReadingInput[] = [{ attribute: 'polariscope', value: 'DR' }];

describe('the next best reading', () => {
  it('is nothing once the verdict is settled', () => {
    const readings: ReadingInput[] = [
      { attribute: 'weight_ct', value: 1.17, u: 0.006 }, { attribute: 'length_mm', value: 8.02, u: 0.014 }, { attribute: 'width_mm', value: 6.01, u: 0.014 },
      { attribute: 'height_mm', value: 3.4, u: 0.014 }, ...polariscope,
    ];
    expect(computeVerdict({ recorded: amethyst, readings })).toMatchObject({ verdict: 'same', next: [] });
  });

  it('is to take the reading again that lies far off', () => {
    const readings: ReadingInput[] = [
      { attribute: 'weight_ct', value: 1.17, u: 0.006 }, { attribute: 'length_mm', value: 8.02, u: 0.014 }, { attribute: 'width_mm', value: 6.1, u: 0.014 },
      { attribute: 'height_mm', value: 3.4, u: 0.014 }, ...polariscope,
    ];
    const [first] = computeVerdict({ recorded: amethyst, readings }).next;
    expect(first).toMatchObject({ attribute: 'width_mm', repeat: true });
    expect(first?.settles).toBeGreaterThan(0.2);
  });

  it('never needs contact liquid or water on a stone that drinks, nor what the lab cannot read', () => {
    const opal: RecordedStone = { ...amethyst, species: 'opal', colour: 'white' };
    const offered = attributesOf(opal, polariscope);
    expect(offered).toContain('weight_ct');
    expect(offered.filter((attribute) => attribute.startsWith('ri_') || attribute === 'sg')).toEqual([]);
    expect(attributesOf(amethyst, polariscope, ['sg'])).not.toContain('sg');
  });

  it('gives chances and bits within their bounds, and seconds to do it in', () => {
    for (const next of computeVerdict({ recorded: amethyst, readings: polariscope }).next) {
      expect(next.settles).toBeGreaterThanOrEqual(0);
      expect(next.settles).toBeLessThanOrEqual(1 + 1e-9);
      expect(next.bits).toBeGreaterThanOrEqual(0);
      expect(next.bits).toBeLessThanOrEqual(1);
      expect(next.seconds).toBeGreaterThan(0);
    }
  });

  it('says so when no reading is left, and leaves it to two people', () => {
    const bare: RecordedStone = { species: 'turquoise', colour: 'blue', values: {} };
    const found = computeVerdict({ recorded: bare, readings: [{ attribute: 'weight_ct', value: 2, u: 0.006 }] });
    expect(found).toMatchObject({ verdict: 'not_settled', next: [] });
    expect(found.cautions.map(({ code }) => code)).toContain('no_reading_left');
  });

  it('warns of contact liquid when it proposes a refractometer reading', () => {
    const found = computeVerdict({ recorded: amethyst, readings: polariscope });
    expect(found.next.some(({ attribute }) => attribute === 'ri_spot')).toBe(true);
    expect(found.cautions.map(({ code }) => code)).toContain('contact_liquid_harms_health');
  });
});
