import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createScreen } from '@/lib/checks/screen';
import type { Screen, StemEntry, Teaching } from '@/lib/checks/types';
import { fitHeightCurve } from '@/lib/stats/fit-height-curve';
import { curtisStand } from '../../support/curtis-stand';
import { relativeError } from '../../support/relative-error';
import { makeCurve, makeStem, metric } from '../../support/stems';

const curve = makeCurve(fitHeightCurve({ form: 'curtis', breastHeightM: 1.3, tauSquared: 0.5, trees: curtisStand('the curve', 400) }));
const stand = () => createScreen({ alarmRatePer100: 1, tauSquared: 0.5, curveForm: 'curtis', units: metric, curves: [curve] });

const stem = fc.record({
  dbhCm: fc.integer({ min: 80, max: 700 }).map((tenths) => tenths / 10),
  heightM: fc.integer({ min: 20, max: 450 }).map((tenths) => tenths / 10),
  plotId: fc.constantFrom('a', 'b', 'c'),
  speciesId: fc.constantFrom('oak', 'ash'),
  curveGroup: fc.constantFrom('group', 'another'),
});
const entry = (over: Partial<StemEntry>, id: string): StemEntry => makeStem(metric, String(over.dbhCm), String(over.heightM), { ...over, id });
const teaching = fc.constantFrom<Teaching>('undoubted', 'measured-twice', 'accepted', 'open', 'none');

/** All numbers that a Screen shows: limits of bands and of diameters. */
function shown(screen: Screen): number[] {
  return ['a', 'b', 'new'].flatMap((plotId) => ['group', 'another'].flatMap((curveGroup) => {
    const band = screen.band(makeStem(metric, '30', null, { id: 'asked', plotId, curveGroup }), 0.99);
    const doubts = ['oak', 'ash'].flatMap((speciesId) => screen.screen(makeStem(metric, '450', null, { id: 'asked', plotId, curveGroup, speciesId })));
    return [...(band.kind === 'band' ? [band.lowM, band.medianM, band.highM] : []), ...doubts.flatMap(({ expectedLow, expectedHigh }) => [expectedLow ?? 0, expectedHigh ?? 0])];
  }));
}
function expectSame(a: Screen, b: Screen, within: number): void {
  const [p, q] = [shown(a), shown(b)];
  expect(p).toHaveLength(q.length);
  expect(Math.max(...p.map((value, i) => relativeError(value, q[i]!)))).toBeLessThan(within);
}

describe('what a project’s checks learn from its stems', () => {
  it('teaching a stem and forgetting it restores every band to 1e-12', () => {
    fc.assert(fc.property(fc.array(fc.tuple(stem, teaching), { minLength: 1, maxLength: 30 }), stem, teaching, (stems, other, how) => {
      const [one, two] = [stand(), stand()];
      for (const screen of [one, two]) stems.forEach(([over, as], i) => screen.teach(entry(over, String(i)), as));
      one.teach(entry(other, 'other'), how);
      one.forget('other');
      expectSame(one, two, 1e-12);
    }), { seed: 20260701, numRuns: 60 });
  });

  it('stems measured twice teach the same in every order (1e-12)', () => {
    fc.assert(fc.property(fc.array(stem, { minLength: 2, maxLength: 30 }), (stems) => {
      const [one, two] = [stand(), stand()];
      const entries = stems.map((over, i) => entry(over, String(i)));
      for (const each of entries) one.teach(each, 'measured-twice');
      for (const each of [...entries].reverse()) two.teach(each, 'measured-twice');
      expectSame(one, two, 1e-12);
    }), { seed: 20260702, numRuns: 60 });
  });

  it('teaching a stem again, changed, is forgetting it and teaching the other; also across species, groups and plots', () => {
    fc.assert(fc.property(fc.array(stem, { minLength: 1, maxLength: 20 }), stem, stem, teaching, teaching, (stems, first, then, as, later) => {
      const [one, two] = [stand(), stand()];
      for (const screen of [one, two]) stems.forEach((over, i) => screen.teach(entry(over, String(i)), 'measured-twice'));
      one.teach(entry(first, 'other'), as);
      one.teach(entry(then, 'other'), later);
      two.teach(entry(then, 'other'), later);
      expectSame(one, two, 1e-12);
    }), { seed: 20260703, numRuns: 60 });
  });
});

describe('a stem accepted without measuring', () => {
  const median = (screen: Screen) => {
    const band = screen.band(makeStem(metric, '30', null, { id: 'asked' }), 0.99);
    return band.kind === 'band' ? band.medianM : Number.NaN;
  };
  const taught = (heightM: number, how: Teaching) => {
    const screen = stand();
    screen.teach(entry({ dbhCm: 30, heightM }, 'other'), how);
    return median(screen);
  };
  const start = median(stand());
  /** Spread of ln(h − bh) at 30 cm, from the band at the level of one standard deviation of a normal distribution. */
  const spread = (() => {
    const band = stand().band(makeStem(metric, '30', null), 0.6827);
    return band.kind === 'band' ? Math.log((band.highM - 1.3) / (band.medianM - 1.3)) : Number.NaN;
  })();
  const at = (residuals: number) => 1.3 + (start - 1.3) * Math.exp(residuals * spread);

  it('teaches nothing of its height beyond 4.685 standardised residuals (Tukey’s bisquare), where one measured twice still moves the band', () => {
    expect(taught(at(5), 'accepted')).toBe(start);
    expect(taught(at(5), 'measured-twice')).toBeGreaterThan(start * 1.005);
  });

  it('teaches in full in the middle and less the further out it lies', () => {
    const share = (residuals: number) => (taught(at(residuals), 'accepted') - start) / (taught(at(residuals), 'measured-twice') - start);
    expect(share(0.1)).toBeGreaterThan(0.99);
    expect(share(4)).toBeLessThan(share(3));
    expect(share(3)).toBeLessThan(share(1));
    expect(share(4)).toBeGreaterThan(0);
  });
});

describe('a long season', () => {
  it('30,000 stems later a check still takes less than a millisecond, also of the thickest tree', () => {
    const screen = stand();
    curtisStand('season', 30_000).forEach(({ dCm, hM, plot }, i) => screen.teach(entry({ dbhCm: dCm, heightM: hM, plotId: plot }, `tree ${i}`), 'measured-twice'));
    const thickest = entry({ dbhCm: 120, heightM: 27 }, 'thickest');
    screen.teach(thickest, 'measured-twice');
    const from = performance.now();
    for (let i = 0; i < 500; i++) {
      screen.screen(thickest);
      screen.band(thickest, 0.99);
    }
    expect((performance.now() - from) / 1000).toBeLessThan(1);
  });
});
