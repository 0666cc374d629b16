import type { KindResult } from './evaluate';

/**
 * Log-likelihood-ratio cost (N. Brümmer and J. du Preez, Computer Speech & Language 20, 230 (2006)): 0 for a perfect
 * method, 1 for one that says nothing. `own` from returns of the recorded stone, `another` from returns of another.
 */
export function logLikelihoodRatioCost(own: ArrayLike<number>, another: ArrayLike<number>): number {
  return (meanOf(own, (log10LR) => log2OnePlusPower(-log10LR)) + meanOf(another, log2OnePlusPower)) / 2;
}

/** log2(1 + 10^x) without overflow. */
function log2OnePlusPower(x: number): number {
  return x > 300 ? x * Math.log2(10) : Math.log1p(10 ** x) / Math.LN2;
}

function meanOf(values: ArrayLike<number>, of: (value: number) => number): number {
  let sum = 0;
  for (let i = 0; i < values.length; i += 1) sum += of(values[i] ?? 0);
  return sum / values.length;
}

/** How often same-species substitutes pass and untouched stones are settled, were the threshold of "same" elsewhere. */
export function tradeOff(untouched: KindResult, substitutes: KindResult, log10Thresholds: readonly number[]) {
  const share = (result: KindResult, threshold: number) => {
    let count = 0;
    for (let i = 0; i < result.returns; i += 1) if (result.free[i] === 1 && (result.log10LRs[i] ?? 0) >= threshold) count += 1;
    return count / result.returns;
  };
  return log10Thresholds.map((log10LR) => ({ log10LR, untouchedSame: share(untouched, log10LR), substitutesSame: share(substitutes, log10LR) }));
}

/** Of returns whose LR fell in each decade, how many there were of each kind: a calibrated LR of 100 is seen 100 times as often in untouched stones. */
export function calibration(own: ArrayLike<number>, another: ArrayLike<number>, edges: readonly number[]) {
  const share = (values: ArrayLike<number>, low: number, high: number) => meanOf(values, (value) => (value >= low && value < high ? 1 : 0));
  return edges.slice(0, -1).map((low, i) => {
    const high = edges[i + 1] ?? Infinity;
    const [a, b] = [share(own, low, high), share(another, low, high)];
    return { from: low, to: high, own: a, another: b, log10Ratio: a > 0 && b > 0 ? Math.log10(a / b) : null };
  });
}
