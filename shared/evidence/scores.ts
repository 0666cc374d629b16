import type { SupportedProposition, SupportWord } from '../api/evidence';
import { normalCdf, normalDensity } from './normal';

/** Distance in combined standard uncertainties, ζ of ISO 13528:2015: (y − x) / √(u_y² + u_x²). */
export function zetaScore({ value, u, reference, uReference }: { value: number; u: number; reference: number; uReference: number }): number {
  return (value - reference) / Math.hypot(u, uReference);
}

/** E_n of ISO 13528:2015 and ISO/IEC 17043: (y − x) / √(U_y² + U_x²), expanded uncertainties U = 2u; |E_n| ≤ 1 agrees. */
export function enScore({ value, expandedU, reference, expandedUReference }: { value: number; expandedU: number; reference: number; expandedUReference: number }): number {
  return (value - reference) / Math.hypot(expandedU, expandedUReference);
}

/** Probability that the true value lies within [low, high], given y and u under a flat prior (JCGM 106:2012, 7.4). */
export function conformanceProbability({ y, u, low, high }: { y: number; u: number; low: number; high: number }): number {
  return normalCdf((high - y) / u) - normalCdf((low - y) / u);
}

/**
 * Likelihood ratio of "the same stone" for two readings of equal uncertainty under a two-level normal model
 * (D. V. Lindley, Biometrika 64, 207 (1977)): exact, from the bivariate normal.
 * @param tau standard deviation between stones, about their mean `mu`
 */
export function twoLevelLR({ x, y, sigma, tau, mu }: { x: number; y: number; sigma: number; tau: number; mu: number }): number {
  const between = tau * tau;
  const total = between + sigma * sigma;
  const shrunk = mu + (between / total) * (x - mu);
  const predicted = total - (between * between) / total;
  return normalDensity(y - shrunk, predicted) / normalDensity(y - mu, total);
}

/**
 * Verbal scale of the ENFSI Guideline for Evaluative Reporting (2015), from memory. Values below 1 support the other
 * proposition with the inverse ratio. NaN gives "no support".
 */
export function supportOf(log10LR: number): { support: SupportWord; supports: SupportedProposition } {
  const size = Math.abs(log10LR);
  const support = supportWord(size);
  if (support === 'no support') return { support, supports: 'neither' };
  return { support, supports: log10LR > 0 ? 'recorded_stone' : 'another_stone' };
}

function supportWord(size: number): SupportWord {
  if (size > 6) return 'extremely strong';
  if (size >= 4) return 'very strong';
  if (size >= 3) return 'strong';
  if (size >= 2) return 'moderately strong';
  if (size >= 1) return 'moderate';
  return size >= Math.log10(2) ? 'weak' : 'no support';
}

/**
 * Chance that another cabochon of one species and calibrated size weighs within `deltaCt` of a given one:
 * 2Φ(δ / (σ_m √2)) − 1, with σ_m to first order from the spreads of length, width, depth and SG.
 * Depth dominates, and its spread is an assumption.
 */
export function weightMatchChance(
  { weightCt, deltaCt, parts }: { weightCt: number; deltaCt: number; parts: readonly { value: number; sd: number }[] },
): number {
  const relative = Math.hypot(...parts.map(({ value, sd }) => sd / value));
  return 2 * normalCdf(deltaCt / (weightCt * relative * Math.SQRT2)) - 1;
}
