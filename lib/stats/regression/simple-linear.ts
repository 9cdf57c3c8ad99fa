export type SimpleLinearFit = {
  readonly kind: 'fit';
  readonly intercept: number;
  readonly slope: number;
  /** Residual standard deviation and its degrees of freedom, n − 2. */
  readonly sigma: number;
  readonly df: number;
  readonly n: number;
  /** (X′X)⁻¹ as (c00, c01, c11): the covariance of (intercept, slope) is sigma² times it. */
  readonly inverse: readonly [number, number, number];
};
export type SimpleLinearRefusal = { readonly kind: 'refused'; readonly reason: 'too-few' | 'all-x-equal' | 'not-finite' | 'unequal-lengths' };

function compensatedSum(values: Iterable<number>): number {
  let sum = 0;
  let rest = 0;
  for (const value of values) {
    const total = sum + value;
    rest += Math.abs(sum) >= Math.abs(value) ? sum - total + value : value - total + sum;
    sum = total;
  }
  return sum + rest;
}

/**
 * Least squares of y on one x with intercept, from sums about the means.
 * Assumptions: independent errors of one variance, x without error.
 *
 * @param x regressor, any unit; at least 3 values, not all equal
 * @param y response, same length
 * @returns coefficients with n, df and sigma, or why there are none
 * Source: Draper & Smith 1998, Applied Regression Analysis, ch. 1; sums after Neumaier 1974.
 * @example simpleLinear([1, 2, 3, 4], [3, 5, 7, 9]) // intercept 1, slope 2, sigma 0
 */
export function simpleLinear(x: readonly number[], y: readonly number[]): SimpleLinearFit | SimpleLinearRefusal {
  const n = x.length;
  if (y.length !== n) return { kind: 'refused', reason: 'unequal-lengths' };
  if (n < 3) return { kind: 'refused', reason: 'too-few' };
  if (!x.every(Number.isFinite) || !y.every(Number.isFinite)) return { kind: 'refused', reason: 'not-finite' };
  const meanX = compensatedSum(x) / n;
  const meanY = compensatedSum(y) / n;
  const sxx = compensatedSum(x.map((v) => (v - meanX) ** 2));
  const scale = x.reduce((most, v) => Math.max(most, Math.abs(v)), 0);
  if (!(sxx > n * (scale * 1e-13) ** 2)) return { kind: 'refused', reason: 'all-x-equal' };
  const slope = compensatedSum(x.map((v, i) => (v - meanX) * (y[i]! - meanY))) / sxx;
  const intercept = meanY - slope * meanX;
  const rss = compensatedSum(x.map((v, i) => (y[i]! - meanY - slope * (v - meanX)) ** 2));
  return {
    kind: 'fit', intercept, slope, sigma: Math.sqrt(rss / (n - 2)), df: n - 2, n,
    inverse: [1 / n + (meanX * meanX) / sxx, -meanX / sxx, 1 / sxx],
  };
}
