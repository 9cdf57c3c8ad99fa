import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { basalArea, combinedDiameter } from '@/lib/trees/basal-area';
import { dominantHeight } from '@/lib/trees/dominant-height';
import { formFactorVolume } from '@/lib/trees/form-factor-volume';
import { standDensityIndex, summedDensityIndex } from '@/lib/trees/stand-density';
import { standTable } from '@/lib/trees/stand-tables';
import { given } from '../../support/given';

const plot = ([[12.4, 11], [15.1, 13.2], [18, 15], [18.6, 15.6], [21.3, 17.1], [22.7, 17.8], [24.9, 18.9], [26.2, 19.3], [28.8, 20.2], [31.5, 21.4], [33, 21.7], [37.4, 23]] as const)
  .map(([dbhCm, heightM]) => ({ dbhCm, heightM, expansionPerHa: 25 }));

// S7, S8: recomputed in double precision in the trade's list of standards.
describe('S7: a plot of 0.04 ha with twelve stems', () => {
  const table = given(standTable(plot));

  it('300 stems and 14.994449 m² per ha', () => {
    expect(table).toMatchObject({ n: 12, stemsPerHa: 300 });
    expect(table.basalAreaPerHa).toBeCloseTo(14.994449, 6);
  });

  it('diameters: quadratic mean 25.226656 cm, mean 24.158333 cm', () => {
    expect(given(table.quadraticMeanCm).value).toBeCloseTo(25.226656, 6);
    expect(given(table.meanDbhCm).value).toBeCloseTo(24.158333, 6);
  });

  it('heights: mean 17.85 m, Lorey 19.726872 m, dominant (four stems) 21.575 m', () => {
    expect(given(table.meanHeightM).value).toBeCloseTo(17.85, 10);
    expect(given(table.loreyHeightM).value).toBeCloseTo(19.726872, 6);
    expect(given(table.dominantHeightM).value).toBeCloseTo(21.575, 10);
  });

  it('density: index 296.720759, summed 288.991185, relative 2.985387', () => {
    expect(given(table.densityIndex).value).toBeCloseTo(296.720759, 6);
    expect(given(table.summedDensityIndex).value).toBeCloseTo(288.991185, 6);
    expect(given(table.relativeDensity).value).toBeCloseTo(2.985387, 6);
  });

  it('volume with a form factor of 0.45: 133.107106 m³ per ha', () => {
    const volume = plot.reduce((sum, s) => sum + s.expansionPerHa * given(formFactorVolume(s.dbhCm, s.heightM, 0.45)).value, 0);
    expect(volume).toBeCloseTo(133.107106, 6);
  });

  it('the order of the stems changes nothing beyond rounding', () => {
    fc.assert(fc.property(fc.shuffledSubarray(plot, { minLength: plot.length }), (shuffled) => {
      const other = given(standTable(shuffled));
      expect(other.basalAreaPerHa).toBeCloseTo(table.basalAreaPerHa, 10);
      expect(given(other.dominantHeightM).value).toBeCloseTo(21.575, 10);
    }), { numRuns: 30, seed: 2 });
  });
});

describe('S8: stand density index (Reineke 1933)', () => {
  it('800 per ha of 22 cm: 635.214312; 400 per acre of 8 in: 279.588575', () => {
    expect(given(standDensityIndex(800, 22, 'metric')).value).toBeCloseTo(635.214312, 6);
    expect(given(standDensityIndex(400, 8, 'us')).value).toBeCloseTo(279.588575, 6);
  });

  it('in a stand of one diameter both indexes agree', () => {
    expect(given(summedDensityIndex([{ dbhCm: 22, expansionPerHa: 500 }, { dbhCm: 22, expansionPerHa: 300 }])).value).toBeCloseTo(635.214312, 6);
    expect(standDensityIndex(0, 22, 'metric')).toEqual({ kind: 'refused', reason: 'not-positive' });
    expect(summedDensityIndex([])).toEqual({ kind: 'refused', reason: 'not-positive' });
  });
});

