import { encodeChannel, linearWeights, wavelengthsNm, wavelengthStepNm, type Triple } from './cie';

/** Past this retardation every wavelength is mixed and the light is white of a high order, nm. */
const longestNm = 16_000;
const stepNm = 8;

/**
 * Colour of a retarder between crossed polars by its retardation, in linear light:
 * intensity = linear(Γ) · sin²2ψ + rotated(Γ), ψ being the azimuth of its slow direction from the polariser.
 * `mean` gives the average over a stretch of retardation, so that rings finer than a pixel fade instead of flickering.
 */
export interface RetardationColours {
  mean(retardationNm: number, stretchNm: number, sine2: number, out: Float64Array): void;
}

/**
 * Intensity behind crossed polars of an elliptical retarder: |M₁₂|² of its Jones matrix
 * M = cos(Δ/2)·1 − i·sin(Δ/2)·[(δ/Δ)(cos2ψ·σz + sin2ψ·σx) + (2φ/Δ)·σy],  Δ² = δ² + (2φ)².
 * @param delta linear retardance δ, rad
 * @param turn rotation φ of the plane of polarisation along the path, rad
 * @param azimuth ψ, rad
 * @returns 0 (dark) to 1
 */
export function crossedIntensity({ delta, turn, azimuth }: { delta: number; turn: number; azimuth: number }): number {
  const total = Math.hypot(delta, 2 * turn);
  if (total === 0) return 0;
  const passed = Math.sin(total / 2) ** 2;
  const linear = (delta / total) * Math.sin(2 * azimuth);
  const rotated = (2 * turn) / total;
  return passed * (linear * linear + rotated * rotated);
}

/**
 * Rotation of plane-polarised light along the optic axis of quartz.
 * One Drude term fitted to 17.3, 21.7, 25.5, 32.8 and 41.5 °/mm at 656, 589, 546, 486 and 436 nm
 * (values from memory of the CRC Handbook; the fit stays within 0.1 °/mm of them).
 * @param perMmAtD rotation at sodium D (589.3 nm), degrees per mm; quartz 21.7
 * @returns degrees per mm at `nm`
 */
export function rotationDegPerMm(nm: number, perMmAtD: number): number {
  const resonance = 0.01815; // µm²
  const drude = (wavelength: number) => 1 / ((wavelength / 1000) ** 2 - resonance);
  return (perMmAtD * drude(nm)) / drude(589.3);
}

/** What of a wavelength does not change from one retardation to the next, laid out flat because the loop over it is hot. */
const samples = {
  count: wavelengthsNm.length,
  /** Retardance of 1 nm of path difference, rad. */
  retardance: Float64Array.from(wavelengthsNm, (nm) => (2 * Math.PI) / nm),
  /** Half the spread of that retardance over the sample's band, rad. */
  halfBand: Float64Array.from(wavelengthsNm, (nm) => (Math.PI * wavelengthStepNm) / (nm * nm)),
  weights: Float64Array.from(linearWeights.flat()),
};

const known = new Map<number, RetardationColours>();
const mostKnown = 24;

/**
 * Tables for one stone, kept for the next of its kind.
 * @param turnDegAtD whole rotation along the path at sodium D, degrees; 0 for all but quartz
 */
export function retardationColours(turnDegAtD: number): RetardationColours {
  const before = known.get(turnDegAtD);
  if (before) return before;
  const colours = buildColours(turnDegAtD);
  if (known.size >= mostKnown) known.delete(known.keys().next().value ?? 0);
  known.set(turnDegAtD, colours);
  return colours;
}

function buildColours(turnDegAtD: number): RetardationColours {
  const length = Math.floor(longestNm / stepNm) + 1;
  const linear = new Float64Array(3 * (length + 1));
  const rotated = new Float64Array(3 * (length + 1));
  const turns = Float64Array.from(wavelengthsNm, (nm) => (turnDegAtD === 0 ? 0 : (rotationDegPerMm(nm, turnDegAtD) * Math.PI) / 180));
  for (let index = 0; index < length; index++) addEntry(index, turns, linear, rotated);
  return { mean: (retardation, stretch, sine2, out) => mean({ linear, rotated, length }, { retardation, stretch, sine2 }, out) };
}

