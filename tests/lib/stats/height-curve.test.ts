import { describe, expect, it } from 'vitest';
import { fitHeightCurve } from '@/lib/stats/fit-height-curve';
import type { CurveForm } from '@/lib/stats/forms/curve-forms';
import { blackCherry } from '../../support/black-cherry';
import { relativeError } from '../../support/relative-error';

// Least squares of ln(h − bh) on x(d) for the 31 trees (Ryan, Joiner and Ryan 1976; cm, m, bh 4.5 ft), computed elsewhere in
// double precision from the published data; ten decimals.
const published: readonly [CurveForm, number, number, number][] = [
  ['curtis', 3.2945003114, 7.0367459933, 0.0780726401],
  ['michailoff', 3.2912514764, -6.8197039887, 0.0780494636],
  ['wykoff', 3.2978067118, -7.2602119186, 0.0780960615],
  ['power', 2.3547797288, 0.2071509904, 0.0787275035],
];
const trees = blackCherry.map(({ diameterIn, heightFt }) => ({ dCm: diameterIn * 2.54, hM: heightFt * 0.3048 }));
const fit = (form: CurveForm, over: Partial<Parameters<typeof fitHeightCurve>[0]> = {}) =>
  fitHeightCurve({ form, breastHeightM: 1.3716, trees, tauSquared: 0.5, ...over });

describe('the height curve of 31 black cherry trees', () => {
  it.each(published)('%s: coefficients and spread agree to 1e-9', (form, b0, b1, s) => {
    const result = fit(form);
    if (result.kind !== 'fit') throw new Error(result.reason);
    expect(relativeError(result.b0, b0)).toBeLessThan(1e-9);
    expect(relativeError(result.b1, b1)).toBeLessThan(1e-9);
    expect(relativeError(Math.sqrt(result.residualVariance), s)).toBeLessThan(1e-9);
    expect(result).toMatchObject({ n: 31, residualDf: 29, plots: 0 });
  });

  it('does not depend on the order of the trees beyond rounding', () => {
    const [a, b] = [fit('curtis'), fit('curtis', { trees: [...trees].reverse() })];
    if (a.kind !== 'fit' || b.kind !== 'fit') throw new Error('no fit');
    expect(relativeError(a.b1, b.b1)).toBeLessThan(1e-12);
    expect(relativeError(a.residualVariance, b.residualVariance)).toBeLessThan(1e-12);
  });
});

describe('what cannot be fitted is refused with its reason', () => {
  it.each([
    ['too-few', trees.slice(0, 2)],
    ['all-diameters-equal', trees.map(({ hM }) => ({ dCm: 30, hM }))],
    ['not-finite', [...trees, { dCm: Number.NaN, hM: 20 }]],
    ['not-finite', [...trees, { dCm: 30, hM: Number.POSITIVE_INFINITY }]],
    ['height-not-above-breast-height', [...trees, { dCm: 3, hM: 1.2 }]],
  ])('%s', (reason, some) => {
    expect(fit('curtis', { trees: some })).toEqual({ kind: 'refused', reason });
  });
});
