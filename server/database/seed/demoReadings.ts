import type { ReadingEntry } from '@shared/api/kits';
import type { InstrumentKind } from '@shared/api/instruments';
import { cabochonWeightCt, WATER_DENSITY_4C, waterDensityKgM3 } from '@shared/gem';
import type { StoneTruth } from './truth';

/** Register ids of a demo school's instruments. */
export type DemoInstruments = Readonly<Record<Exclude<InstrumentKind, 'uv_lamp' | 'thermometer'>, string>>;

const repeats = 3;
const waterC = 20.5;
/** How much repeated readings of one stone scatter, below what the register promises for a single one. */
const scatter = { weightCt: 0.003, sizeMm: 0.007, spot: 0.004, flat: 0.0007 };

/** The true weight of a stone, ct. */
export function trueWeightCt({ sizeMm: [lengthMm, widthMm, heightMm], sg, fullness }: StoneTruth): number {
  return fullness * cabochonWeightCt({ lengthMm, widthMm, heightMm }, sg);
}

/** The intake readings of a stone, each taken three times. The same seed gives the same readings. */
export function intakeEntries(stone: StoneTruth, instruments: DemoInstruments, seed: number): ReadingEntry[] {
  const noise = gaussian(seed);
  const near = (value: number, spread: number, step: number): number => roundTo(value + spread * noise(), step);
  const [lengthMm, widthMm, heightMm] = stone.sizeMm;
  const weightCt = trueWeightCt(stone);
  const size = (attribute: 'length_mm' | 'width_mm' | 'height_mm', mm: number): ReadingEntry[] =>
    times(repeats, () => ({ attribute, value: near(mm, scatter.sizeMm, 0.01), instrumentId: instruments.caliper }));
  return [
    ...times(repeats, () => ({ attribute: 'weight_ct' as const, value: near(weightCt, scatter.weightCt, 0.01), instrumentId: instruments.balance })),
    ...size('length_mm', lengthMm), ...size('width_mm', widthMm), ...size('height_mm', heightMm),
    ...opticEntries(stone, instruments),
    ...indexEntries(stone, instruments, near),
    ...(stone.weighedInWater ? times(repeats, () => weighing(weightCt, stone.sg, instruments, near)) : []),
  ];
}

function opticEntries({ polariscope, figure, sign }: StoneTruth, instruments: DemoInstruments): ReadingEntry[] {
  const instrumentId = instruments.polariscope;
  return [
    ...(polariscope === undefined ? [] : times(repeats, () => ({ attribute: 'polariscope' as const, category: polariscope, instrumentId }))),
    ...(figure === undefined ? [] : times(repeats, () => ({ attribute: 'optic_figure' as const, category: figure, instrumentId }))),
    ...(sign === undefined ? [] : times(repeats, () => ({ attribute: 'optic_sign' as const, category: sign, instrumentId }))),
  ];
}

type Near = (value: number, spread: number, step: number) => number;

function indexEntries({ spot, flat }: StoneTruth, instruments: DemoInstruments, near: Near): ReadingEntry[] {
  const instrumentId = instruments.refractometer;
  const spots = times(repeats, (): ReadingEntry => (spot === 'over_limit'
    ? { attribute: 'ri_spot', overLimit: true, instrumentId }
    : { attribute: 'ri_spot', value: near(spot ?? 0, scatter.spot, 0.01), instrumentId }));
  const flats = times(repeats, (): ReadingEntry[] => (flat ?? []).map((index, end) => (
    { attribute: end === 0 ? 'ri_low' : 'ri_high', value: near(index, scatter.flat, 0.001), instrumentId })));
  return [...(spot === undefined ? [] : spots), ...flats.flat()];
}

/** In water of density ρ a stone of SG S weighs a·(1 − ρ/S), with ρ relative to water at 4 °C. */
function weighing(weightCt: number, sg: number, instruments: DemoInstruments, near: Near): ReadingEntry {
  const inWaterCt = weightCt * (1 - waterDensityKgM3(waterC) / WATER_DENSITY_4C / sg);
  const { weightCt: spread } = scatter;
  return { attribute: 'sg', airCt: near(weightCt, spread, 0.01), waterCt: near(inWaterCt, spread, 0.01), waterC, instrumentId: instruments.balance };
}

const times = <T>(count: number, make: () => T): T[] => Array.from({ length: count }, make);

function roundTo(value: number, step: number): number {
  const digits = Math.round(-Math.log10(step));
  return Number(value.toFixed(digits));
}

/** Standard normal numbers from a fixed seed: Box and Muller's method over a 32-bit mixing generator. */
function gaussian(seed: number): () => number {
  let state = (seed * 0x9e3779b1) >>> 0;
  const uniform = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
  return () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
}
