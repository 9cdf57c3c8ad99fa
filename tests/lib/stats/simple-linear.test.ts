import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simpleLinear } from '@/lib/stats/regression/simple-linear';
import { relativeError } from '../../support/relative-error';

function fitted(x: readonly number[], y: readonly number[]) {
  const fit = simpleLinear(x, y);
  if (fit.kind !== 'fit') throw new Error(fit.reason);
  return fit;
}

describe('least squares against certified values (NIST StRD Norris, 15 digits)', () => {
  const { inputs, expected } = JSON.parse(readFileSync(new URL('../../reference/11-nist/linear_norris.json', import.meta.url), 'utf8'));
  const fit = fitted(inputs.x.x1, inputs.y);

  it('coefficients, standard errors and residual spread agree to 1e-10', () => {
    const pairs = [
      [fit.intercept, expected.coef[0]], [fit.slope, expected.coef[1]], [fit.sigma, expected.residual_sd],
      [fit.sigma * Math.sqrt(fit.inverse[0]), expected.se[0]], [fit.sigma * Math.sqrt(fit.inverse[2]), expected.se[1]],
    ] as const;
    for (const [got, want] of pairs) expect(relativeError(got, want)).toBeLessThan(1e-10);
    expect(fit).toMatchObject({ n: 36, df: 34 });
  });
});

describe('least squares of heights with 1,000,000 added (R 4.2.2 lm, tests/reference/01-ols/sim_large_offset)', () => {
  const { inputs, expected } = JSON.parse(readFileSync(new URL('../../reference/01-ols/sim_large_offset.json', import.meta.url), 'utf8'));
  const fit = fitted(inputs.x.D, inputs.y);

  it('slope, spread and covariance keep their digits (1e-9)', () => {
    const pairs = [
      [fit.intercept, expected.coef['(Intercept)']], [fit.slope, expected.coef.D], [fit.sigma, expected.sigma],
      [fit.inverse[0] * fit.sigma ** 2, expected.vcov[0][0]], [fit.inverse[1] * fit.sigma ** 2, expected.vcov[0][1]], [fit.inverse[2] * fit.sigma ** 2, expected.vcov[1][1]],
    ] as const;
    for (const [got, want] of pairs) expect(relativeError(got, want)).toBeLessThan(1e-9);
  });
});

const line = fc.array(fc.tuple(fc.double({ min: -5, max: 5, noNaN: true }), fc.double({ min: -5, max: 5, noNaN: true })), { minLength: 4, maxLength: 40 })
  .filter((points) => new Set(points.map(([x]) => Math.round(x * 10))).size > 2);

describe('laws of least squares', () => {
  it('shifting x by c moves the intercept by −slope·c and nothing else', () => {
    fc.assert(fc.property(line, fc.double({ min: -100, max: 100, noNaN: true }), (points, c) => {
      const [x, y] = [points.map(([v]) => v), points.map(([, v]) => v)];
      const [a, b] = [fitted(x, y), fitted(x.map((v) => v + c), y)];
      expect(Math.abs(b.slope - a.slope)).toBeLessThan(1e-9);
      expect(Math.abs(b.intercept - (a.intercept - a.slope * c))).toBeLessThan(1e-9 * (1 + Math.abs(c)));
      expect(Math.abs(b.sigma - a.sigma)).toBeLessThan(1e-9);
    }), { seed: 20260601 });
  });

  it('y times k gives coefficients and spread times k; the unscaled covariance stays', () => {
    fc.assert(fc.property(line, fc.double({ min: 0.01, max: 100, noNaN: true }), (points, k) => {
      const [x, y] = [points.map(([v]) => v), points.map(([, v]) => v)];
      const [a, b] = [fitted(x, y), fitted(x, y.map((v) => v * k))];
      expect(Math.abs(b.slope - k * a.slope)).toBeLessThan(1e-9 * k);
      expect(Math.abs(b.intercept - k * a.intercept)).toBeLessThan(1e-9 * k);
      expect(Math.abs(b.sigma - k * a.sigma)).toBeLessThan(1e-9 * k);
      expect(b.inverse).toEqual(a.inverse);
    }), { seed: 20260602 });
  });
});

describe('what has no line is refused', () => {
  it.each([
    ['too-few', [1, 2], [1, 2]], ['all-x-equal', [0.1, 0.1, 0.1], [1, 2, 3]], ['not-finite', [1, 2, Number.NaN], [1, 2, 3]],
    ['not-finite', [1, 2, 3], [1, 2, Number.NEGATIVE_INFINITY]], ['unequal-lengths', [1, 2, 3], [1, 2]],
  ] as const)('%s', (reason, x, y) => {
    expect(simpleLinear(x, y)).toEqual({ kind: 'refused', reason });
  });

  it('the example of its description: 3, 5, 7, 9 over 1 to 4', () => {
    expect(simpleLinear([1, 2, 3, 4], [3, 5, 7, 9])).toMatchObject({ kind: 'fit', intercept: 1, slope: 2, sigma: 0 });
  });

  it('takes 300,000 trees', () => {
    const x = Array.from({ length: 300_000 }, (_, i) => i % 1000);
    expect(fitted(x, x.map((v, i) => 2 * v + (i % 2))).slope).toBeCloseTo(2, 5);
  });
});
