import { describe, expect, it } from 'vitest';
import { createScreen } from '@/lib/checks/screen';
import type { ProjectUnits, Screen } from '@/lib/checks/types';
import { seededRandom } from '@/seeders/seeded-random';
import { curtisStand } from '../../support/curtis-stand';
import { cherryCurve, makeStem, metric, us } from '../../support/stems';

const defaults = { tauSquared: 0.5, curveForm: 'curtis' } as const;
type Tree = { readonly dbh: string; readonly height: string; readonly plot: string };

/** Looks among correct trees, each taught as an honest crew would leave it: measured again where asked. */
function looksAt(screen: Screen, units: ProjectUnits, trees: readonly Tree[]): number {
  return trees.filter(({ dbh, height, plot }, i) => {
    const stem = makeStem(units, dbh, height, { id: `tree ${i}`, plotId: plot });
    const asked = screen.screen(stem).some(({ level }) => level === 'look');
    screen.teach(stem, asked ? 'measured-twice' : 'undoubted');
    return asked;
  }).length;
}

/** 99 % binomial interval of a count; normal approximation (Brown, Cai and DasGupta 2001, Statist. Sci. 16:101). */
function interval(n: number, rate: number): readonly [number, number] {
  const reach = 2.576 * Math.sqrt(n * rate * (1 - rate));
  return [n * rate - reach, n * rate + reach];
}

const metricTrees = (seed: string, n: number) => curtisStand(seed, n).map(({ dCm, hM, plot }): Tree => ({ dbh: dCm.toFixed(1), height: hM.toFixed(1), plot }));

/** Trees of the black cherry curve: its diameters, its spread divided into plots (τ² = 0.5) and trees, typed in inches and feet. */
function cherryTrees(n: number): Tree[] {
  const random = seededRandom('cherry');
  const sigma = Math.sqrt(cherryCurve.residualVariance / 1.5);
  let effect = 0;
  return Array.from({ length: n }, (_, i) => {
    if (i % 12 === 0) effect = sigma * Math.sqrt(0.5) * random.normal();
    const dCm = Math.exp(cherryCurve.logDMean + cherryCurve.logDSd * random.normal());
    const hM = 1.3716 + Math.exp(cherryCurve.b0 + cherryCurve.b1 * Math.log(dCm / (1 + dCm)) + effect + sigma * random.normal());
    return { dbh: (dCm / 2.54).toFixed(1), height: (hM / 0.3048).toFixed(0), plot: `plot ${Math.floor(i / 12)}` };
  });
}

describe('false second looks among correct trees, all rules together', () => {
  it('a project on the black cherry curve: 1 per 100 as stated, within the 99 % interval (n = 5000)', () => {
    const looks = looksAt(createScreen({ ...defaults, alarmRatePer100: 1, units: us, curves: [cherryCurve] }), us, cherryTrees(5000));
    const [low, high] = interval(5000, 0.01);
    expect(looks).toBeGreaterThan(low);
    expect(looks).toBeLessThan(high);
  });

  it('a project that states 5 per 100 gets about 5, within the 99 % interval (n = 5000)', () => {
    const looks = looksAt(createScreen({ ...defaults, alarmRatePer100: 5, units: us, curves: [cherryCurve] }), us, cherryTrees(5000));
    const [low, high] = interval(5000, 0.05);
    expect(looks).toBeGreaterThan(low);
    expect(looks).toBeLessThan(high);
  });

  it('a project that starts without any curve never asks more often than stated, from its first 300 trees on', () => {
    const fresh = Array.from({ length: 15 }, (_, i) => looksAt(createScreen({ ...defaults, alarmRatePer100: 1, units: metric, curves: [] }), metric, metricTrees(`fresh ${i}`, 300)));
    expect(fresh.reduce((sum, looks) => sum + looks, 0)).toBeLessThan(interval(15 * 300, 0.01)[1]);
  });
});
