/**
 * From a spectrum to a colour on a screen. The CIE 1931 2° observer by the multi-lobe fit of
 * Wyman, Sloan & Shirley, "Simple Analytic Approximations to the CIE XYZ Color Matching Functions",
 * Journal of Computer Graphics Techniques 2(2), 2013. sRGB by IEC 61966-2-1.
 */

export type Triple = readonly [number, number, number];

/** Wavelengths the pictures are summed over, nm. The step is also the bandwidth of each sample. */
export const wavelengthStepNm = 10;
export const wavelengthsNm: readonly number[] = Array.from({ length: 33 }, (_, index) => 390 + index * wavelengthStepNm);

/** One lobe of the fit: a Gaussian with a different width on either side of its peak. */
function lobe(nm: number, peak: number, below: number, above: number): number {
  const t = (nm - peak) / (nm < peak ? below : above);
  return Math.exp(-0.5 * t * t);
}

/**
 * Colour matching functions of the CIE 1931 2° observer.
 * @param nm wavelength in vacuum, nm; useful from 380 to 780, near zero outside
 * @returns x̄, ȳ, z̄ (dimensionless); the fit stays within about 0.02 of the tabulated values (the paper's figure 1)
 */
export function colourMatching(nm: number): Triple {
  return [
    1.056 * lobe(nm, 599.8, 37.9, 31.0) + 0.362 * lobe(nm, 442.0, 16.0, 26.7) - 0.065 * lobe(nm, 501.1, 20.4, 26.2),
    0.821 * lobe(nm, 568.8, 46.9, 40.5) + 0.286 * lobe(nm, 530.9, 16.3, 31.1),
    1.217 * lobe(nm, 437.0, 11.8, 36.0) + 0.681 * lobe(nm, 459.0, 26.0, 13.8),
  ];
}

/** White of sRGB (D65), as XYZ with Y = 1. */
const d65: Triple = [0.95047, 1, 1.08883];

const xyzToLinear: readonly Triple[] = [
  [3.2404542, -1.5371385, -0.4985314],
  [-0.969266, 1.8760108, 0.041556],
  [0.0556434, -0.2040259, 1.0572252],
];

/**
 * What each sampled wavelength adds to linear sRGB when it passes in full. The columns sum to (1, 1, 1): light of all
 * wavelengths is the screen's white, as the lamp of a polariscope is white to an eye used to it (scaling of XYZ).
 */
export const linearWeights: readonly Triple[] = buildWeights();

function buildWeights(): Triple[] {
  const samples = wavelengthsNm.map(colourMatching);
  const total = samples.reduce<[number, number, number]>((sum, s) => [sum[0] + s[0], sum[1] + s[1], sum[2] + s[2]], [0, 0, 0]);
  const weights = samples.map((s): Triple => toLinear([(s[0] / total[0]) * d65[0], (s[1] / total[1]) * d65[1], (s[2] / total[2]) * d65[2]]));
  return weights;
}

/** XYZ (white: D65, Y = 1) to linear sRGB; parts of a colour outside the screen's range come out below 0 or above 1. */
export function toLinear(xyz: Triple): Triple {
  const [r, g, b] = xyzToLinear.map((row) => row[0] * xyz[0] + row[1] * xyz[1] + row[2] * xyz[2]) as [number, number, number];
  return [r, g, b];
}

const encodeSteps = 4096;
const encodeTable = Uint8ClampedArray.from({ length: encodeSteps + 1 }, (_, index) => Math.round(255 * gamma(index / encodeSteps)));

/** One linear channel (clipped to 0…1) to the 0…255 of sRGB. */
export function encodeChannel(linear: number): number {
  const clipped = linear <= 0 ? 0 : linear >= 1 ? 1 : linear;
  return encodeTable[Math.round(clipped * encodeSteps)] ?? 0;
}

function gamma(linear: number): number {
  return linear <= 0.0031308 ? 12.92 * linear : 1.055 * linear ** (1 / 2.4) - 0.055;
}
