import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { judgeInOut } from '@/lib/trees/limiting-distance';
import { alongSlope, horizontalDistance, percentOfDegrees, slopeFactor } from '@/lib/trees/slope';
import { given } from '../../support/given';

/** In or out; a refusal fails the test. */
const judge = (...args: Parameters<typeof judgeInOut>) => given(judgeInOut(...args));
const circle = { radiusM: 11.28, about: 'centre' } as const;

// G10: trigonometry, recomputed in double precision in the trade's list of standards.
describe('G10: slope', () => {
  it.each([[12.4, 35, 11.7038], [11.6, 25, 11.2537]])('%d m along %d %% are %d m', (slope, percent, horizontal) => {
    expect(given(horizontalDistance(slope, percent)).value).toBeCloseTo(horizontal, 4);
  });

  it.each([[10, 1.004988], [20, 1.019804], [30, 1.044031], [40, 1.077033], [60, 1.16619], [100, 1.414214]])('the factor of %d %% is %d', (percent, factor) => {
    expect(given(slopeFactor(percent)).value).toBeCloseTo(factor, 6);
    expect(given(slopeFactor(-percent)).value).toBeCloseTo(factor, 6);
  });

  it('11.28 m are laid out as 12.1489 m along 40 %, 20 m as 22.06756 m along 25 degrees', () => {
    expect(given(alongSlope(11.28, 40)).value).toBeCloseTo(12.1489, 4);
    expect(given(alongSlope(20, given(percentOfDegrees(25)).value)).value).toBeCloseTo(22.06756, 5);
  });

  it('what is no length or slope is refused', () => {
    expect(horizontalDistance(-1, 10)).toEqual({ kind: 'refused', reason: 'negative' });
    expect(alongSlope(NaN, 10)).toEqual({ kind: 'refused', reason: 'not-finite' });
    expect(horizontalDistance(10, NaN)).toEqual({ kind: 'refused', reason: 'not-finite' });
    expect(percentOfDegrees(90)).toEqual({ kind: 'refused', reason: 'too-steep' });
  });
});

// Worked by hand from G5 and G10.
describe('in or out', () => {
  it('12.40 m along 35 % is 11.7038 m, out of a circle of 11.28 m; 11.60 m along 25 % is in', () => {
    expect(judge({ distanceM: 12.4, to: 'centre', along: { slopePercent: 35 } }, circle, null, 0.1)).toMatchObject({ kind: 'out', horizontalM: expect.closeTo(11.7038, 4) });
    expect(judge({ distanceM: 11.6, to: 'centre', along: { slopePercent: 25 } }, circle, null, 0.1)).toMatchObject({ kind: 'in', horizontalM: expect.closeTo(11.2537, 4), borderline: true });
  });

  it('along 40 % the tape may show 12.1489 m', () => {
    expect(judge({ distanceM: 12.1, to: 'centre', along: { slopePercent: 40 } }, circle, null, 0).limitM).toBeCloseTo(12.1489, 4);
  });

  it('read to the face, the limit is half the DBH shorter: 7.35 m for 30 cm and k = 4', () => {
    const limit = { radiusM: 7.5, about: 'centre' } as const;
    expect(judge({ distanceM: 7.35, to: 'face', along: 'horizontal' }, limit, 30, 0)).toMatchObject({ kind: 'in', limitM: expect.closeTo(7.35, 10), horizontalM: expect.closeTo(7.5, 10) });
    expect(judge({ distanceM: 7.36, to: 'face', along: 'horizontal' }, limit, 30, 0).kind).toBe('out');
    expect(judge({ distanceM: 7.36, to: 'centre', along: 'horizontal' }, limit, 30, 0).kind).toBe('in');
  });

  it('where the project judges by the face, a reading to the centre gains half the DBH', () => {
    expect(judge({ distanceM: 11.4, to: 'centre', along: 'horizontal' }, { radiusM: 11.28, about: 'face' }, 30, 0)).toMatchObject({ kind: 'in', limitM: expect.closeTo(11.43, 10), horizontalM: expect.closeTo(11.25, 10) });
  });

  it('exactly at the limit is in, a centimetre beyond is out by a centimetre', () => {
    expect(judge({ distanceM: 11.28, to: 'centre', along: 'horizontal' }, circle, null, 0).kind).toBe('in');
    const out = judge({ distanceM: 11.29, to: 'centre', along: 'horizontal' }, circle, null, 0.05);
    expect(out).toMatchObject({ kind: 'out', borderline: true });
    expect(out.beyondM).toBeCloseTo(0.01, 10);
  });

  it('tape and horizontal distance always agree on in and out', () => {
    fc.assert(fc.property(
      fc.double({ min: 0, max: 30, noNaN: true }), fc.double({ min: -90, max: 90, noNaN: true }), fc.constantFrom('centre' as const, 'face' as const),
      fc.constantFrom('centre' as const, 'face' as const), fc.double({ min: 5, max: 90, noNaN: true }), (distanceM, slopePercent, to, about, dbhCm) => {
        const result = judge({ distanceM, to, along: { slopePercent } }, { radiusM: 12.62, about }, dbhCm, 0);
        fc.pre(Math.abs(result.beyondM) > 1e-6);
        expect(result.kind).toBe(result.horizontalM <= 12.62 ? 'in' : 'out');
        expect(result.kind).toBe(distanceM <= result.limitM ? 'in' : 'out');
      }), { seed: 3 });
  });

  it('a face reading without DBH, and numbers that are none, are refused', () => {
    expect(judgeInOut({ distanceM: 5, to: 'face', along: 'horizontal' }, circle, null, 0)).toEqual({ kind: 'refused', reason: 'dbh-needed' });
    expect(judgeInOut({ distanceM: -5, to: 'centre', along: 'horizontal' }, circle, null, 0)).toEqual({ kind: 'refused', reason: 'bad-distance' });
    expect(judgeInOut({ distanceM: 5, to: 'centre', along: { slopePercent: NaN } }, circle, null, 0)).toEqual({ kind: 'refused', reason: 'bad-slope' });
    expect(judgeInOut({ distanceM: 5, to: 'centre', along: 'horizontal' }, { radiusM: 0, about: 'centre' }, null, 0)).toEqual({ kind: 'refused', reason: 'bad-limit' });
    expect(judgeInOut({ distanceM: 5, to: 'centre', along: 'horizontal' }, circle, -3, 0)).toEqual({ kind: 'refused', reason: 'bad-dbh' });
    expect(judgeInOut({ distanceM: 0, to: 'face', along: 'horizontal' }, { radiusM: 0.2, about: 'centre' }, 60, 0)).toEqual({ kind: 'refused', reason: 'stem-wider-than-limit' });
  });
});
