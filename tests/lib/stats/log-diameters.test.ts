import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { LogDiameters } from '@/lib/stats/distributions/log-diameters';
import { relativeError } from '../../support/relative-error';

const prior = { mean: Math.log(24), sd: 0.4, worthTrees: 10 };
const tree = fc.record({ d: fc.double({ min: 1, max: 300, noNaN: true }), weight: fc.double({ min: 0.01, max: 1, noNaN: true }) });
const stand = fc.array(tree, { minLength: 1, maxLength: 60 });

function fill(trees: readonly { d: number; weight: number }[], start = prior): LogDiameters {
  const diameters = new LogDiameters(start);
  for (const { d, weight } of trees) diameters.add(d, weight);
  return diameters;
}
function differ(a: LogDiameters, b: LogDiameters): number {
  const [p, q] = [a.predict(), b.predict()];
  return Math.max(relativeError(p.location, q.location), relativeError(p.scale, q.scale), relativeError(p.df, q.df));
}

describe('log-normal diameters that learn', () => {
  it('before any tree: the prior’s mean, its spread widened by 1 + 1/worth, as many degrees of freedom as it is worth', () => {
    const { location, scale, df } = fill([]).predict();
    expect(location).toBe(prior.mean);
    expect(relativeError(scale, 0.4 * Math.sqrt(1.1))).toBeLessThan(1e-14);
    expect(df).toBe(10);
  });

  // Gelman et al., Bayesian Data Analysis, 3rd ed., section 3.3: μ_n = (κ0μ0 + nȳ)/κ_n, κ_nσ_n² as below with ν0 = κ0.
  it('after trees: the conjugate formulas from mean and sum of squares', () => {
    fc.assert(fc.property(fc.array(fc.double({ min: 1, max: 300, noNaN: true }), { minLength: 2, maxLength: 40 }), (all) => {
      const logs = all.map(Math.log);
      const n = logs.length;
      const mean = logs.reduce((sum, v) => sum + v, 0) / n;
      const squares = logs.reduce((sum, v) => sum + (v - mean) ** 2, 0);
      const variance = (10 * 0.16 + squares + ((10 * n) / (10 + n)) * (mean - prior.mean) ** 2) / (10 + n);
      const got = fill(all.map((d) => ({ d, weight: 1 }))).predict();
      expect(relativeError(got.location, (10 * prior.mean + n * mean) / (10 + n))).toBeLessThan(1e-12);
      expect(relativeError(got.scale ** 2, variance * (1 + 1 / (10 + n)))).toBeLessThan(1e-12);
      expect(got.df).toBe(10 + n);
    }), { seed: 20260604 });
  });

  it('adding and then removing a tree restores it to 1e-12', () => {
    fc.assert(fc.property(stand, tree, (trees, other) => {
      const diameters = fill(trees);
      diameters.add(other.d, other.weight);
      diameters.remove(other.d, other.weight);
      expect(differ(diameters, fill(trees))).toBeLessThan(1e-12);
    }), { seed: 20260605 });
  });

  it('the order of entry does not matter (1e-12)', () => {
    fc.assert(fc.property(stand, (trees) => {
      expect(differ(fill([...trees].reverse()), fill(trees))).toBeLessThan(1e-12);
    }), { seed: 20260606 });
  });

  it('refuses what is no prior', () => {
    for (const bad of [{ ...prior, mean: Number.NaN }, { ...prior, sd: 0 }, { ...prior, worthTrees: 0 }]) expect(() => new LogDiameters(bad)).toThrow(RangeError);
  });
});
