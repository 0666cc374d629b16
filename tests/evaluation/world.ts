import type { Attribute, NumberReading, OpticFigure, PolariscopeReaction, ReadingInput, RecordedStone, StoneColour } from '@shared/api/evidence';
import { CATEGORY_VALUES } from '@shared/api/evidence';
import { findMaterial, indexExtent, refractiveIndex, SODIUM_D_UM, speciesById, SPECIES_ROWS } from '@shared/gem';
import type { SpeciesRow } from '@shared/gem';
import type { Slot } from './demoSets';
import type { Random } from './random';

/**
 * The world the engine is judged in. It is deliberately not the engine's model: sizes spread evenly within the trade's
 * tolerance, cabochons have a girdle band and a dome of varying fullness, SG and indices spread evenly over the reference
 * ranges (or follow measured dispersion data), errors are Student's t, slips change digits, and the polariscope is
 * misread at other rates than the engine assumes.
 */
export interface World {
  readonly depthSpread: number;
  readonly freedom: number;
  readonly slipRate: number;
  /** Mean weight of a flake lost in use, for the returns that are chipped. */
  readonly chipMeanCt: number;
  readonly rightReaction: number;
}

export const DEFAULT_WORLD: World = { depthSpread: 0.06, freedom: 5, slipRate: 0.005, chipMeanCt: 0.008, rightReaction: 0.96 };

export interface Stone {
  readonly row: SpeciesRow;
  readonly lengthMm: number;
  readonly widthMm: number;
  readonly heightMm: number;
  readonly weightCt: number;
  readonly sg: number;
  readonly indexLow: number;
  readonly indexHigh: number;
  readonly reaction: PolariscopeReaction;
}

const MATERIAL_OF: Readonly<Record<string, string>> = {
  'rock-crystal': 'quartz', amethyst: 'quartz', citrine: 'quartz', 'smoky-quartz': 'quartz', 'rose-quartz': 'quartz', 'synthetic-quartz': 'quartz',
  sapphire: 'corundum (sapphire)', ruby: 'corundum (sapphire)', 'synthetic-corundum': 'corundum (sapphire)',
  fluorite: 'fluorite', calcite: 'calcite', diamond: 'diamond', yag: 'YAG',
};

/** Measured indices of a fixed composition at the D line, with a trace of scatter; else even over the handbook's range. */
function drawIndices(row: SpeciesRow, random: Random): [number, number] {
  const material = MATERIAL_OF[row.id];
  const rays = material === undefined ? undefined : findMaterial(material)?.rays;
  if (rays !== undefined) {
    const indices = Object.values(rays).map((ray) => refractiveIndex(ray, SODIUM_D_UM));
    const shift = random.between(-0.0006, 0.0006);
    return [Math.min(...indices) + shift, Math.max(...indices) + shift];
  }
  const { low, high } = indexExtent(row);
  const t = random.unit();
  return [low[0] + t * (low[1] - low[0]), high[0] + t * (high[1] - high[0])];
}

const LIGHT_GLASS = 0.5;

/** SG even over the range; half of all glass is common soda-lime or crown near 2.5, as in the trade (no source). */
function drawSg(row: SpeciesRow, random: Random): number {
  if (row.id === 'glass' && random.chance(LIGHT_GLASS)) return random.between(2.42, 2.62);
  return random.between(row.sg[0], row.sg[1]);
}

export function reactionsByWords(row: SpeciesRow): PolariscopeReaction[] {
  const found = CATEGORY_VALUES.polariscope.filter((reaction) => new RegExp(`(^|[^A-Z])${reaction}`).test(row.polariscope));
  return found.length === 0 ? ['AGG'] : found;
}

