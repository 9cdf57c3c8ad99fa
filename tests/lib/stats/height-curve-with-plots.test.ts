import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitHeightCurve } from '@/lib/stats/fit-height-curve';
import type { CurveTree } from '@/lib/stats/fit-height-curve';
import { relativeError } from '../../support/relative-error';

// The reference gives y = ln(h − 1.3) and 1/(d + 1); these are the trees behind them.
const { inputs, expected } = JSON.parse(readFileSync(new URL('../../reference/05-mixed/sim_log_intercept.json', import.meta.url), 'utf8'));
const trees: CurveTree[] = inputs.y.map((y: number, i: number) => ({ dCm: 1 / inputs.x.invD[i] - 1, hM: 1.3 + Math.exp(y), plot: inputs.group[i] }));
const tauSquared: number = expected.G[0][0] / expected.sigma2;

function fit(some: readonly CurveTree[] = trees, breastHeightM = 1.3, tau = tauSquared) {
  const result = fitHeightCurve({ form: 'wykoff', breastHeightM, trees: some, tauSquared: tau });
  if (result.kind !== 'fit') throw new Error(result.reason);
  return result;
}

describe('a curve with plot effects of known share against REML of R (tests/reference/05-mixed/sim_log_intercept)', () => {
  it('coefficients, residual variance and covariance agree to 1e-9', () => {
    const curve = fit();
    const pairs = [
      [curve.b0, expected.beta['(Intercept)']], [curve.b1, expected.beta.invD], [curve.residualVariance, expected.sigma2],
      [curve.xtxInverse[0] * curve.residualVariance, expected.beta_vcov[0][0]],
      [curve.xtxInverse[1] * curve.residualVariance, expected.beta_vcov[0][1]],
      [curve.xtxInverse[2] * curve.residualVariance, expected.beta_vcov[1][1]],
    ] as const;
    for (const [got, want] of pairs) expect(relativeError(got, want)).toBeLessThan(1e-9);
    expect(curve).toMatchObject({ n: 64, plots: 10, residualDf: 62 });
  });

  it('is least squares when one tree came without a plot', () => {
    const [first, ...others] = trees;
    const curve = fit([{ dCm: first!.dCm, hM: first!.hM }, ...others]);
    const plain = fit(trees.map(({ dCm, hM }) => ({ dCm, hM })));
    expect(curve.plots).toBe(0);
    expect(curve.b1).toBe(plain.b1);
    expect(curve.residualVariance).toBe(plain.residualVariance);
  });

  it('tends to least squares as the plots’ share tends to nothing', () => {
    const [none, plain] = [fit(trees, 1.3, 1e-13), fit(trees.map(({ dCm, hM }) => ({ dCm, hM })))];
    for (const key of ['b0', 'b1', 'residualVariance'] as const) expect(relativeError(none[key], plain[key])).toBeLessThan(1e-10);
  });

  it('heights and breast height k times as large move b0 by ln k and nothing else', () => {
    fc.assert(fc.property(fc.double({ min: 0.3, max: 3.3, noNaN: true }), (k) => {
      const [a, b] = [fit(), fit(trees.map((tree) => ({ ...tree, hM: tree.hM * k })), 1.3 * k)];
      expect(Math.abs(b.b0 - a.b0 - Math.log(k))).toBeLessThan(1e-11);
      expect(relativeError(b.b1, a.b1)).toBeLessThan(1e-11);
      expect(relativeError(b.residualVariance, a.residualVariance)).toBeLessThan(1e-11);
    }), { seed: 20260603, numRuns: 30 });
  });

  it('names of plots and the order of trees do not matter', () => {
    const [a, b] = [fit(), fit([...trees].reverse().map((tree) => ({ ...tree, plot: `other ${tree.plot}` })))];
    for (const key of ['b0', 'b1', 'residualVariance'] as const) expect(relativeError(b[key], a[key])).toBeLessThan(1e-12);
  });
});

describe('heights that were computed, not measured', () => {
  const computed = [12, 20, 28, 36].map((dCm) => ({ dCm, hM: 1.3 + Math.exp(3.4 - 9 / (dCm + 1)) }));

  it('are refused as without spread, with and without plots', () => {
    for (const some of [computed, computed.map((tree, i) => ({ ...tree, plot: i < 2 ? 'a' : 'b' }))]) {
      expect(fitHeightCurve({ form: 'wykoff', breastHeightM: 1.3, trees: some, tauSquared: 0.5 })).toEqual({ kind: 'refused', reason: 'no-spread' });
    }
  });

  it('the example of its description: one tree is too few', () => {
    expect(fitHeightCurve({ form: 'curtis', breastHeightM: 1.3, trees: [{ dCm: 20, hM: 18 }], tauSquared: 0.5 })).toEqual({ kind: 'refused', reason: 'too-few' });
  });
});
