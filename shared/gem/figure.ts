import { encodeChannel } from './cie';
import { retardationColours, type RetardationColours } from './figureColour';
import { grainField, strainField } from './figureTexture';

/**
 * The interference picture of a stone between crossed polars in convergent light (a conoscope): what the table of a
 * polariscope with a sphere on the stone shows. Polariser and analyser stand upright and level.
 */
export type FigureParameters =
  | { kind: 'dark' }
  | { kind: 'strain'; pattern: 'bands' | 'tabby'; seed: number }
  | { kind: 'aggregate'; seed: number }
  | AxialFigure;

export interface AxialFigure {
  kind: 'axial';
  /** Greatest birefringence, 0 to 0.3. */
  birefringence: number;
  /** Plate thickness along the view, mm. */
  thicknessMm: number;
  /** Angle between the optic axes, degrees; 0 for a uniaxial stone. */
  axialAngleDeg: number;
  /** Turn of the stone on the stage, degrees; a biaxial figure parts its brushes most at 45. */
  turnDeg: number;
  /** Half angle of the cone of light inside the stone, degrees: how far round the sight line the field reaches. */
  coneDeg: number;
  /** Rotation of the plane of polarisation along the axis at sodium D, degrees per mm: quartz 21.7, others 0. */
  rotationDegPerMm: number;
  /** `bisectrix` looks between the axes, `axis` along one of them. The same for a uniaxial stone. */
  view: 'bisectrix' | 'axis';
}

/**
 * Computes the picture.
 * Retardation Γ = t·Δn·sin θ₁·sin θ₂ / cos θ (θ₁, θ₂ to the optic axes; exact enough for small Δn), vibration
 * directions by Biot and Fresnel's rule, intensity from the Jones matrix of an elliptical retarder per wavelength,
 * summed over the CIE 1931 observer to sRGB. The rotation of quartz is taken as along the axis everywhere; off the axis
 * the retardation soon outweighs it.
 * @param size side of the square picture, whole pixels, 1 to 2048
 * @returns RGBA, row by row; the disc's outside is transparent
 * @throws RangeError for a size or a parameter outside its range
 */
export function computeFigure(parameters: FigureParameters, size: number): Uint8ClampedArray {
  if (!Number.isInteger(size) || size < 1 || size > 2048) throw new RangeError('A figure is 1 to 2048 whole pixels wide');
  const picture = new Uint8ClampedArray(4 * size * size);
  const field = fieldOf(parameters, size);
  const light = new Float64Array(3);
  for (let y = 0; y < size; y++) {
    for (let x = 0; x < size; x++) {
      const cover = discCover(x, y, size);
      if (cover === 0) continue;
      const at = 4 * (y * size + x);
      light.fill(0);
      field?.(x, y, light);
      for (let channel = 0; channel < 3; channel++) picture[at + channel] = encodeChannel(light[channel]!);
      picture[at + 3] = Math.round(255 * cover);
    }
  }
  return picture;
}

/** Writes the linear light of one pixel. */
type LightField = (x: number, y: number, out: Float64Array) => void;

function fieldOf(parameters: FigureParameters, size: number): LightField | null {
  switch (parameters.kind) {
    case 'dark':
      return null;
    case 'axial':
      return axialField(checked(parameters), size);
    case 'strain':
      return strainField(parameters, size, retardationColours(0));
    case 'aggregate':
      return grainField(parameters.seed, size, retardationColours(0));
  }
}

function checked(p: AxialFigure): AxialFigure {
  const within = (value: number, low: number, high: number) => value >= low && value <= high;
  if (!within(p.birefringence, 0, 0.3)) throw new RangeError('Birefringence is 0 to 0.3');
  if (!within(p.thicknessMm, 0.001, 50)) throw new RangeError('Thickness is 0.001 to 50 mm');
  if (!within(p.axialAngleDeg, 0, 90)) throw new RangeError('The angle between the optic axes is 0 to 90 degrees');
  if (!within(p.coneDeg, 1, 60)) throw new RangeError('The cone is 1 to 60 degrees to a side');
  if (!Number.isFinite(p.turnDeg) || !within(p.rotationDegPerMm, 0, 200)) throw new RangeError('Turn and rotation are finite angles');
  return p;
}

