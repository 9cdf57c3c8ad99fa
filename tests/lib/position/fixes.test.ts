import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { geodesicBetween, geodesicFrom } from '@/lib/position/geodesic';
import { judgePosition } from '@/lib/position/judge-position';
import { toPlane, toPlaneNearby } from '@/lib/position/local-plane';
import { summariseFixes } from '@/lib/position/summarise-fixes';
import type { Fix, FixRule } from '@/lib/position/summarise-fixes';
import { given } from '../../support/given';

const centre = { lat: 61.5, lon: 25 };
const rule: FixRule = { centre: 'median', nowMs: 100_000, minimumFixes: 10, staleAfterS: 10 };

/** A fix so many metres east and north of a place. */
function fixAt(eastM: number, northM: number, over: Partial<Fix> = {}, from = centre): Fix {
  const { lat, lon } = given(geodesicFrom(from, (Math.atan2(eastM, northM) * 180) / Math.PI, Math.hypot(eastM, northM)));
  return { lat, lon, accuracyM: 6, atMs: 95_000, ...over };
}
/** Numbers that repeat with their seed, normal by the sum of twelve. */
function noise(seed: number): () => number {
  let state = seed;
  const uniform = () => { state = (Math.imul(state, 1664525) + 1013904223) >>> 0; return state / 2 ** 32; };
  return () => Array.from({ length: 12 }, uniform).reduce((sum, u) => sum + u, -6);
}
function cloud(n: number, sigmaM: number, seed: number, over: Partial<Fix> = {}): readonly Fix[] {
  const next = noise(seed);
  return Array.from({ length: n }, (_, i) => fixAt(sigmaM * next(), sigmaM * next(), { atMs: 95_000 - (n - i) * 1000, ...over }));
}
const distance = (a: { lat: number; lon: number }, b: { lat: number; lon: number }) => given(geodesicBetween(a, b)).distanceM;

describe('centre and scatter', () => {
  it('of a hand-made cross the centre is its middle and the scatter the root of the squares over 2(n - 1)', () => {
    const fixes = [fixAt(2, 0), fixAt(-2, 0), fixAt(0, 2), fixAt(0, -2), fixAt(0, 0)];
    const summary = given(summariseFixes(fixes, rule));
    expect(distance(summary.centre, centre)).toBeLessThan(1e-6);
    expect(summary.scatter!.sigmaM).toBeCloseTo(Math.sqrt(16 / 8), 6);
    expect(summary.scatter!.r95M).toBeCloseTo(2.44775 * Math.SQRT2, 4);
    expect(summary.points.map((p) => p.kept)).toEqual([true, true, true, true, true]);
  });

  it('inverse variance pulls towards the better fix: 3 m against 6 m weigh 4 to 1', () => {
    const summary = given(summariseFixes([fixAt(0, 0, { accuracyM: 3 }), fixAt(2.5, 0, { accuracyM: 6 })], { ...rule, centre: 'inverse-variance' }));
    expect(distance(summary.centre, fixAt(0.5, 0))).toBeLessThan(1e-6);
  });

  it('the order of the list changes nothing', () => {
    const fixes = [...cloud(40, 4, 3), fixAt(60, 10, { atMs: 91_500 })];
    const shuffled = [...fixes].reverse();
    const [a, b] = [given(summariseFixes(fixes, rule)), given(summariseFixes(shuffled, rule))];
    expect(distance(a.centre, b.centre)).toBeLessThan(1e-6);
    expect(a.used).toBe(b.used);
  });

  it('fixes on both sides of the 180th meridian have their centre between them', () => {
    const dateline = { lat: -16.8, lon: 180 };
    const summary = given(summariseFixes([fixAt(2, 0, {}, dateline), fixAt(-2, 0, {}, dateline), fixAt(0, 1, {}, dateline)], rule));
    expect(distance(summary.centre, dateline)).toBeLessThan(1.5);
  });
});

describe('fixes away from the centre', () => {
  it.each([
    ['a walk in of 25 fixes', Array.from({ length: 25 }, (_, i) => fixAt(120 - 4 * i, 30, { atMs: 20_000 + i }))],
    ['45 % taken 30 m off to one side', cloud(49, 3, 8).map((f) => ({ ...f, lon: f.lon + 30 / 53_230 }))],
    ['one wild fix 4 km off', [fixAt(4000, -900)]],
  ])('%s are left out, the centre holds to 2 m', (_, away) => {
    const summary = given(summariseFixes([...away, ...cloud(60, 3, 5)], rule));
    expect(distance(summary.centre, centre)).toBeLessThan(2);
    const leftOut = new Set(summary.leftOut.map((l) => l.index));
    const far = away.map((_fix, i) => i).filter((i) => distance(away[i]!, centre) > 25);
    expect(far.length).toBeGreaterThan(0);
    expect(far.filter((i) => !leftOut.has(i))).toEqual([]);
  });

  it('of honest normal fixes few are left out (0.1 % lies beyond the limit; at most 2 % over 20 clouds)', () => {
    const lost = Array.from({ length: 20 }, (_, seed) => given(summariseFixes(cloud(60, 5, seed + 1), rule)).leftOut.length);
    expect(lost.reduce((a, b) => a + b, 0)).toBeLessThanOrEqual(24);
  });

  it('a receiver that repeats one place and then steps 2 m keeps all its fixes', () => {
    const fixes = [...Array.from({ length: 20 }, () => fixAt(0, 0)), fixAt(2, 0), fixAt(2, 0)];
    expect(given(summariseFixes(fixes, rule)).leftOut).toEqual([]);
  });

  it('fixes that are none are named, never used', () => {
    const summary = given(summariseFixes([fixAt(0, 0), { ...fixAt(0, 0), lat: NaN }, { ...fixAt(0, 0), accuracyM: -1 }, { ...fixAt(0, 0), lon: 200 }], rule));
    expect(summary.leftOut).toEqual([1, 2, 3].map((index) => ({ index, why: 'not-a-fix', distanceM: null })));
    expect(summary.used).toBe(1);
  });
});

