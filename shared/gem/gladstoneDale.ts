/**
 * Gladstone–Dale compatibility (J. A. Mandarino, Can. Mineral. 1979, 1981), a check on a record for slips of typing,
 * never on the stone: corundum, correctly measured, is only "fair".
 */

/** Specific refractive energies of oxides, cm³/g. From memory of Mandarino; O is subtracted where F replaces it. */
export const GLADSTONE_DALE_K = { SiO2: 0.208, Al2O3: 0.207, MgO: 0.2, FeO: 0.188, CaO: 0.21, F: 0.043, O: 0.203 } as const;
export type Oxide = keyof typeof GLADSTONE_DALE_K;

/** Mean index: uniaxial (2ω + ε)/3 and biaxial (α + β + γ)/3 both come as three principal values. */
export function meanIndex(principal: readonly [number, number, number]): number {
  return (principal[0] + principal[1] + principal[2]) / 3;
}

/** K_C = Σ kᵢ·pᵢ over mass fractions, cm³/g. */
export function chemicalEnergy(massFractions: Readonly<Partial<Record<Oxide, number>>>): number {
  let sum = 0;
  for (const oxide of Object.keys(GLADSTONE_DALE_K) as Oxide[]) sum += GLADSTONE_DALE_K[oxide] * (massFractions[oxide] ?? 0);
  return sum;
}

/** CI = 1 − K_P/K_C with K_P = (n̄ − 1)/D; `densityGCm3` and `kc` must be positive. */
export function compatibilityIndex({ nMean, densityGCm3, kc }: { nMean: number; densityGCm3: number; kc: number }): number {
  return 1 - (nMean - 1) / densityGCm3 / kc;
}

export type CompatibilityWord = 'superior' | 'excellent' | 'good' | 'fair' | 'poor';

/** Mandarino's words for |CI|: below .020, .040, .060, .080, and above. */
export function compatibilityWord(index: number): CompatibilityWord {
  const size = Math.abs(index);
  if (size < 0.02) return 'superior';
  if (size < 0.04) return 'excellent';
  if (size < 0.06) return 'good';
  return size < 0.08 ? 'fair' : 'poor';
}
