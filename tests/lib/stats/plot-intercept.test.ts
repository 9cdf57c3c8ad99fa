import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { curveForms } from '@/lib/stats/forms/curve-forms';
import { PlotInterceptModel, predictiveInterval, predictiveTail } from '@/lib/stats/mixed/plot-intercept';
import type { PlotInterceptPrior } from '@/lib/stats/mixed/plot-intercept';
import { blackCherry } from '../../support/black-cherry';
import { relativeError } from '../../support/relative-error';

const flat = (tauSquared: number): PlotInterceptPrior => ({ mean: [0, 0], precision: [0, 0, 0], a: -1, s: 0, tauSquared });
const informative: PlotInterceptPrior = { mean: [3.1, 7], precision: [12, -1.2, 0.4], a: 6, s: 6 * 0.08 ** 2, tauSquared: 0.5 };

describe('flat prior against REML of R (tests/reference/05-mixed/sim_log_intercept)', () => {
  const { inputs, expected } = JSON.parse(readFileSync(new URL('../../reference/05-mixed/sim_log_intercept.json', import.meta.url), 'utf8'));
  const model = new PlotInterceptModel(flat(expected.G[0][0] / expected.sigma2), 0.05);
  inputs.y.forEach((y: number, i: number) => model.set(String(i), { plot: inputs.group[i], x: inputs.x.invD[i], y, weight: 1 }));
  const posterior = model.posterior()!;

  it('coefficients, their covariance and sigma squared agree to 1e-9', () => {
    const pairs = [
      [posterior.mean[0], expected.beta['(Intercept)']], [posterior.mean[1], expected.beta.invD], [posterior.sigmaSquared, expected.sigma2],
      [posterior.inverse[0] * posterior.sigmaSquared, expected.beta_vcov[0][0]],
      [posterior.inverse[1] * posterior.sigmaSquared, expected.beta_vcov[0][1]],
      [posterior.inverse[2] * posterior.sigmaSquared, expected.beta_vcov[1][1]],
    ] as const;
    for (const [got, want] of pairs) expect(relativeError(got, want)).toBeLessThan(1e-9);
  });

  it('plot effects agree to 1e-9', () => {
    expect(expected.blup).toHaveLength(10);
    for (const { group, b } of expected.blup) expect(relativeError(model.plotEffect(group)!, b[0])).toBeLessThan(1e-9);
  });

  it('predictions for new plots agree to 1e-9 with the coefficients held', () => {
    // Held: a prior so firm that no tree moves it, with sigma squared as R has it.
    const firm = 1e15;
    for (const plot of inputs.new_plots) {
      const held = new PlotInterceptModel({
        mean: [expected.beta['(Intercept)'], expected.beta.invD], precision: [firm, 0, firm], a: firm, s: firm * expected.sigma2,
        tauSquared: expected.G[0][0] / expected.sigma2,
      });
      plot.y_meas.forEach((y: number, i: number) => held.set(String(i), { plot: plot.label, x: plot.x_meas.invD[i], y, weight: 1 }));
      const want = expected.new_plots[plot.label];
      expect(relativeError(held.plotEffect(plot.label)!, want.b_hat[0])).toBeLessThan(1e-9);
      plot.x_pred.invD.forEach((x: number, i: number) => {
        const predicted = held.predict(plot.label, x)!;
        expect(relativeError(predicted.location, want.pred_mean[i])).toBeLessThan(1e-9);
        expect(relativeError(predicted.scale ** 2, want.var_new_known_beta[i])).toBeLessThan(1e-9);
      });
    }
  });
});

