import { describe, expect, it } from 'vitest';
import { angleCountBasalArea, angleCountExpansion, gaugeAngle, limitingDistance, plotRadiusFactor, squareFeetPerAcre } from '@/lib/trees/angle-count';
import { azimuthErrorArc, azimuthErrorChord } from '@/lib/trees/azimuth-error';
import { clusterExpansion } from '@/lib/trees/expansion';
import { given } from '../../support/given';

// Method: Bitterlich 1948, Grosenbaugh 1952; values recomputed in double precision in the trade's list of standards.
describe('G5: angle count, metric', () => {
  it.each([[4, 30, 7.5, 7.35, 56.5884], [2, 25, 8.8388, 8.7138, 40.7437], [1, 40, 20, 19.8, 7.9577]])(
    'k = %d, d = %d cm: %d m to the centre, %d m to the face, %d per ha', (k, d, centre, face, factor) => {
      expect(given(limitingDistance(k, d, 'metric', 'centre')).value).toBeCloseTo(centre, 4);
      expect(given(limitingDistance(k, d, 'metric', 'face')).value).toBeCloseTo(face, 4);
      expect(given(angleCountExpansion(k, d, 'metric')).value).toBeCloseTo(factor, 4);
    });

  it('the gauge of k = 4 has 2.29198 degrees', () => {
    expect(given(gaugeAngle(4, 'metric')).value).toBeCloseTo(2.29198, 5);
  });
});

describe('G6: angle count, US', () => {
  it('BAF 10, 12 in: factor 2.75000, 33.000 ft, 12.7324 per acre, 104.178 minutes', () => {
    expect(given(plotRadiusFactor(10, 'us', 'centre')).value).toBeCloseTo(2.75, 5);
    expect(given(limitingDistance(10, 12, 'us', 'centre')).value).toBeCloseTo(33, 3);
    expect(given(angleCountExpansion(10, 12, 'us')).value).toBeCloseTo(12.7324, 4);
    expect(given(gaugeAngle(10, 'us')).value * 60).toBeCloseTo(104.178, 3);
  });

  it('BAF 20, 12 in: factor 1.94454, 23.3345 ft, 25.4648 per acre', () => {
    expect(given(plotRadiusFactor(20, 'us', 'centre')).value).toBeCloseTo(1.94454, 5);
    expect(given(limitingDistance(20, 12, 'us', 'centre')).value).toBeCloseTo(23.3345, 4);
    expect(given(angleCountExpansion(20, 12, 'us')).value).toBeCloseTo(25.4648, 4);
  });

  it('BAF 40: factor 1.37500 to the centre, 1.33333 to the face; mixing them costs 3 % of distance and 6 % of area', () => {
    const centre = given(plotRadiusFactor(40, 'us', 'centre')).value, face = given(plotRadiusFactor(40, 'us', 'face')).value;
    expect(centre).toBeCloseTo(1.375, 5);
    expect(face).toBeCloseTo(1.33333, 5);
    expect(1 - face / centre).toBeCloseTo(0.03, 2);
    expect(1 - (face / centre) ** 2).toBeCloseTo(0.06, 2);
  });
});

describe('G7: five points of BAF 10 (FIA Database User Guide 9.3)', () => {
  // The guide rounds pi/576 to 0.005454; with its constant in place of ours its values come out.
  it.each([[11.5, 2.7728], [5.2, 13.56151]])('%d in: %d per acre', (inches, published) => {
    const ours = given(clusterExpansion(given(angleCountExpansion(10, inches, 'us')).value, 5)).value;
    expect((ours * Math.PI) / 576 / 0.005454).toBeCloseTo(published, 5);
  });
});

describe('G8: estimates at points', () => {
  it('k = 4 with counts 6, 7, 5 gives 24.0 m²/ha', () => {
    expect(given(angleCountBasalArea(4, [6, 7, 5])).value).toBe(24);
  });

  it('k = 4, stems of 20, 28 and 35 cm: 127.3240 + 64.9612 + 41.5752 = 233.8603 per ha', () => {
    const factors = [20, 28, 35].map((d) => given(angleCountExpansion(4, d, 'metric')).value);
    [127.324, 64.9612, 41.5752].forEach((v, i) => expect(factors[i]).toBeCloseTo(v, 4));
    expect(factors.reduce((a, b) => a + b, 0)).toBeCloseTo(233.8603, 4);
  });

  it('1 m²/ha is 4.356 ft²/ac exactly; 10 ft²/ac is 2.295684 m²/ha', () => {
    expect(squareFeetPerAcre(1)).toBe(4.356);
    expect(10 / squareFeetPerAcre(1)).toBeCloseTo(2.295684, 6);
  });

  it('no stem counted is a result, no point is not', () => {
    expect(angleCountBasalArea(4, [0, 0])).toEqual({ kind: 'value', value: 0 });
    expect(angleCountBasalArea(4, [])).toEqual({ kind: 'refused', reason: 'no-points' });
    expect(angleCountBasalArea(4, [-1])).toEqual({ kind: 'refused', reason: 'bad-count' });
  });
});

describe('G9: azimuth error', () => {
  it('10 degrees at 58.9 ft: arc 3.1333 m, chord 3.1294 m', () => {
    expect(given(azimuthErrorArc(58.9 * 0.3048, 10)).value).toBeCloseTo(3.1333, 4);
    expect(given(azimuthErrorChord(58.9 * 0.3048, -10)).value).toBeCloseTo(3.1294, 4);
  });

  it('half a turn puts the tree on the other side: twice the distance', () => {
    expect(given(azimuthErrorChord(7, 180)).value).toBeCloseTo(14, 12);
    expect(azimuthErrorArc(7, 181)).toEqual({ kind: 'refused', reason: 'bad-angle' });
    expect(azimuthErrorChord(NaN, 10)).toEqual({ kind: 'refused', reason: 'bad-distance' });
  });
});

it('factors and diameters that are none are refused', () => {
  expect(limitingDistance(0, 30, 'metric', 'centre')).toEqual({ kind: 'refused', reason: 'bad-factor' });
  expect(limitingDistance(4, NaN, 'metric', 'face')).toEqual({ kind: 'refused', reason: 'bad-dbh' });
  expect(angleCountExpansion(4, 0, 'us')).toEqual({ kind: 'refused', reason: 'bad-dbh' });
  expect(gaugeAngle(10_000, 'metric')).toEqual({ kind: 'refused', reason: 'bad-factor' });
});
