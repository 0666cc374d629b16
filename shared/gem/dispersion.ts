import { MATERIALS } from './data/materials';

export const SODIUM_D_UM = 0.5893;
export const FRAUNHOFER_B_UM = 0.6867;
export const FRAUNHOFER_G_UM = 0.4308;

/** The dispersion formulas of the refractiveindex.info database that its gem and glass entries use. */
export type DispersionFormula =
  | { readonly kind: 1 | 2 | 4 | 5; readonly coefficients: readonly number[] }
  | { readonly kind: 'table'; readonly rows: readonly (readonly [number, number])[] };

export type Ray = DispersionFormula & { readonly rangeUm: readonly [number, number]; readonly reference: string };

export interface Material {
  readonly material: string;
  readonly formula: string;
  readonly optic: 'isotropic' | 'uniaxial' | 'biaxial';
  readonly role: string;
  readonly rays: Readonly<Partial<Record<'n' | 'o' | 'e' | 'alpha' | 'beta' | 'gamma', Ray>>>;
}

/**
 * Refractive index at a wavelength in micrometres.
 * Kinds: 1 and 2 Sellmeier (the second takes squared resonances), 4 the database's mixed form, 5 Cauchy, or a table.
 * @throws RangeError for a wavelength that is not positive or where the formula gives no real index
 */
export function refractiveIndex(formula: DispersionFormula, wavelengthUm: number): number {
  if (!(wavelengthUm > 0)) throw new RangeError('a wavelength is positive');
  const n = formula.kind === 'table' ? interpolate(formula.rows, wavelengthUm) : fromCoefficients(formula, wavelengthUm);
  if (!Number.isFinite(n)) throw new RangeError(`no real index at ${String(wavelengthUm)} µm`);
  return n;
}

function fromCoefficients({ kind, coefficients }: { kind: 1 | 2 | 4 | 5; coefficients: readonly number[] }, l: number): number {
  const c = (i: number) => coefficients[i - 1] ?? 0;
  if (kind === 4) {
    let n2 = c(1) + (c(2) * l ** c(3)) / (l * l - c(4) ** c(5)) + (c(6) === 0 ? 0 : (c(6) * l ** c(7)) / (l * l - c(8) ** c(9)));
    for (let i = 10; i < coefficients.length; i += 2) n2 += c(i) * l ** c(i + 1);
    return Math.sqrt(n2);
  }
  let sum = c(1);
  for (let i = 2; i < coefficients.length; i += 2) {
    if (kind === 5) sum += c(i) * l ** c(i + 1);
    else sum += (c(i) * l * l) / (l * l - (kind === 1 ? c(i + 1) ** 2 : c(i + 1)));
  }
  return kind === 5 ? sum : Math.sqrt(1 + sum);
}

function interpolate(rows: readonly (readonly [number, number])[], l: number): number {
  for (let i = 1; i < rows.length; i += 1) {
    const [a, b] = [rows[i - 1], rows[i]];
    if (a && b && l >= a[0] && l <= b[0]) return a[1] + ((b[1] - a[1]) * (l - a[0])) / (b[0] - a[0]);
  }
  return Number.NaN;
}

/** Gemmological dispersion: n at the Fraunhofer G line less n at the B line. */
export function dispersionBG(formula: DispersionFormula): number {
  return refractiveIndex(formula, FRAUNHOFER_G_UM) - refractiveIndex(formula, FRAUNHOFER_B_UM);
}

/** The material's first-choice data, or undefined where the table has none. */
export function findMaterial(material: string): Material | undefined {
  return MATERIALS.find((entry) => entry.material === material && entry.role === 'primary')
    ?? MATERIALS.find((entry) => entry.material === material);
}

export { MATERIALS };
