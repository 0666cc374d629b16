/**
 * No comparison is counted worse than this exponent (about 9.5 standard deviations): beyond it a bell curve describes
 * its own tails, not the bench. It also keeps every product of densities inside a double.
 */
export const EXPONENT_FLOOR = -45;

const SQRT_2PI = Math.sqrt(2 * Math.PI);
const LOWEST = Math.exp(EXPONENT_FLOOR);

/** Normal density at a distance from its mean, floored at `EXPONENT_FLOOR`; `variance` > 0. */
export function normalDensity(distance: number, variance: number): number {
  const exponent = (-0.5 * distance * distance) / variance;
  return (exponent < EXPONENT_FLOOR ? LOWEST : Math.exp(exponent)) / (SQRT_2PI * Math.sqrt(variance));
}

/**
 * Standard normal distribution function, to about 1e-15 for |z| < 37.
 * G. West, "Better approximations to cumulative normal functions" (2005), after J. F. Hart (1968). NaN gives NaN.
 */
export function normalCdf(z: number): number {
  const x = Math.abs(z);
  let upper: number;
  if (x > 37) upper = 0;
  else {
    const bell = Math.exp((-x * x) / 2);
    if (x < 7.07106781186547) {
      const top = (((((0.0352624965998911 * x + 0.700383064443688) * x + 6.37396220353165) * x + 33.912866078383) * x
        + 112.079291497871) * x + 221.213596169931) * x + 220.206867912376;
      const below = ((((((0.0883883476483184 * x + 1.75566716318264) * x + 16.064177579207) * x + 86.7807322029461) * x
        + 296.564248779674) * x + 637.333633378831) * x + 793.826512519948) * x + 440.413735824752;
      upper = (bell * top) / below;
    } else upper = bell / (x + 1 / (x + 2 / (x + 3 / (x + 4 / (x + 0.65))))) / SQRT_2PI;
  }
  return z > 0 ? 1 - upper : upper;
}

/** The z below which a share `p` of the standard normal lies; 0 < p < 1, else NaN. Bisection, then Newton to full precision. */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) return Number.NaN;
  let low = -38;
  let high = 38;
  for (let i = 0; i < 60; i += 1) {
    const middle = (low + high) / 2;
    if (normalCdf(middle) < p) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** Density at `y` of a value spread evenly over [low, high] and read with `variance`; a normal density where the interval is a point. Floored like `normalDensity`. */
export function intervalDensity(y: number, low: number, high: number, variance: number): number {
  const sd = Math.sqrt(variance);
  const width = high - low;
  if (width < 0.05 * sd) return normalDensity(y - (low + high) / 2, variance + (width * width) / 12);
  const floor = LOWEST / (SQRT_2PI * sd);
  // The difference of two upper tails loses no digits, where 1 − Φ would: measure from the nearer end.
  const middle = (low + high) / 2;
  const distance = Math.abs(y - middle) - width / 2;
  const density = (normalCdf(-distance / sd) - normalCdf(-(distance + width) / sd)) / width;
  return density > floor ? density : floor;
}