describe('a new tree of 14 in beside 31 black cherry trees (Ryan, Joiner and Ryan 1976), no plots', () => {
  const model = new PlotInterceptModel(flat(1e-14), curveForms.curtis(34));
  blackCherry.forEach(({ diameterIn, heightFt }, i) =>
    model.set(String(i), { plot: String(i), x: curveForms.curtis(diameterIn * 2.54), y: Math.log(heightFt * 0.3048 - 1.3716), weight: 1 }));
  const predicted = model.predict('new', curveForms.curtis(14 * 2.54))!;
  const tailOf = (feet: number) => predictiveTail(predicted, Math.log(feet * 0.3048 - 1.3716));

  it('has the 99 % band 62.9473 to 95.1286 ft, on 29 degrees of freedom', () => {
    const [low, high] = predictiveInterval(predicted, 0.99).map((y) => (Math.exp(y) + 1.3716) / 0.3048);
    expect(predicted.df).toBeCloseTo(29, 10);
    expect(Math.abs(low! - 62.9473)).toBeLessThan(1e-4);
    expect(Math.abs(high! - 95.1286)).toBeLessThan(1e-4);
  });

  it('finds 24 ft all but impossible and 80 ft ordinary', () => {
    expect(Math.abs(tailOf(24) - 2.6e-16)).toBeLessThan(0.05e-16);
    expect(Math.abs(tailOf(80) - 0.6482)).toBeLessThan(0.00005);
  });
});

const tree = fc.record({
  plot: fc.constantFrom('a', 'b', 'c', 'd'),
  x: fc.double({ min: -0.25, max: -0.01, noNaN: true }),
  y: fc.double({ min: 0.5, max: 4, noNaN: true }),
  weight: fc.double({ min: 0.01, max: 1, noNaN: true }),
});
const forest = fc.array(tree, { minLength: 4, maxLength: 60 });

function fill(prior: PlotInterceptPrior, trees: readonly { plot: string; x: number; y: number; weight: number }[]): PlotInterceptModel {
  const model = new PlotInterceptModel(prior, -0.05);
  trees.forEach((one, i) => model.set(String(i), one));
  return model;
}
function differ(a: PlotInterceptModel, b: PlotInterceptModel): number {
  return Math.max(...['a', 'b', 'new'].flatMap((plot) => [-0.2, -0.03].flatMap((x) => {
    const [p, q] = [a.predict(plot, x)!, b.predict(plot, x)!];
    return [relativeError(p.location, q.location), relativeError(p.scale, q.scale), relativeError(p.df, q.df)];
  })));
}

describe('laws of the learning band', () => {
  it('adding and then removing a tree restores it to 1e-12', () => {
    fc.assert(fc.property(forest, tree, (trees, other) => {
      const model = fill(informative, trees);
      model.set('other', { ...other, y: other.y * 50 });
      model.remove('other');
      expect(differ(model, fill(informative, trees))).toBeLessThan(1e-12);
    }), { seed: 20260401 });
  });

  it('the order of entry does not matter (1e-12)', () => {
    fc.assert(fc.property(forest, (trees) => {
      const backwards = new PlotInterceptModel(informative, -0.05);
      trees.forEach((one, i) => backwards.set(String(trees.length - 1 - i), trees[trees.length - 1 - i]!));
      expect(differ(fill(informative, trees), backwards)).toBeLessThan(1e-12);
    }), { seed: 20260402 });
  });

  it('changing a tree is removing it and adding the other', () => {
    fc.assert(fc.property(forest, tree, (trees, other) => {
      const changed = fill(informative, trees);
      changed.set('0', other);
      expect(differ(changed, fill(informative, [other, ...trees.slice(1)]))).toBeLessThan(1e-12);
    }), { seed: 20260403 });
  });

  it('a tree of weight two counts as two such trees', () => {
    fc.assert(fc.property(forest, tree, (trees, other) => {
      const heavy = fill(informative, [...trees, { ...other, weight: 2 }]);
      const twice = fill(informative, [...trees, { ...other, weight: 1 }, { ...other, weight: 1 }]);
      expect(differ(heavy, twice)).toBeLessThan(1e-11);
    }), { seed: 20260404 });
  });

  it('says nothing while the flat prior has seen too little, and refuses what is no number', () => {
    const model = new PlotInterceptModel(flat(0.5));
    expect(model.predict('a', 0.1)).toBeNull();
    model.set('1', { plot: 'a', x: 0.1, y: 2, weight: 1 });
    expect(model.posterior()).toBeNull();
    expect(() => model.set('2', { plot: 'a', x: Number.NaN, y: 2, weight: 1 })).toThrow(RangeError);
    expect(() => model.set('2', { plot: 'a', x: 0.1, y: 2, weight: 0 })).toThrow(RangeError);
    expect(() => new PlotInterceptModel(flat(-1))).toThrow(RangeError);
  });
});
