import type { HeightCurve } from '@/lib/schema/design';
import type { PlotInterceptPrior } from '@/lib/stats/mixed/plot-intercept';

/**
 * A published curve as a prior that counts as at most `trees` trees: another year and another forest are similar, not
 * equal. A curve fitted without plots holds plot and tree spread together, v = σ²(1 + τ²); its share for trees is taken.
 */
export function curvePrior(curve: HeightCurve, trees: number): PlotInterceptPrior {
  const f = Math.min(1, trees / curve.n);
  const together = curve.plots === 0 ? 1 + curve.tauSquared : 1;
  const sigmaSquared = curve.residualVariance / together;
  const [c00, c01, c11] = curve.xtxInverse;
  const determinant = c00 * c11 - c01 * c01;
  const g = f / (determinant * together);
  return {
    mean: [curve.b0, curve.b1],
    precision: [c11 * g, -c01 * g, c00 * g],
    a: (f * curve.residualDf) / 2,
    s: (f * curve.residualDf * sigmaSquared) / 2,
    tauSquared: curve.tauSquared,
  };
}