/** A stone of a species, cut to a nominal size. */
export function drawStone(row: SpeciesRow, slot: Slot, random: Random, world: World): Stone {
  const toleranceMm = slot.lengthMm * slot.widthMm < 50 ? 0.1 : 0.2;
  const lengthMm = slot.lengthMm + random.between(-toleranceMm, toleranceMm);
  const widthMm = slot.widthMm + random.between(-toleranceMm, toleranceMm);
  const heightMm = slot.widthMm * 0.55 * (1 + world.depthSpread * random.normal());
  const girdleMm = random.between(0.03, 0.1) * heightMm;
  const fullness = random.between(0.97, 1.03);
  const volume = fullness * ((Math.PI / 6) * lengthMm * widthMm * (heightMm - girdleMm) + (Math.PI / 4) * lengthMm * widthMm * girdleMm);
  const sg = drawSg(row, random);
  const [indexLow, indexHigh] = drawIndices(row, random);
  return { row, lengthMm, widthMm, heightMm, sg, indexLow, indexHigh, weightCt: volume * sg * 0.005, reaction: random.pick(reactionsByWords(row)) };
}

/** Species a substitute for this slot could be: any that comes in the colour, as often as the table says. */
export function drawSubstituteSpecies(slot: Slot, colour: StoneColour, random: Random): SpeciesRow {
  const others = SPECIES_ROWS.filter((row) => row.id !== slot.species && row.colours.includes(colour));
  return random.weighted(others, (row) => row.substituteWeight);
}

/** The same stone after losing a flake: an exponential weight with the given mean. */
export function chipped(stone: Stone, random: Random, meanCt: number): Stone {
  return { ...stone, weightCt: stone.weightCt + meanCt * Math.log(1 - random.unit()) };
}

const U: Readonly<Record<string, number>> = { weight_ct: 0.006, length_mm: 0.014, width_mm: 0.014, height_mm: 0.014, ri_spot: 0.006, ri_low: 0.0015, ri_high: 0.0015 };
const RECORD_U: Readonly<Record<string, number>> = { weight_ct: 0.004, length_mm: 0.012, width_mm: 0.012, height_mm: 0.012, ri_spot: 0.004, ri_low: 0.001, ri_high: 0.001 };
const STEP: Readonly<Record<string, number>> = { weight_ct: 0.01, length_mm: 0.01, width_mm: 0.01, height_mm: 0.01, ri_spot: 0.01, ri_low: 0.001, ri_high: 0.001 };

function truth(stone: Stone, attribute: Attribute, random: Random): number {
  switch (attribute) {
    case 'length_mm': return stone.lengthMm;
    case 'width_mm': return stone.widthMm;
    case 'height_mm': return stone.heightMm;
    case 'weight_ct': return stone.weightCt;
    case 'ri_low': return stone.indexLow;
    case 'ri_high': return stone.indexHigh;
    default: return random.between(stone.indexLow, stone.indexHigh);
  }
}

/** The record as careful repeated intake would leave it: small errors, no slips. */
export function recordStone(stone: Stone, slot: Slot, random: Random, withSlowTests: boolean): RecordedStone {
  const measured = (attribute: Attribute) => {
    const u = RECORD_U[attribute] ?? 0.01;
    return { value: truth(stone, attribute, random) + u * random.normal(), u };
  };
  const values: RecordedStone['values'] = {
    length_mm: measured('length_mm'), width_mm: measured('width_mm'), height_mm: measured('height_mm'), weight_ct: measured('weight_ct'),
    polariscope: stone.reaction,
  };
  if (withSlowTests) {
    values.ri_spot = stone.indexLow > 1.805 ? { value: 'over_limit', limit: 1.81 } : measured('ri_spot');
    const u = (stone.sg * stone.sg * 0.004) / stone.weightCt;
    values.sg = { value: stone.sg + u * random.normal(), u };
    const figure = figureSeen(stone);
    if (figure !== null) values.optic_figure = figure;
  }
  return { species: slot.species, colour: slot.colour, shape: 'oval', flags: [], values };
}

