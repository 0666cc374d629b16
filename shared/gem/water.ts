/** Density of water at 4 °C, kg/m³, to which specific gravity refers (Tanaka et al. 2001). */
export const WATER_DENSITY_4C = 999.9749;

/** Range over which Tanaka's formula holds, °C. */
export const WATER_MIN_C = 0;
export const WATER_MAX_C = 40;

const A1 = -3.983035;
const A2 = 301.797;
const A3 = 522528.9;
const A4 = 69.34881;
const A5 = 999.97495;

/**
 * Density of air-free water at 101 325 Pa, kg/m³.
 * M. Tanaka, G. Girard, R. Davis, A. Peuto, N. Bignell, Metrologia 38, 301 (2001).
 * (Kell's 1975 formula is often copied with a misprinted denominator, wrong by 0.27 kg/m³: do not use it.)
 * @param temperatureC 0–40 °C
 * @throws RangeError outside that range or for NaN
 */
export function waterDensityKgM3(temperatureC: number): number {
  if (!(temperatureC >= WATER_MIN_C && temperatureC <= WATER_MAX_C)) {
    throw new RangeError('water density holds from 0 to 40 °C');
  }
  const t = temperatureC;
  return A5 * (1 - ((t + A1) ** 2 * (t + A2)) / (A3 * (t + A4)));
}
