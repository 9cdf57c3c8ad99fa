import { describe, expect, it } from 'vitest';
import { circleParts, mirageTally, walkthroughTally } from '@/lib/trees/boundary-overlap';
import { given } from '../../support/given';

// G11, G12: methods of Ducey, Gove and Valentine 2004 and Gregoire 1982; values recomputed in the trade's list of standards.
describe('G11: walkthrough', () => {
  it('a tree at 7 m of 10 m ends at 14 m, outside: twice; at 4 m it ends at 8 m: once', () => {
    expect(given(walkthroughTally(7, 10)).times).toBe(2);
    expect(given(walkthroughTally(4, 10)).times).toBe(1);
  });

  it('ending on the edge is not outside, and without an edge on the ray it counts once', () => {
    expect(given(walkthroughTally(5, 10)).times).toBe(1);
    expect(given(walkthroughTally(11, null)).times).toBe(1);
  });

  it('a tree beyond the edge is refused, as are lengths that are none', () => {
    expect(walkthroughTally(11, 10)).toEqual({ kind: 'refused', reason: 'tree-outside' });
    expect(walkthroughTally(0, 10)).toEqual({ kind: 'refused', reason: 'bad-distance' });
    expect(walkthroughTally(4, NaN)).toEqual({ kind: 'refused', reason: 'bad-distance' });
  });
});

describe('mirage', () => {
  const edge = { distanceM: 6, azimuthDeg: 90 };

  it.each([[5, 90, 2], [0.8, 90, 2], [0.7, 90, 1], [5, 270, 1], [9, 0, 1], [9, 40, 2]])('a tree at %d m, %d degrees of a circle of 11.28 m with an edge 6 m east counts %d', (distanceM, azimuthDeg, times) => {
    // By hand: the reflected centre lies 12 m east; the distances to it are 7, 11.2, 11.3, 17, 15 and 9.27 m.
    expect(given(mirageTally({ distanceM, azimuthDeg }, 11.28, edge)).times).toBe(times);
  });

  it('a tree beyond its limit or beyond the edge is refused', () => {
    expect(mirageTally({ distanceM: 12, azimuthDeg: 0 }, 11.28, edge)).toEqual({ kind: 'refused', reason: 'not-in' });
    expect(mirageTally({ distanceM: 8, azimuthDeg: 90 }, 11.28, edge)).toEqual({ kind: 'refused', reason: 'tree-outside' });
  });

  it.each(['mirage', 'walkthrough'] as const)('%s: the strip along a straight edge is estimated without bias (within 3 standard errors)', (method) => {
    // Stems at random in a tract 0 < x < 60 m, plots of 11.28 m at random in it; the edges in y are far off.
    let state = 5;
    const uniform = () => { state = (Math.imul(state, 1664525) + 1013904223) >>> 0; return state / 2 ** 32; };
    const r = 11.28;
    const estimates = Array.from({ length: 6000 }, () => {
      const plotX = 60 * uniform();
      let tally = 0;
      // 6 stems in a window that covers every plot: x over the tract, y within the radius
      for (let i = 0; i < 6; i += 1) {
        const x = 60 * uniform(), y = 2 * r * uniform() - r;
        const distance = Math.hypot(x - plotX, y);
        if (distance > r) continue;
        if (method === 'walkthrough') {
          // Distance to the edge along the ray: west edge x = 0 or east edge x = 60
          const along = x === plotX ? null : ((x < plotX ? plotX : 60 - plotX) * distance) / Math.abs(x - plotX);
          tally += given(walkthroughTally(distance, along)).times;
        } else {
          const azimuthDeg = (Math.atan2(x - plotX, y) * 180) / Math.PI;
          const near = plotX < 30 ? { distanceM: plotX, azimuthDeg: 270 } : { distanceM: 60 - plotX, azimuthDeg: 90 };
          tally += given(mirageTally({ distanceM: distance, azimuthDeg }, r, near)).times;
        }
      }
      return tally;
    });
    const mean = estimates.reduce((a, b) => a + b, 0) / estimates.length;
    const se = Math.sqrt(estimates.reduce((s, v) => s + (v - mean) ** 2, 0) / (estimates.length - 1) / estimates.length);
    const expected = (6 * Math.PI * r * r) / (60 * 2 * r);
    expect(Math.abs(mean - expected)).toBeLessThan(3 * se);
  });
});

describe('G12: a circle cut by a straight edge', () => {
  it('400 m² with an edge 6 m off: 71.27778 m² outside, 328.72222 m² inside, 82.1806 %', () => {
    const parts = given(circleParts(Math.sqrt(400 / Math.PI), 6));
    expect(parts.outsideM2).toBeCloseTo(71.27778, 5);
    expect(parts.insideM2).toBeCloseTo(328.72222, 5);
    expect(parts.insideShare * 100).toBeCloseTo(82.1806, 4);
  });

  it('an edge through the centre halves the plot, one beyond the radius cuts nothing', () => {
    expect(given(circleParts(10, 0)).insideShare).toBeCloseTo(0.5, 12);
    expect(given(circleParts(10, 12))).toMatchObject({ outsideM2: 0, insideShare: 1 });
    expect(circleParts(10, -1)).toEqual({ kind: 'refused', reason: 'bad-distance' });
  });
});
