/**
 * Standard uncertainties from what is known of an instrument (JCGM 100:2008, 4.3 and 5.1). Results are in the unit of
 * the argument; negative arguments throw RangeError.
 */

/** Of a value known to lie evenly within ± `halfWidth`. */
export function rectangularU(halfWidth: number): number {
  return positive(halfWidth) / Math.sqrt(3);
}

/** Of a value within ± `halfWidth`, likelier near the middle. */
export function triangularU(halfWidth: number): number {
  return positive(halfWidth) / Math.sqrt(6);
}

/** Of a display that steps by `step`. */
export function resolutionU(step: number): number {
  return positive(step) / Math.sqrt(12);
}

/** Of a sum or difference of independent quantities with these standard uncertainties. */
export function combinedU(parts: readonly number[]): number {
  return Math.hypot(...parts.map(positive));
}

function positive(value: number): number {
  if (!(value >= 0)) throw new RangeError('an uncertainty is not negative');
  return value;
}
