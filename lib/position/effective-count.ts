/** Serial correlation of fixes in time and the number of independent ones that they are worth. */
export type EffectiveCount = { readonly kind: 'effective'; readonly autocorrelation: number; readonly effectiveN: number } | { readonly kind: 'unknown'; readonly reason: 'too-few' | 'no-spread' };

/**
 * How many independent values n serially correlated ones are worth.
 *
 * Assumes a first-order autoregressive series. A mean of them has the variance of a mean of that many; a common bias
 * (reflections under trees) does not shrink at all.
 *
 * @param n count
 * @param autocorrelation between neighbours, [0, 1); below 0 counts as 0
 * @returns n (1 - rho) / (1 + rho), at least 1
 * @source first-order autoregressive variance inflation, e.g. Wilks 2011, Statistical Methods in the Atmospheric Sciences, section 5.2.4 (from memory)
 * @example effectiveCount(60, 0.9) // 3.158
 */
export function effectiveCount(n: number, autocorrelation: number): number {
  const rho = Math.min(Math.max(autocorrelation, 0), 1);
  return Math.max(Math.min(n, 1), (n * (1 - rho)) / (1 + rho));
}

/**
 * Lag-1 autocorrelation of a track, both axes together, and the effective count from it.
 *
 * Assumes steps that are roughly even in time. The estimate runs low in short series, so it is withheld below ten fixes.
 *
 * @param points in time order, m in a plane
 * @returns the estimate, or why there is none
 * @example estimateEffectiveCount(points)
 */
export function estimateEffectiveCount(points: readonly { readonly eastM: number; readonly northM: number }[]): EffectiveCount {
  const n = points.length;
  if (n < 10) return { kind: 'unknown', reason: 'too-few' };
  const meanE = points.reduce((sum, p) => sum + p.eastM, 0) / n, meanN = points.reduce((sum, p) => sum + p.northM, 0) / n;
  let own = 0, shared = 0;
  points.forEach((p, i) => {
    own += (p.eastM - meanE) ** 2 + (p.northM - meanN) ** 2;
    const next = points[i + 1];
    if (next) shared += (p.eastM - meanE) * (next.eastM - meanE) + (p.northM - meanN) * (next.northM - meanN);
  });
  // A receiver that repeats one place to the last digit says nothing about its error.
  if (!(own > 1e-12 * n)) return { kind: 'unknown', reason: 'no-spread' };
  const autocorrelation = shared / own;
  return { kind: 'effective', autocorrelation, effectiveN: effectiveCount(n, autocorrelation) };
}
