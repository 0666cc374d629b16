import type { ReadingInput, RecordedStone, StoneFlag } from '@shared/api/evidence';
import { computeVerdict, DEFAULT_SETTINGS, ENGINE_VERSION } from '@shared/evidence';

const topaz: RecordedStone = {
  species: 'topaz', colour: 'blue', shape: 'oval', flags: [],
  values: {
    weight_ct: { value: 1.566, u: 0.004 }, length_mm: { value: 8.02, u: 0.012 }, width_mm: { value: 6.01, u: 0.012 }, height_mm: { value: 3.52, u: 0.015 },
    ri_spot: { value: 1.62, u: 0.006 }, polariscope: 'DR', optic_figure: 'biaxial',
  },
};

const weight = (value: number): ReadingInput => ({ attribute: 'weight_ct', value, u: 0.006 });
const size = (attribute: 'length_mm' | 'width_mm' | 'height_mm', value: number): ReadingInput => ({ attribute, value, u: 0.014 });
const clean: ReadingInput[] = [
  weight(1.57), size('length_mm', 8.03), size('width_mm', 6), size('height_mm', 3.51), { attribute: 'polariscope', value: 'DR' },
];

const verdictOf = (readings: ReadingInput[], recorded = topaz) => computeVerdict({ recorded, readings }, DEFAULT_SETTINGS, { rankNext: false });
const contributionOf = (readings: ReadingInput[], attribute: string, recorded = topaz) => verdictOf(readings, recorded).contributions.find((entry) => entry.attribute === attribute);

describe('the verdict rule', () => {
  it('finds glass for topaz different on weight, index and polariscope', () => {
    const found = verdictOf([
      { attribute: 'weight_ct', value: 1.104, u: 0.004 }, { attribute: 'ri_spot', value: 1.52, u: 0.006 }, { attribute: 'polariscope', value: 'SR' },
    ]);
    expect(found.verdict).toBe('different');
    expect(found.supports).toBe('another_stone');
    expect(found.alternatives[0]?.species).toBe('glass');
    expect(found.engine).toBe(ENGINE_VERSION);
  });

  it('finds a clean return the same stone on the cheap readings', () => {
    expect(verdictOf(clean)).toMatchObject({ verdict: 'same', supports: 'recorded_stone', cautions: [{ code: 'fragile' }] });
  });

  it('does not call a stone the same while a reading lies more than 3 u off, until it is read again', () => {
    const far = clean.map((reading) => (reading.attribute === 'width_mm' ? size('width_mm', 5.5) : reading));
    expect(verdictOf(far)).toMatchObject({ verdict: 'not_settled' });
    expect(verdictOf(far).log10LR).toBeGreaterThan(2);
    expect(verdictOf([...far, size('width_mm', 6.01)]).verdict).toBe('same');
  });

  it('accepts a lost flake once damage was noted, not before', () => {
    const lost = clean.map((reading) => (reading.attribute === 'weight_ct' ? weight(1.52) : reading));
    expect(verdictOf(lost).verdict).toBe('not_settled');
    expect(verdictOf(lost).cautions.map(({ code }) => code)).toContain('loss_unexplained');
    const noted = lost.map((reading): ReadingInput => (reading.attribute === 'weight_ct' ? { ...reading, explained: 'damage' } : reading));
    expect(verdictOf(noted).verdict).toBe('same');
  });

  it('lets weight be lost more easily than gained, and a porous stone gain', () => {
    const at = (value: number, recorded: RecordedStone) => contributionOf([weight(value)], 'weight_ct', recorded)?.log10LR ?? 0;
    expect(at(1.536, topaz)).toBeGreaterThan(at(1.596, topaz) + 0.1);
    const porous: RecordedStone = { ...topaz, flags: ['porous'] };
    expect(at(1.596, porous)).toBeGreaterThan(at(1.596, topaz) + 0.5);
  });

  it('never calls a stone different on one group read once, however far off', () => {
    const once = verdictOf([weight(0.9), size('length_mm', 6), size('width_mm', 5), size('height_mm', 2.9)]);
    expect(once.verdict).toBe('not_settled');
  });

  it('calls it different on one group whose deviating reading was taken twice', () => {
    const spots: ReadingInput[] = [1.52, 1.521, 1.519].map((value) => ({ attribute: 'ri_spot', value, u: 0.004 }));
    const twice = verdictOf([...spots, { attribute: 'ri_spot', value: 1.522, u: 0.004 }]);
    expect(twice.log10LR).toBeLessThanOrEqual(-4);
    expect(twice.verdict).toBe('different');
  });
});

