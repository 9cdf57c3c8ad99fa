import { curveForms } from './forms/curve-forms';
import type { CurveForm } from './forms/curve-forms';
import { PlotInterceptModel } from './mixed/plot-intercept';
import { simpleLinear } from './regression/simple-linear';

export type CurveTree = { readonly dCm: number; readonly hM: number; readonly plot?: string | null };
export type HeightCurveFit = {
  readonly kind: 'fit';
  readonly form: CurveForm;
  readonly b0: number;
  readonly b1: number;
  readonly xtxInverse: readonly [number, number, number];
  readonly residualVariance: number;
  readonly residualDf: number;
  readonly n: number;
  /** 0 when any tree came without a plot; then the residual variance holds plot and tree spread together. */
  readonly plots: number;
  readonly tauSquared: number;
  readonly breastHeightM: number;
  readonly dMinCm: number;
  readonly dMaxCm: number;
  readonly logDMean: number;
  readonly logDSd: number;
};
export type HeightCurveRefusal = {
  readonly kind: 'refused';
  readonly reason: 'too-few' | 'all-diameters-equal' | 'not-finite' | 'height-not-above-breast-height' | 'no-spread';
};

/** Below this residual variance of ln(h − bh) the heights were computed and not measured: a spread of a millionth. */
const LEAST_VARIANCE = 1e-12;

/**
 * Fits ln(h − bh) = β0 + β1·x(d). With a plot for every tree: random plot effects of known τ² under the flat prior, whose
 * residual variance is the REML estimate given τ². Otherwise: least squares.
 * Assumptions: measured heights of live, unbroken trees; d without error; spread proportional to height.
 *
 * @param trees d in cm, h in m; at least 3 of them, with 3 different diameters
 * @param tauSquared plot variance over tree variance
 * @returns the curve's numbers, or why there are none
 * Source: Lappi 1991, For. Sci. 37:781; Mehtätalo, de-Miguel & Gregoire 2015, Can. J. For. Res. 45:826.
 * @example fitHeightCurve({ form: 'curtis', breastHeightM: 1.3, trees: [{ dCm: 20, hM: 18 }], tauSquared: 0.5 }) // { kind: 'refused', reason: 'too-few' }
 */
export function fitHeightCurve({ form, breastHeightM, trees, tauSquared }: {
  readonly form: CurveForm; readonly breastHeightM: number; readonly trees: readonly CurveTree[]; readonly tauSquared: number;
}): HeightCurveFit | HeightCurveRefusal {
  if (trees.length < 3) return { kind: 'refused', reason: 'too-few' };
  if (!trees.every(({ dCm, hM }) => Number.isFinite(dCm) && Number.isFinite(hM) && dCm > 0)) return { kind: 'refused', reason: 'not-finite' };
  if (!trees.every(({ hM }) => hM > breastHeightM)) return { kind: 'refused', reason: 'height-not-above-breast-height' };
  const x = trees.map(({ dCm }) => curveForms[form](dCm));
  const y = trees.map(({ hM }) => Math.log(hM - breastHeightM));
  const line = simpleLinear(x, y);
  if (line.kind === 'refused') return { kind: 'refused', reason: line.reason === 'all-x-equal' ? 'all-diameters-equal' : 'too-few' };
  const logs = trees.map(({ dCm }) => Math.log(dCm));
  const logDMean = logs.reduce((sum, v) => sum + v, 0) / logs.length;
  const logDSd = Math.sqrt(logs.reduce((sum, v) => sum + (v - logDMean) ** 2, 0) / (logs.length - 1));
  const common = {
    kind: 'fit' as const, form, n: trees.length, tauSquared, breastHeightM, logDMean, logDSd,
    dMinCm: trees.reduce((least, { dCm }) => Math.min(least, dCm), Infinity), dMaxCm: trees.reduce((most, { dCm }) => Math.max(most, dCm), 0),
  };
  const plots = new Set(trees.map(({ plot }) => plot ?? null));
  if (plots.has(null)) {
    if (line.sigma ** 2 < LEAST_VARIANCE) return { kind: 'refused', reason: 'no-spread' };
    return { ...common, b0: line.intercept, b1: line.slope, xtxInverse: line.inverse, residualVariance: line.sigma ** 2, residualDf: line.df, plots: 0 };
  }
  // A flat prior may stand anywhere; on the least-squares line the sums hold small residuals and lose no digits.
  const model = new PlotInterceptModel({ mean: [line.intercept, line.slope], precision: [0, 0, 0], a: -1, s: 0, tauSquared }, x.reduce((sum, v) => sum + v, 0) / x.length);
  trees.forEach(({ plot }, i) => model.set(String(i), { plot: plot!, x: x[i]!, y: y[i]!, weight: 1 }));
  const posterior = model.posterior();
  if (!posterior || posterior.sigmaSquared < LEAST_VARIANCE) return { kind: 'refused', reason: 'no-spread' };
  return {
    ...common, b0: posterior.mean[0], b1: posterior.mean[1], xtxInverse: posterior.inverse,
    residualVariance: posterior.sigmaSquared, residualDf: 2 * posterior.a, plots: plots.size,
  };
}
