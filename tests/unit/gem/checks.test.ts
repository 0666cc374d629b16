import {
  axialAngle2VzDeg, cabochonWeightCt, chemicalEnergy, compatibilityIndex, compatibilityWord, densityGCm3, dispersionBG, findMaterial, ratioUncertainty,
  refractiveIndex, specificGravity, surfaceTensionPullCt, waterDensityKgM3, WATER_DENSITY_4C,
} from '@shared/gem';
import type { DispersionFormula } from '@shared/gem';
import { combinedU, conformanceProbability, enScore, rectangularU, supportOf, twoLevelLR, weightMatchChance, zetaScore } from '@shared/evidence';
import { normalCdf, normalQuantile } from '@shared/evidence/normal';
import rows from './checks.json';

/**
 * Check values for the gem figures and the statistics, each with its source in `checks.json`: "read" where inputs and
 * formula stood in a stored source, "memory" where they come from a handbook or standard, "common practice" where there
 * is none. The values were computed by another program, unless `expectedFrom` says the source itself states them.
 */
interface Check { name: string; inputs: Record<string, unknown>; expected: unknown; tolerance: number; source: string; sourceKind: string }

const checks = rows as Check[];
const num = (check: Check, name: string): number => {
  const value = check.inputs[name];
  if (typeof value !== 'number') throw new Error(`${check.name} has no number ${name}`);
  return value;
};

const quartz = { length: 'L', width: 'W', height: 'h' } as const;

function matchParts(check: Check) {
  const tolerance = num(check, 'tol_LW_mm') / Math.sqrt(3);
  return {
    weightCt: cabochonWeightCt({ lengthMm: num(check, quartz.length), widthMm: num(check, quartz.width), heightMm: num(check, quartz.height) }, num(check, 'SG')),
    deltaCt: num(check, 'delta_ct'),
    parts: [
      { value: num(check, 'L'), sd: tolerance }, { value: num(check, 'W'), sd: tolerance },
      { value: num(check, 'h'), sd: num(check, 'sd_h_mm') }, { value: num(check, 'SG'), sd: num(check, 'sd_SG') },
    ],
  };
}

/** How each check is computed, by the start of its name; the first that fits is used. */
const COMPUTE: readonly [prefix: string, compute: (check: Check) => unknown][] = [
  ['n_D ', (c) => refractiveIndex({ kind: num(c, 'formula_kind'), coefficients: c.inputs.coefficients } as DispersionFormula, num(c, 'wavelength_um'))],
  ['birefringence of quartz', () => ray('quartz', 'e') - ray('quartz', 'o')],
  ['2Vz', (c) => axialAngle2VzDeg(...(c.inputs.n as [number, number, number]))],
  ['dispersion B-G', () => dispersionBG(findMaterial('diamond')?.rays.n ?? fail())],
  ['water density', (c) => waterDensityKgM3(num(c, 't_C'))],
  // At 4 °C of the reference temperature the correction is 1, so the plain ratio of the old text-book stands.
  ['SG of a stone', (c) => specificGravity({ airCt: num(c, 'air_ct'), waterCt: num(c, 'water_ct'), waterC: 4, uCt: 0.01 }).value],
  ['error of SG', (c) => ratioUncertainty({ sg: num(c, 'S'), airCt: num(c, 'air_ct'), uAirCt: 0, uWaterCt: num(c, 'dw_ct') })],
  ['u(SG)', (c) => ratioUncertainty({ sg: num(c, 'S'), airCt: num(c, 'air_ct'), uAirCt: num(c, 'u_air_ct'), uWaterCt: num(c, 'u_water_ct') })],
  ['density with air buoyancy', (c) => densityGCm3({ ratio: num(c, 'air_ct') / (num(c, 'air_ct') - num(c, 'water_ct')), waterGCm3: num(c, 'rho_w'), airGCm3: num(c, 'rho_a') })],
  ['pull of surface tension', (c) => surfaceTensionPullCt({ wireMm: num(c, 'd_mm'), tensionNPerM: num(c, 'gamma_N_m') })],
  ['weight of an 8x6x3', (c) => cabochonWeightCt({ lengthMm: num(c, 'L'), widthMm: num(c, 'W'), heightMm: num(c, 'h') }, num(c, 'SG'))],
  ['chance that two', (c) => weightMatchChance(matchParts(c))],
  ['LR ', (c) => twoLevelLR({ x: num(c, 'x'), y: num(c, 'y'), sigma: num(c, 'sigma'), tau: num(c, 'tau'), mu: num(c, 'mu') })],
  ['verbal band', (c) => supportOf(Math.log10(num(c, 'LR'))).support],
  ['conformance probability, JCGM', (c) => conformanceProbability({ y: num(c, 'y'), u: num(c, 'u'), low: num(c, 'TL'), high: num(c, 'TU') })],
  ['conformance probability at a guard', (c) => normalCdf(num(c, 'y_minus_limit_in_u'))],
  ['guard band factor', (c) => normalQuantile(num(c, 'p')) / 2],
  ['En score', (c) => enScore({ value: num(c, 'x'), expandedU: num(c, 'U_lab'), reference: num(c, 'xref'), expandedUReference: num(c, 'U_ref') })],
  ['zeta score', (c) => zetaScore({ value: num(c, 'x'), u: num(c, 'u_lab'), reference: num(c, 'xref'), uReference: num(c, 'u_ref') })],
  ['En for two SG', (c) => enScore({ value: num(c, 'x'), expandedU: num(c, 'U_x'), reference: num(c, 'X'), expandedUReference: num(c, 'U_X') })],
  ['Gladstone-Dale compatibility', (c) => compatibilityIndex({ nMean: num(c, 'n_mean'), densityGCm3: num(c, 'density'), kc: chemicalEnergy(c.inputs.mass_fractions as Record<string, number>) })],
  ['Gladstone-Dale Kc', (c) => chemicalEnergy(c.inputs.mass_fractions as Record<string, number>)],
  ['compatibility word', (c) => compatibilityWord(num(c, 'CI'))],
  ['Shewhart 3 s false alarm', (c) => 2 * normalCdf(-num(c, 'k'))],
  ['Shewhart 3 s mean run', (c) => 1 / (2 * normalCdf(-num(c, 'k')))],
];