describe('contributions', () => {
  it('gives z and E_n as in the worked request [z = −0.462 / √(0.004² + 0.004²), E_n half of it]', () => {
    const found = contributionOf([{ attribute: 'weight_ct', value: 1.104, u: 0.004 }], 'weight_ct');
    expect(found?.z).toBeCloseTo(-81.67, 2);
    expect(found?.en).toBeCloseTo(-40.835, 3);
  });

  it('measures a spot from the nearer end of the stone’s own interval, and leaves z out for what is censored or a category', () => {
    const flat: RecordedStone = { ...topaz, values: { ...topaz.values, ri_low: { value: 1.61, u: 0.0015 }, ri_high: { value: 1.62, u: 0.0015 } } };
    expect(contributionOf([{ attribute: 'ri_spot', value: 1.615, u: 0.006 }], 'ri_spot', flat)?.z).toBe(0);
    expect(contributionOf([{ attribute: 'ri_spot', value: 1.632, u: 0.006 }], 'ri_spot', flat)?.z).toBeCloseTo(0.012 / Math.hypot(0.006, 0.0015), 9);
    expect(contributionOf([{ attribute: 'ri_spot', value: 'over_limit', limit: 1.81 }], 'ri_spot')).toMatchObject({ z: null, en: null, value: 'over_limit' });
    expect(contributionOf([{ attribute: 'polariscope', value: 'DR' }], 'polariscope')).toMatchObject({ z: null, u: null });
  });

  it('derives SG and its uncertainty from weighings [methods note 1: 2 ct quartz, 0.01 ct: u = 0.041]', () => {
    const found = contributionOf([{ attribute: 'sg', airCt: 2, waterCt: 2 - 2 / 2.65, waterC: 4, uCt: 0.01 }], 'sg');
    expect(found?.value).toBeCloseTo(2.65, 3);
    expect(found?.u).toBeCloseTo(0.0414, 4);
  });

  it('keeps the instrument’s own part when repeats are averaged, and lets a shared instrument’s offset cancel', () => {
    const reading = (value: number): ReadingInput => ({ attribute: 'weight_ct', value, u: 0.006, uInstrument: 0.004, instrument: 'balance-1' });
    const twice = contributionOf([reading(1.57), reading(1.56)], 'weight_ct');
    expect(twice?.u).toBeCloseTo(Math.hypot(0.004, Math.sqrt((0.006 ** 2 - 0.004 ** 2) / 2)), 9);
    const shared: RecordedStone = { ...topaz, values: { weight_ct: { value: 1.566, u: 0.006, uInstrument: 0.004, instrument: 'balance-1' } } };
    expect(contributionOf([reading(1.58)], 'weight_ct', shared)?.z).toBeCloseTo(0.014 / Math.sqrt(2 * (0.006 ** 2 - 0.004 ** 2)), 6);
  });
});

describe('what the optics can and cannot tell', () => {
  const polariscope = (value: 'SR' | 'DR' | 'ADR', flags: StoneFlag[], observer: 'instructor' | 'student' = 'instructor') => (
    contributionOf([{ attribute: 'polariscope', value, observer }], 'polariscope', { ...topaz, flags })?.log10LR ?? 0);

  it('counts a student’s look for less than an instructor’s', () => {
    expect(polariscope('SR', [], 'student')).toBeGreaterThan(polariscope('SR', []));
  });

  it('forgives darkness in a stone cut axis-up, and confusion in a deep red one', () => {
    expect(polariscope('SR', ['axis_up'])).toBeGreaterThan(polariscope('SR', []) + 0.8);
    expect(polariscope('ADR', ['deep_red'])).toBeGreaterThan(polariscope('ADR', []));
  });

  it('takes a figure not found for almost nothing', () => {
    expect(Math.abs(contributionOf([{ attribute: 'optic_figure', value: 'not_found' }], 'optic_figure')?.log10LR ?? 9)).toBeLessThan(0.02);
  });

  it('agrees with every index above the liquid’s limit and contradicts those clearly below [n 1.833 over a 1.81 liquid, read: prettyrock.com]', () => {
    const yag: RecordedStone = { species: 'yag', values: { ri_spot: { value: 'over_limit', limit: 1.81 } } };
    const over: ReadingInput[] = [{ attribute: 'ri_spot', value: 'over_limit', limit: 1.81 }];
    expect(verdictOf(over, yag).log10LR).toBeGreaterThan(0.3);
    expect(verdictOf(over).log10LR).toBeLessThan(-1.5);
    expect(verdictOf([{ attribute: 'ri_spot', value: 1.62, u: 0.006 }], yag).log10LR).toBeLessThan(-1.5);
  });

  it('learns nothing of which quartz it is from an agreeing SG [methods note 5: LR near 1 inside quartz]', () => {
    const quartz: RecordedStone = { species: 'amethyst', colour: 'violet', values: { sg: { value: 2.65, u: 0.01 } } };
    const onlyQuartz = { ...DEFAULT_SETTINGS, substitutes: { ...DEFAULT_SETTINGS.substitutes, recordedSpecies: 1 } };
    const found = computeVerdict({ recorded: quartz, readings: [{ attribute: 'sg', value: 2.652, u: 0.01 }] }, onlyQuartz, { rankNext: false });
    expect(Math.abs(found.log10LR)).toBeLessThan(0.25);
  });
});
