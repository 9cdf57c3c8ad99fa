import { describe, expect, it } from 'vitest';
import { R95_PER_DRMS, R95_PER_R68, R95_PER_SIGMA, circularRadius, circularShare } from '@/lib/position/circular-normal';
import { effectiveCount, estimateEffectiveCount } from '@/lib/position/effective-count';
import { nssda } from '@/lib/position/nssda';
import { given } from '../../support/given';

describe('radii of the circular normal distribution (closed form; recomputed in double precision)', () => {
  it.each([[0.5, 1.17741], [0.68, 1.50959], [0.9, 2.14597], [0.95, 2.44775], [0.98, 2.79715], [0.99, 3.03485]])('the circle of %d has %d sigma', (share, sigmas) => {
    expect(given(circularRadius(share)).sigmas).toBeCloseTo(sigmas, 5);
  });

  it('DRMS holds 63.212 %, twice DRMS 98.168 %', () => {
    expect(circularShare(Math.SQRT2)).toBeCloseTo(0.63212, 5);
    expect(circularShare(2 * Math.SQRT2)).toBeCloseTo(0.98168, 5);
  });

  it('the scales to 95 % are 1.621462 from 68 %, 1.730818 from DRMS, 2.078925 from CEP', () => {
    expect(R95_PER_R68).toBeCloseTo(1.621462, 6);
    expect(R95_PER_DRMS).toBeCloseTo(1.730818, 6);
    expect(R95_PER_SIGMA / given(circularRadius(0.5)).sigmas).toBeCloseTo(2.078925, 6);
  });

  it('HDOP 1.2 with a range error of 5 m gives a 95 % radius of 10.385 m', () => {
    expect(1.2 * 5 * R95_PER_DRMS).toBeCloseTo(10.385, 3);
  });

  it.each([0, 1, -0.1, NaN])('a share of %d is refused', (share) => {
    expect(circularRadius(share)).toEqual({ kind: 'refused', reason: 'share-outside' });
  });
});

describe('N1: NSSDA (FGDC-STD-007.3-1998; values recomputed in double precision)', () => {
  const dx = [1.2, -0.8, 2.1, -1.5, 0.4, -2.2, 1.9, 0.3, -0.7, 1.1, -1.4, 0.9, 2.4, -0.2, -1.8, 0.6, 1.3, -2, 0.8, -0.5];
  const dy = [-0.9, 1.4, 0.7, -2, 1.6, 0.2, -1.1, 2.3, -0.4, -1.7, 0.5, 1.8, -0.6, -2.1, 1, 0.3, -1.3, 0.8, 2, -1.2];

  it('root mean squares and both 95 % accuracies', () => {
    const result = given(nssda(dx, dy));
    expect(result.rmseX).toBeCloseTo(1.376408, 6);
    expect(result.rmseY).toBeCloseTo(1.351481, 6);
    expect(result.rmseR).toBeCloseTo(1.928989, 6);
    // The standard prints its factors with four decimals, ours are exact: 1.7308 and 2.4477 against 1.730818 and 2.447747.
    expect((result.accuracyEqualAxes * 1.7308) / R95_PER_DRMS).toBeCloseTo(3.338695, 6);
    expect((result.accuracyUnequalAxes * 2.4477) / R95_PER_SIGMA).toBeCloseTo(3.338527, 6);
  });

  it('fewer than 20 points, unequal lengths, axes more unlike than 0.6 and missing numbers are refused', () => {
    expect(nssda(dx.slice(1), dy.slice(1))).toEqual({ kind: 'refused', reason: 'too-few-points' });
    expect(nssda(dx, dy.slice(1))).toEqual({ kind: 'refused', reason: 'unequal-lengths' });
    expect(nssda(dx, dy.map((v) => v / 2))).toEqual({ kind: 'refused', reason: 'axes-too-unequal' });
    expect(nssda([...dx.slice(1), NaN], dy)).toEqual({ kind: 'refused', reason: 'not-finite' });
  });
});

describe('averaging of correlated fixes', () => {
  it('60 fixes at an autocorrelation of 0.9 are worth 3.158: 4 m become 2.25 m, not 0.52 m', () => {
    const effective = effectiveCount(60, 0.9);
    expect(effective).toBeCloseTo(3.158, 3);
    expect(4 / Math.sqrt(effective)).toBeCloseTo(2.25, 2);
    expect(4 / Math.sqrt(60)).toBeCloseTo(0.52, 2);
  });

  it('negative correlation earns no bonus, full correlation leaves one fix', () => {
    expect(effectiveCount(60, -0.5)).toBe(60);
    expect(effectiveCount(60, 1)).toBe(1);
  });

  it('an alternating track has the autocorrelation of its definition, -(n-1)/n', () => {
    const track = Array.from({ length: 20 }, (_, i) => ({ eastM: i % 2 === 0 ? 1 : -1, northM: 0 }));
    expect(estimateEffectiveCount(track)).toMatchObject({ kind: 'effective', autocorrelation: -19 / 20 });
  });

  it('fewer than ten fixes, and fixes without spread, give no estimate', () => {
    expect(estimateEffectiveCount([{ eastM: 0, northM: 0 }])).toEqual({ kind: 'unknown', reason: 'too-few' });
    expect(estimateEffectiveCount(Array.from({ length: 12 }, () => ({ eastM: 3, northM: 4 })))).toEqual({ kind: 'unknown', reason: 'no-spread' });
  });
});
