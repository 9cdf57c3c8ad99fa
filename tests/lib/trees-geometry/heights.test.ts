import { describe, expect, it } from 'vitest';
import { heightByPercents, heightByPole, heightBySines, heightByTangents, horizontalOfDegrees } from '@/lib/trees/height-from-angles';
import { heightError } from '@/lib/trees/height-error';
import { leaningStemLength } from '@/lib/trees/leaning-stem';
import { given } from '../../support/given';

// H1-H8: trigonometry, recomputed in double precision in the trade's list of standards.
describe('height by two angles', () => {
  it('H1: 20 m, +38 and -4 degrees: 17.02425 m', () => {
    expect(given(heightByTangents(20, 38, -4)).heightM).toBeCloseTo(17.02425, 5);
  });

  it('H2: 25 m, +62 and -8 %: 17.5 m', () => {
    expect(given(heightByPercents(25, 62, -8)).heightM).toBeCloseTo(17.5, 12);
  });

  it('H3: tree uphill, 18 m, +52 and +6 degrees: 21.14707 m', () => {
    expect(given(heightByTangents(18, 52, 6)).heightM).toBeCloseTo(21.14707, 5);
  });

  it('H4: 30 m along -12 degrees are 29.34443 m; top +35 degrees: 26.78454 m', () => {
    const horizontal = given(horizontalOfDegrees(30, -12)).value;
    expect(horizontal).toBeCloseTo(29.34443, 5);
    expect(given(heightByTangents(horizontal, 35, -12)).heightM).toBeCloseTo(26.78454, 5);
  });

  it('H5: 50 ft, +85 and -12 %: 48.5 ft', () => {
    expect(given(heightByPercents(50, 85, -12)).heightM).toBeCloseTo(48.5, 12);
  });

  it('H6: sine method, 32.0 m at 40 and 24.6 m at -5 degrees: 22.71323 m', () => {
    expect(given(heightBySines({ distanceM: 32, angleDeg: 40 }, { distanceM: 24.6, angleDeg: -5 })).heightM).toBeCloseTo(22.71323, 5);
  });

  it('H7: pole of 2 m at +55, -2 and -12 %: 13.4 m', () => {
    expect(given(heightByPole(2, 55, -2, -12)).heightM).toBeCloseTo(13.4, 12);
  });
});

describe('H8: expected error', () => {
  it('of H1 with 0.5 degrees and 0.1 m', () => {
    const error = given(heightError(20, 38, -4, 0.5, 0.1));
    expect(error.perTopDegreeM).toBeCloseTo(0.562138, 6);
    expect(error.perBaseDegreeM).toBeCloseTo(0.350773, 6);
    expect(error.perMetre).toBeCloseTo(0.851212, 6);
    expect(error.sigmaM).toBeCloseTo(0.342061, 6);
  });

  it.each([[30, 4.031], [45, 3.491], [60, 4.031], [70, 5.431]])('one degree at %d is %d %% of the height above the eye', (angle, percent) => {
    const error = given(heightError(20, angle, 0, 1, 0));
    expect((100 * error.perTopDegreeM) / (20 * Math.tan((angle * Math.PI) / 180))).toBeCloseTo(percent, 3);
  });

  it('errors below 0 and right angles are refused', () => {
    expect(heightError(20, 38, -4, -1, 0)).toEqual({ kind: 'refused', reason: 'bad-sigma' });
    expect(heightError(20, 90, -4, 1, 0)).toEqual({ kind: 'refused', reason: 'bad-angle' });
    expect(heightError(0, 38, -4, 1, 0)).toEqual({ kind: 'refused', reason: 'bad-distance' });
  });
});

// Lean of 8 degrees on a stem of 20 m, from the same list; Brack and Wood 1998 for the length.
describe('a stem of 20 m that leans 8 degrees', () => {
  const vertical = 20 * Math.cos((8 * Math.PI) / 180), offset = 20 * Math.sin((8 * Math.PI) / 180);
  const seen = (towards: number) => given(heightByTangents(20, (Math.atan(vertical / (20 - towards)) * 180) / Math.PI, 0)).heightM;

  it('towards the observer reads 23.00737 m, away 17.38573 m, the mean of both 20.19655 m', () => {
    expect(seen(offset)).toBeCloseTo(23.00737, 5);
    expect(seen(-offset)).toBeCloseTo(17.38573, 5);
    expect((seen(offset) + seen(-offset)) / 2).toBeCloseTo(20.19655, 5);
  });

  it('has 19.80536 m of height, 2.78346 m of overhang and its length back from both', () => {
    expect(vertical).toBeCloseTo(19.80536, 5);
    expect(given(leaningStemLength(19.80536, 2.78346)).value).toBeCloseTo(20, 5);
    expect(leaningStemLength(NaN, 1)).toEqual({ kind: 'refused', reason: 'bad-length' });
  });
});

describe('cautions and refusals', () => {
  it('over 60 degrees, and closer than the height, are cautions', () => {
    expect(given(heightByTangents(10, 61, -5)).cautions).toEqual(['steep-angle', 'closer-than-height']);
    expect(given(heightByTangents(30, 45, -5)).cautions).toEqual(['closer-than-height']);
    expect(given(heightByPercents(40, 62, -8)).cautions).toEqual([]);
    expect(given(heightBySines({ distanceM: 32, angleDeg: 62 }, { distanceM: 24.6, angleDeg: -5 })).cautions).toEqual(['steep-angle']);
  });

  it('a top below the base, right angles, lengths that are none and a pole below the base are refused', () => {
    expect(heightByTangents(20, -4, 38)).toEqual({ kind: 'refused', reason: 'top-not-above-base' });
    expect(heightByTangents(20, 90, 0)).toEqual({ kind: 'refused', reason: 'bad-angle' });
    expect(heightByPercents(NaN, 62, -8)).toEqual({ kind: 'refused', reason: 'bad-distance' });
    expect(heightByPercents(25, NaN, -8)).toEqual({ kind: 'refused', reason: 'bad-angle' });
    expect(heightByPole(2, 55, -12, -12)).toEqual({ kind: 'refused', reason: 'bad-pole' });
    expect(heightBySines({ distanceM: 0, angleDeg: 40 }, { distanceM: 20, angleDeg: 0 })).toEqual({ kind: 'refused', reason: 'bad-distance' });
    expect(horizontalOfDegrees(30, -90)).toEqual({ kind: 'refused', reason: 'bad-angle' });
  });
});