describe('dominant height', () => {
  const stem = (dbhCm: number, heightM: number | null, expansionPerHa: number) => ({ dbhCm, heightM, expansionPerHa });

  it('takes of the last stem only the part still missing: 60 of 30 m and 40 of 20 m give 26 m', () => {
    expect(given(dominantHeight([stem(50, 30, 60), stem(40, 20, 60), stem(30, 10, 500)])).value).toBeCloseTo(26, 12);
  });

  it('stems of one diameter at the edge share it: 50 of 30 m and half of 25 and 15 m give 25 m, in either order', () => {
    const tied = [stem(40, 25, 50), stem(40, 15, 50)];
    for (const order of [tied, [...tied].reverse()]) expect(given(dominantHeight([stem(50, 30, 50), ...order])).value).toBeCloseTo(25, 12);
  });

  it('a thin stem without a height does not matter, a thick one without is refused', () => {
    expect(dominantHeight([stem(50, 30, 100), stem(20, null, 100)])).toEqual({ kind: 'value', value: 30 });
    expect(dominantHeight([stem(50, null, 100), stem(20, 12, 100)])).toEqual({ kind: 'refused', reason: 'height-missing' });
  });

  it('fewer than 100 stems per ha have none', () => {
    expect(dominantHeight([stem(50, 30, 75)])).toEqual({ kind: 'refused', reason: 'fewer-than-100-per-ha' });
    expect(dominantHeight([])).toEqual({ kind: 'refused', reason: 'no-stems' });
    expect(dominantHeight([stem(NaN, 30, 75)])).toEqual({ kind: 'refused', reason: 'bad-stem' });
  });

  it('factors that add up to 100 only in exact arithmetic are enough', () => {
    expect(given(dominantHeight(Array.from({ length: 30 }, () => stem(40, 22, 100 / 30)))).value).toBeCloseTo(22, 10);
  });
});

describe('zero and missing are told apart', () => {
  it('a plot without stems has 0 stems and 0 m² and no means', () => {
    const empty = given(standTable([]));
    expect(empty).toMatchObject({ n: 0, stemsPerHa: 0, basalAreaPerHa: 0 });
    for (const key of ['quadraticMeanCm', 'meanDbhCm', 'meanHeightM', 'loreyHeightM', 'dominantHeightM', 'densityIndex', 'summedDensityIndex', 'relativeDensity'] as const) {
      expect(empty[key]).toEqual({ kind: 'refused', reason: 'no-stems' });
    }
  });

  it('a missing height leaves basal area alone and refuses the means of height', () => {
    const table = given(standTable(plot.map((s, i) => (i === 0 ? { ...s, heightM: null } : s))));
    expect(table.basalAreaPerHa).toBeCloseTo(14.994449, 6);
    expect(table.loreyHeightM).toEqual({ kind: 'refused', reason: 'height-missing' });
    expect(given(table.dominantHeightM).value).toBeCloseTo(21.575, 10);
  });

  it('numbers that are no measurement are refused', () => {
    expect(standTable([{ dbhCm: NaN, heightM: 10, expansionPerHa: 25 }])).toEqual({ kind: 'refused', reason: 'bad-stem' });
    expect(standTable([{ dbhCm: 20, heightM: -1, expansionPerHa: 25 }])).toEqual({ kind: 'refused', reason: 'bad-stem' });
  });
});

describe('basal area', () => {
  // Constant 0.0000785398163 and the shoots 4, 3, 5 (FIA Database User Guide 9.3, section 3.1.18)
  it('is 0.0000785398163 d², and shoots of 4, 3 and 5 make 7.0711', () => {
    expect(given(basalArea(100)).value).toBeCloseTo(0.785398163, 9);
    expect(given(combinedDiameter([4, 3, 5])).value).toBeCloseTo(7.0711, 4);
    expect(basalArea(0)).toEqual({ kind: 'refused', reason: 'bad-dbh' });
    expect(combinedDiameter([])).toEqual({ kind: 'refused', reason: 'no-diameters' });
    expect(combinedDiameter([4, -1])).toEqual({ kind: 'refused', reason: 'bad-dbh' });
  });

  // Form factor check V = f g h, recomputed in the trade's list of standards
  it('30 cm, 22 m and 0.45 hold 0.69978976 m³', () => {
    expect(given(formFactorVolume(30, 22, 0.45)).value).toBeCloseTo(0.69978976, 8);
    expect(formFactorVolume(30, 22, 1.2)).toEqual({ kind: 'refused', reason: 'bad-input' });
  });
});
