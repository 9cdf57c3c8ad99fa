import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { areaExpansion, clusterExpansion } from '@/lib/trees/expansion';
import { circleOfStem } from '@/lib/trees/nested-circles';
import { plotArea, plotRadius } from '@/lib/trees/plot-radius';
import { given } from '../../support/given';

// G1-G3: r = sqrt(A/pi), recomputed in double precision in the trade's list of standards.
describe('G1, G2: radius of a circular plot', () => {
  it.each([[50, 3.9894], [100, 5.6419], [200, 7.9788], [250, 8.9206], [300, 9.7721], [400, 11.2838], [500, 12.6157], [1000, 17.8412], [2000, 25.2313], [10000, 56.419]])(
    'G1: %d m² has a radius of %d m', (area, radius) => {
      expect(given(plotRadius(area, 'metric')).value).toBeCloseTo(radius, 4);
    });

  it.each([[1 / 300, 6.7984], [1 / 100, 11.7752], [1 / 50, 16.6527], [1 / 24, 24.0361], [1 / 20, 26.3302], [1 / 10, 37.2365], [1 / 5, 52.6604], [1 / 4, 58.8761], [1, 117.7522]])(
    'G2: %d ac has a radius of %d ft', (area, radius) => {
      expect(given(plotRadius(area, 'us')).value).toBeCloseTo(radius, 4);
    });

  it('area and radius undo each other', () => {
    fc.assert(fc.property(fc.double({ min: 0.01, max: 1e5, noNaN: true }), fc.constantFrom('metric' as const, 'us' as const), (area, system) => {
      expect(given(plotArea(given(plotRadius(area, system)).value, system)).value / area).toBeCloseTo(1, 12);
    }), { seed: 1 });
  });
});

describe('G3: a rounded radius changes the expansion factor', () => {
  it.each([[11.28, 399.7312, 25.01681, 5], [3.99, 50.0145, 199.94214, 5]])('%d m: %d m² and %d per ha', (radius, area, factor, digits) => {
    const laidOut = given(plotArea(radius, 'metric')).value;
    expect(laidOut).toBeCloseTo(area, 4);
    expect(given(areaExpansion(laidOut, 'metric')).value).toBeCloseTo(factor, digits);
  });

  it('5.64 m is 99.9328 m², 17.84 m is 999.861 m²; nominal 400 m² is 25 per ha', () => {
    expect(given(plotArea(5.64, 'metric')).value).toBeCloseTo(99.9328, 4);
    expect(given(plotArea(17.84, 'metric')).value).toBeCloseTo(999.861, 3);
    expect(given(areaExpansion(400, 'metric')).value).toBe(25);
  });
});

describe('G4: clusters (FIA Database User Guide 9.3, section 1.2.5)', () => {
  it.each([[24, 24.072185, 6.018046], [6.8, 299.86113, 74.965282], [58.9, 3.996754, 0.999188]])('%d ft: %d per acre alone, %d in a cluster of four', (radius, single, cluster) => {
    const one = given(areaExpansion(given(plotArea(radius, 'us')).value * 43_560, 'us')).value;
    expect(one).toBeCloseTo(single, 6);
    expect(given(clusterExpansion(one, 4)).value).toBeCloseTo(cluster, 6);
  });

  it('a 24 ft circle has 0.04154172 ac', () => {
    expect(given(plotArea(24, 'us')).value).toBeCloseTo(0.04154172, 8);
  });
});

describe('nested circles', () => {
  const circles = [{ fromDbhCm: 5, radiusM: 3.99 }, { fromDbhCm: 15, radiusM: 11.28 }, { fromDbhCm: 40, radiusM: 17.84 }];

  // Factors: 10,000 m² over the areas of G3.
  it.each([[5, 0, 199.94214], [9, 0, 199.94214], [14.9, 0, 199.94214], [15, 1, 25.01681], [39.9, 1, 25.01681], [40, 2, 10_000 / 999.861]])(
    'a stem of %d cm belongs to circle %d alone, %d per ha', (dbhCm, index, factor) => {
      const circle = given(circleOfStem(circles, dbhCm));
      expect(circle.index).toBe(index);
      expect(circle.expansionPerHa).toBeCloseTo(factor, 4);
    });

  it('the order in which circles are listed does not matter, the index names the one listed', () => {
    expect(given(circleOfStem([...circles].reverse(), 20))).toMatchObject({ index: 1, radiusM: 11.28 });
    expect(given(circleOfStem([...circles].reverse(), 50))).toMatchObject({ index: 0, radiusM: 17.84 });
  });

  it('a random forest tallied on nested circles estimates its stems per ha without bias (within 3 standard errors)', () => {
    let state = 11;
    const uniform = () => { state = (Math.imul(state, 1664525) + 1013904223) >>> 0; return state / 2 ** 32; };
    const plots = Array.from({ length: 400 }, () => {
      // 500 stems per ha on a square of 40 m round the centre: 80 stems, diameters from 5 to 60 cm
      const stems = Array.from({ length: 80 }, () => ({ x: 40 * uniform() - 20, y: 40 * uniform() - 20, dbhCm: 5 + 55 * uniform() }));
      return stems.reduce((sum, stem) => {
        const circle = given(circleOfStem(circles, stem.dbhCm));
        return Math.hypot(stem.x, stem.y) <= circle.radiusM ? sum + circle.expansionPerHa : sum;
      }, 0);
    });
    const mean = plots.reduce((a, b) => a + b, 0) / plots.length;
    const se = Math.sqrt(plots.reduce((sum, v) => sum + (v - mean) ** 2, 0) / (plots.length - 1) / plots.length);
    expect(Math.abs(mean - 500)).toBeLessThan(3 * se);
  });

  it('too thin a stem, no design and designs that do not nest are refused', () => {
    expect(circleOfStem(circles, 4.9)).toEqual({ kind: 'refused', reason: 'below-threshold' });
    expect(circleOfStem([], 20)).toEqual({ kind: 'refused', reason: 'no-circles' });
    expect(circleOfStem([{ fromDbhCm: 5, radiusM: 10 }, { fromDbhCm: 15, radiusM: 8 }], 20)).toEqual({ kind: 'refused', reason: 'circle-not-larger' });
    expect(circleOfStem([{ fromDbhCm: 5, radiusM: 10 }, { fromDbhCm: 5, radiusM: 12 }], 20)).toEqual({ kind: 'refused', reason: 'circle-not-larger' });
    expect(circleOfStem([{ fromDbhCm: 5, radiusM: NaN }], 20)).toEqual({ kind: 'refused', reason: 'bad-circle' });
    expect(circleOfStem(circles, NaN)).toEqual({ kind: 'refused', reason: 'bad-dbh' });
  });
});

it.each([0, -1, NaN, Infinity])('an area or radius of %d is refused', (value) => {
  for (const result of [plotRadius(value, 'metric'), plotArea(value, 'us'), areaExpansion(value, 'metric'), clusterExpansion(value, 4)]) expect(result).toEqual({ kind: 'refused', reason: 'not-positive' });
  expect(clusterExpansion(25, 1.5)).toEqual({ kind: 'refused', reason: 'bad-count' });
});