function figureSeen(stone: Stone): OpticFigure | null {
  if (stone.reaction !== 'DR') return null;
  if (stone.row.group === 'quartz') return 'quartz';
  return stone.row.opticCharacter.startsWith('biaxial') ? 'biaxial' : 'uniaxial';
}

/** A slip of the hand: two digits changed places, one digit read wrong, or the point in the wrong place. */
export function slip(value: number, decimals: number, random: Random): number {
  const digits = Array.from(value.toFixed(decimals).replace('.', ''));
  const kind = random.unit();
  if (kind < 0.4 && digits.length > 1) {
    const i = Math.floor(random.unit() * (digits.length - 1));
    const [a, b] = [digits[i] ?? '0', digits[i + 1] ?? '0'];
    digits[i] = b;
    digits[i + 1] = a;
  } else if (kind < 0.9) {
    const i = Math.floor(random.unit() * digits.length);
    digits[i] = String(Math.floor(random.unit() * 10));
  } else return random.chance(0.5) ? value * 10 : value / 10;
  return Number(digits.join('')) / 10 ** decimals;
}

/** One reading at the return, as an instructor would take it. */
export function readStone(stone: Stone, attribute: Attribute, random: Random, world: World): ReadingInput {
  if (attribute === 'polariscope') return { attribute, value: readReaction(stone, random, world) };
  if (attribute === 'optic_figure') return { attribute, value: readFigure(stone, random) };
  if (attribute === 'optic_sign') {
    const sign = stone.row.opticSign === '-' ? '-' : '+';
    return { attribute, value: random.chance(0.9) ? sign : sign === '+' ? '-' : '+' };
  }
  if (attribute === 'sg') {
    const [airCt, waterCt] = [stone.weightCt, stone.weightCt * (1 - 0.9982 / stone.sg)].map((weight) => weight + 0.006 * random.heavyTailed(world.freedom));
    return { attribute, airCt: airCt ?? 1, waterCt: waterCt ?? 0.5, waterC: 20, uCt: 0.006 };
  }
  return readNumber(stone, attribute, random, world);
}

function readNumber(stone: Stone, attribute: Attribute, random: Random, world: World): ReadingInput {
  const u = U[attribute] ?? 0.01;
  const value = truth(stone, attribute, random) + u * random.heavyTailed(world.freedom);
  if (attribute.startsWith('ri_') && value > 1.81) return { attribute: attribute as 'ri_spot', value: 'over_limit', limit: 1.81 };
  const step = STEP[attribute] ?? 0.01;
  const rounded = Number((Math.round(value / step) * step).toFixed(4));
  const kept = random.chance(world.slipRate) ? slip(rounded, step < 0.01 ? 3 : 2, random) : rounded;
  const usable = attribute.startsWith('ri_') ? kept >= 1.3 && kept <= 2.7 : kept > 0;
  return { attribute: attribute as NumberReading['attribute'], value: usable ? kept : rounded, u };
}

function readReaction(stone: Stone, random: Random, world: World): PolariscopeReaction {
  const right = stone.reaction === 'ADR' ? world.rightReaction - 0.06 : world.rightReaction;
  if (random.chance(right)) return stone.reaction;
  return random.pick(CATEGORY_VALUES.polariscope.filter((reaction) => reaction !== stone.reaction));
}

function readFigure(stone: Stone, random: Random): OpticFigure {
  const figure = figureSeen(stone);
  if (figure === null || !random.chance(0.75)) return 'not_found';
  return random.chance(0.93) ? figure : random.pick(['uniaxial', 'quartz', 'spiral', 'biaxial'] as const);
}

/** The cheap readings of a clean return: calipers, balance, polariscope. */
export const CHEAP_READINGS = ['weight_ct', 'length_mm', 'width_mm', 'height_mm', 'polariscope'] as const satisfies readonly Attribute[];

export function speciesOf(slot: Slot): SpeciesRow {
  return speciesById(slot.species);
}