function ray(material: string, name: 'o' | 'e'): number {
  return refractiveIndex(findMaterial(material)?.rays[name] ?? fail(), 0.5893);
}

function fail(): never {
  throw new Error('the material table lacks a ray this test needs');
}

describe('published and recomputed check values', () => {
  const positive = checks.filter((check) => !check.name.startsWith('trap'));

  it.each(positive.map((check) => [`${check.name} [${check.sourceKind}: ${check.source}]`, check] as const))('agrees on %s', (_, check) => {
    const compute = COMPUTE.find(([prefix]) => check.name.startsWith(prefix))?.[1];
    if (compute === undefined) throw new Error(`nothing computes ${check.name}`);
    const found = compute(check);
    if (typeof check.expected === 'number') expect(Math.abs((found as number) - check.expected)).toBeLessThanOrEqual(check.tolerance);
    else expect(found).toBe(check.expected);
  });

  it('does not return the water density of the misprinted formula [read: PMC4909168, eq. 1]', () => {
    const trap = checks.find((check) => check.name.startsWith('trap'));
    expect(Math.abs(waterDensityKgM3(20) - (trap?.expected as number))).toBeGreaterThan(0.2);
  });

  it('combines the parts of GUM H.1 to the published 32 nm [JCGM 100:2008, H.1; parts read at gtc.readthedocs.io]', () => {
    expect(combinedU([25, 5.8, 3.9, 6.7, 16.6, 2.9])).toBeCloseTo(31.7, 1);
  });

  it('takes a half-width of an even distribution over √3 [JCGM 100:2008, 4.3.7, from memory]', () => {
    expect(rectangularU(0.01)).toBeCloseTo(0.005774, 6);
  });
});

describe('specific gravity', () => {
  it('is lower by the density of warm water [methods note 1: 20 °C makes 4.00 read 4.007 when ignored]', () => {
    const ignored = specificGravity({ airCt: 4, waterCt: 3, waterC: 4, uCt: 0.01 }).value;
    const at20 = specificGravity({ airCt: 4, waterCt: 3, waterC: 20, uCt: 0.01 }).value;
    expect(ignored / at20).toBeCloseTo(WATER_DENSITY_4C / waterDensityKgM3(20), 6);
    expect(ignored - at20).toBeCloseTo(0.0071, 4);
  });

  it.each([
    { airCt: 1, waterCt: 1, waterC: 20 }, { airCt: 1, waterCt: 1.2, waterC: 20 }, { airCt: -1, waterCt: -2, waterC: 20 },
    { airCt: 2, waterCt: 1, waterC: 41 }, { airCt: 2, waterCt: 1, waterC: Number.NaN },
  ])('refuses weighings that no stone gives: %j', (weighing) => {
    expect(() => specificGravity({ ...weighing, uCt: 0.01 })).toThrow(RangeError);
  });
});