/** Appends entry `index` to the running sums. */
function addEntry(index: number, turns: Float64Array, linear: Float64Array, rotated: Float64Array): void {
  const { cos, sqrt } = Math;
  const { count, retardance, halfBand, weights } = samples;
  const retardation = index * stepNm;
  const at = 3 * index;
  let [lr, lg, lb, rr, rg, rb] = [0, 0, 0, 0, 0, 0];
  for (let w = 0; w < count; w++) {
    const delta = retardance[w]! * retardation;
    const turn = turns[w]!;
    const total2 = delta * delta + 4 * turn * turn;
    if (total2 === 0) continue;
    // Each sample stands for a band; over it cos Δ averages to cos Δ · sinc, which lets high orders fade to white.
    const passed = (1 - cos(sqrt(total2)) * sinc(halfBand[w]! * retardation)) / 2;
    const l = (passed * delta * delta) / total2;
    const r = passed - l;
    const [red, green, blue] = [weights[3 * w]!, weights[3 * w + 1]!, weights[3 * w + 2]!];
    lr += l * red;
    lg += l * green;
    lb += l * blue;
    rr += r * red;
    rg += r * green;
    rb += r * blue;
  }
  append(linear, at, lr, lg, lb);
  append(rotated, at, rr, rg, rb);
}

function append(sums: Float64Array, at: number, r: number, g: number, b: number): void {
  sums[at + 3] = sums[at]! + r;
  sums[at + 4] = sums[at + 1]! + g;
  sums[at + 5] = sums[at + 2]! + b;
}

interface Tables {
  linear: Float64Array;
  rotated: Float64Array;
  length: number;
}

/** Box average between two retardations; both ends may fall inside a table step, so that slow gradients show no bands. */
function mean({ linear, rotated, length }: Tables, at: { retardation: number; stretch: number; sine2: number }, out: Float64Array): void {
  const width = Math.max(at.stretch / stepNm, 1);
  const middle = Math.min(Math.max(at.retardation / stepNm + 0.5, width / 2), length - width / 2);
  const low = Math.max(0, middle - width / 2);
  const high = Math.min(length, middle + width / 2);
  for (let channel = 0; channel < 3; channel++) {
    const l = sumTo(linear, high, channel) - sumTo(linear, low, channel);
    const r = sumTo(rotated, high, channel) - sumTo(rotated, low, channel);
    out[channel] = (l * at.sine2 + r) / (high - low);
  }
}

function sumTo(sums: Float64Array, end: number, channel: number): number {
  const whole = Math.min(Math.floor(end), sums.length / 3 - 2);
  const before = sums[3 * whole + channel]!;
  return before + (end - whole) * (sums[3 * whole + 3 + channel]! - before);
}

function sinc(x: number): number {
  return x === 0 ? 1 : Math.sin(x) / x;
}

/**
 * Interference colour of one retardation in the brightest position (the series of the Michel-Lévy chart).
 * @param retardationNm path difference, nm, 0 or more
 * @returns sRGB, 0…255 each
 */
export function retardationColour(retardationNm: number): Triple {
  if (!(retardationNm >= 0)) throw new RangeError('A retardation is 0 nm or more');
  let [r, g, b] = [0, 0, 0];
  wavelengthsNm.forEach((nm, index) => {
    const passed = (1 - Math.cos((2 * Math.PI * retardationNm) / nm) * sinc((Math.PI * retardationNm * wavelengthStepNm) / (nm * nm))) / 2;
    const weight = linearWeights[index]!;
    r += passed * weight[0];
    g += passed * weight[1];
    b += passed * weight[2];
  });
  return [encodeChannel(r), encodeChannel(g), encodeChannel(b)];
}

/** The colour series as `count` CSS colours at equal steps of retardation; the default shows the first three orders. */
export function colourSeries(count: number, fromNm = 0, toNm = 1700): string[] {
  return Array.from({ length: count }, (_, index) => {
    const [r, g, b] = retardationColour(fromNm + ((toNm - fromNm) * index) / Math.max(1, count - 1));
    return `rgb(${r}, ${g}, ${b})`;
  });
}