/** Share of a pixel inside the disc, with a soft edge of one pixel. */
function discCover(x: number, y: number, size: number): number {
  const distance = Math.hypot(x + 0.5 - size / 2, y + 0.5 - size / 2);
  return Math.min(1, Math.max(0, size / 2 - distance + 0.5));
}

function axialField(p: AxialFigure, size: number): LightField {
  const colours = retardationColours(p.rotationDegPerMm * p.thicknessMm);
  const axes = opticAxes(p);
  const pathNm = p.thicknessMm * 1e6 * p.birefringence;
  const edge = Math.sin(toRad(p.coneDeg));
  // One column and one row more than the picture: the step to the next pixel tells how much of a ring a pixel holds.
  const side = size + 1;
  const retardations = new Float64Array(side * side);
  const sines = new Float64Array(side * side);
  for (let at = 0; at < side * side; at++) {
    const [u, v] = [(2 * ((at % side) + 0.5)) / size - 1, 1 - (2 * (Math.floor(at / side) + 0.5)) / size];
    const { retardation, sine2 } = opticsAt(u, v, { axes, pathNm, edge });
    retardations[at] = retardation;
    sines[at] = sine2;
  }
  return (x, y, out) => {
    const at = y * side + x;
    const here = retardations[at]!;
    const stretch = Math.max(Math.abs(retardations[at + 1]! - here), Math.abs(retardations[at + side]! - here));
    colours.mean(here, stretch, sines[at]!, out);
  };
}

type Vector = readonly [number, number, number];

/** The two optic axes as unit vectors; z is the line of sight, x and y the polars. */
function opticAxes({ axialAngleDeg, turnDeg, view }: AxialFigure): readonly [Vector, Vector] {
  const half = toRad(axialAngleDeg) / 2;
  const [first, second] = view === 'axis' ? [0, 2 * half] : [half, -half];
  const turn = toRad(turnDeg);
  const axis = (tilt: number): Vector => [Math.sin(tilt) * Math.cos(turn), Math.sin(tilt) * Math.sin(turn), Math.cos(tilt)];
  return [axis(first), axis(second)];
}

/** Retardation (nm) and sin² of twice the slow direction's azimuth, for the ray that meets the field at (u, v), −1 to 1. */
function opticsAt(u: number, v: number, { axes, pathNm, edge }: { axes: readonly [Vector, Vector]; pathNm: number; edge: number }) {
  const radius = Math.min(1.1, Math.hypot(u, v));
  const scale = radius === 0 ? 0 : (radius * edge) / Math.hypot(u, v);
  const [kx, ky] = [u * scale, v * scale];
  const kz = Math.sqrt(1 - kx * kx - ky * ky);
  const first = flattened(axes[0], kx, ky, kz);
  const second = flattened(axes[1], kx, ky, kz);
  const retardation = (pathNm * first.sine * second.sine) / kz;
  // The vibration directions bisect the two planes that hold the ray and an optic axis, so their doubled azimuths add.
  const doubled = first.azimuth + second.azimuth;
  return { retardation, sine2: Math.sin(doubled) ** 2 };
}

/** The part of an optic axis across the ray, as it lies once the lens has made the ray parallel to the sight line. */
function flattened(axis: Vector, kx: number, ky: number, kz: number): { sine: number; azimuth: number } {
  const along = axis[0] * kx + axis[1] * ky + axis[2] * kz;
  const [px, py, pz] = [axis[0] - along * kx, axis[1] - along * ky, axis[2] - along * kz];
  const lift = pz / (1 + kz);
  return { sine: Math.hypot(px, py, pz), azimuth: Math.atan2(py - lift * ky, px - lift * kx) };
}

function toRad(degrees: number): number {
  return (degrees * Math.PI) / 180;
}

export type { RetardationColours };
