import { WATER_DENSITY_4C, WATER_MAX_C, WATER_MIN_C, waterDensityKgM3 } from './water';

/** Standard uncertainty of the water's temperature when none is given, °C. Common practice, no source. */
export const DEFAULT_U_WATER_C = 0.5;

export interface Weighings {
  readonly airCt: number;
  readonly waterCt: number;
  readonly waterC: number;
  /** Standard uncertainty of each weighing, ct. */
  readonly uCt: number;
  /** Standard uncertainty of the water's temperature, °C. */
  readonly uWaterC?: number;
}

/**
 * Specific gravity, relative to water at 4 °C, from a weighing in air and one in water.
 * S = a / (a − w) · ρw(T)/ρw(4 °C); air buoyancy is left out, as both visits leave it out alike.
 * u(S) by GUM 5.1.2: ∂S/∂a = −S(S−1)/a and ∂S/∂w = S²/a of the uncorrected S, and the slope of the water density.
 * @throws RangeError where the water reading is not below the air reading or the temperature is outside 0–40 °C
 * @example specificGravity({ airCt: 4.02, waterCt: 3.02, waterC: 20, uCt: 0.006 }) // { value: 4.013, u: 0.03 }
 */
export function specificGravity({ airCt, waterCt, waterC, uCt, uWaterC = DEFAULT_U_WATER_C }: Weighings): { value: number; u: number } {
  if (!(airCt > 0 && waterCt >= 0 && waterCt < airCt)) {
    throw new RangeError('the reading in water must be below the reading in air');
  }
  const ratio = airCt / (airCt - waterCt);
  const density = waterDensityKgM3(waterC) / WATER_DENSITY_4C;
  const uRatio = ratioUncertainty({ sg: ratio, airCt, uAirCt: uCt, uWaterCt: uCt });
  const above = waterDensityKgM3(Math.min(waterC + 0.5, WATER_MAX_C));
  const below = waterDensityKgM3(Math.max(waterC - 0.5, WATER_MIN_C));
  const width = Math.min(waterC + 0.5, WATER_MAX_C) - Math.max(waterC - 0.5, WATER_MIN_C);
  const uDensity = (Math.abs(above - below) / width / WATER_DENSITY_4C) * uWaterC;
  return { value: ratio * density, u: Math.hypot(uRatio * density, ratio * uDensity) };
}

/** Standard uncertainty of a / (a − w) from those of both weighings (GUM 5.1.2); `sg` is the ratio itself. */
export function ratioUncertainty({ sg, airCt, uAirCt, uWaterCt }: { sg: number; airCt: number; uAirCt: number; uWaterCt: number }): number {
  return (sg / airCt) * Math.hypot((sg - 1) * uAirCt, sg * uWaterCt);
}

/** Density in g/cm³ with air buoyancy, ρ = S(ρw − ρa) + ρa, where S is the uncorrected ratio a / (a − w). */
export function densityGCm3({ ratio, waterGCm3, airGCm3 = 0.0012 }: { ratio: number; waterGCm3: number; airGCm3?: number }): number {
  return ratio * (waterGCm3 - airGCm3) + airGCm3;
}

/** Pull of the water surface on a hanging wire, in carats: π·d·γ over g (1 ct = 0.2 g). */
export function surfaceTensionPullCt({ wireMm, tensionNPerM = 0.0728 }: { wireMm: number; tensionNPerM?: number }): number {
  const newtons = Math.PI * (wireMm / 1000) * tensionNPerM;
  return newtons / 9.80665 / 0.0002;
}