describe('honest precision', () => {
  it('raw accuracy keeps its unknown coverage; the radius to judge by is 1.7308 times it', () => {
    const summary = given(summariseFixes(cloud(60, 1, 2, { accuracyM: 8 }), rule));
    expect(summary.rawCoverage).toBe('unknown');
    expect(summary.rawAccuracyM).toBe(8);
    expect(summary.r95IfSixtyEightM).toBeCloseTo(8 * 1.6215, 3);
    expect(summary.r95M).toBeCloseTo(8 * 1.7308, 3);
  });

  it('a scatter larger than the receiver claims decides', () => {
    const summary = given(summariseFixes(cloud(80, 9, 4, { accuracyM: 3 }), rule));
    expect(summary.r95M).toBe(summary.scatter!.r95M);
    expect(summary.r95M).toBeGreaterThan(3 * 1.7308);
  });

  it('ten times as many fixes do not shrink the radius', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 1e6 }), fc.double({ min: 3, max: 40, noNaN: true }), (seed, accuracyM) => {
      const few = given(summariseFixes(cloud(12, 2, seed, { accuracyM }), rule));
      const many = given(summariseFixes(cloud(120, 2, seed, { accuracyM }), rule));
      expect(many.r95M).toBeGreaterThanOrEqual(1.7308 * accuracyM * 0.99999);
      expect(few.r95M).toBeGreaterThanOrEqual(1.7308 * accuracyM * 0.99999);
    }), { numRuns: 20, seed: 7 });
  });

  it('one fix has no scatter', () => {
    expect(given(summariseFixes([fixAt(0, 0)], rule)).scatter).toBeNull();
  });
});

describe('the plane for places close together', () => {
  it('has the lengths of geodesics to 1e-5 m within 1 km up to 70 degrees, across the 180th meridian too', () => {
    for (const lat of [0, -33, 61.5, 70]) for (const lon of [25, 180, -180]) for (const azimuth of [0, 37, 90, 211]) {
      const near = toPlaneNearby({ lat, lon }, given(geodesicFrom({ lat, lon }, azimuth, 1000)));
      expect(Math.abs(Math.hypot(near.eastM, near.northM) - 1000)).toBeLessThan(1e-5);
    }
  });

  it('turns a place 100 m off aside by less than 2 mm at 61.5 degrees', () => {
    for (const azimuth of [0, 37, 90, 211]) {
      const place = given(geodesicFrom(centre, azimuth, 100));
      const [near, exact] = [toPlaneNearby(centre, place), toPlane(centre, place)];
      expect(Math.hypot(near.eastM - exact.eastM, near.northM - exact.northM)).toBeLessThan(2e-3);
    }
  });
});

describe('staleness, count, refusals', () => {
  it('a newest fix of 10 s is fresh, of 10.001 s stale; nine fixes are too few, ten are not', () => {
    expect(given(summariseFixes(cloud(9, 1, 1, { atMs: 90_000 }), rule))).toMatchObject({ stale: false, newestAgeS: 10, tooFew: true });
    expect(given(summariseFixes(cloud(10, 1, 1, { atMs: 89_999 }), rule))).toMatchObject({ stale: true, tooFew: false });
  });

  it('no fixes and no sound fix are told apart', () => {
    expect(summariseFixes([], rule)).toEqual({ kind: 'refused', reason: 'no-fixes' });
    expect(summariseFixes([{ lat: NaN, lon: 0, accuracyM: 5, atMs: 0 }], rule)).toEqual({ kind: 'refused', reason: 'no-sound-fix' });
  });
});

describe("the project's rule", () => {
  const projectRule = { maximumR95M: 15, waitingTimeS: 600 };
  const good = given(summariseFixes(cloud(30, 2, 1, { accuracyM: 5, atMs: 99_000 }), rule));
  const poor = given(summariseFixes(cloud(30, 2, 1, { accuracyM: 40, atMs: 99_000 }), rule));

  it('is met by 5 m fixes (95 % radius 8.7 m against 15 m), without a flag', () => {
    expect(judgePosition(good, projectRule, 0)).toEqual({ verdict: 'met', shortfalls: [], flagged: false, needsReason: false, remainingS: 0 });
  });

  it('is not met by 40 m fixes before the waiting time: a reason is needed', () => {
    expect(judgePosition(poor, projectRule, 599)).toEqual({ verdict: 'not-met', shortfalls: ['radius-too-large'], flagged: true, needsReason: true, remainingS: 1 });
  });

  it('after the waiting time the app accepts by itself and the flag stays', () => {
    expect(judgePosition(poor, projectRule, 600)).toEqual({ verdict: 'accepted-by-waiting', shortfalls: ['radius-too-large'], flagged: true, needsReason: false, remainingS: 0 });
  });

  it('every shortfall is named', () => {
    const bad = given(summariseFixes(cloud(5, 2, 1, { accuracyM: 40, atMs: 10_000 }), rule));
    expect(judgePosition(bad, projectRule, 0).shortfalls).toEqual(['radius-too-large', 'too-few-fixes', 'stale']);
  });

  it('without any position waiting accepts nothing', () => {
    expect(judgePosition(null, projectRule, 9999)).toEqual({ verdict: 'not-met', shortfalls: ['no-position'], flagged: true, needsReason: true, remainingS: 0 });
  });
});
