import { describe, expect, it } from 'vitest';
import { curveForms } from '@/lib/stats/forms/curve-forms';
import { fitHeightCurve } from '@/lib/stats/fit-height-curve';
import type { CurveTree, HeightCurveFit } from '@/lib/stats/fit-height-curve';
import { estateRecords } from '@/seeders/estate-records';
import { estateTruth } from '@/seeders/estate-truth';
import type { GroupTruth } from '@/seeders/estate-groups';
import { peopleIds } from './people-ids';

const seeds = [undefined, 'one', 'two', 'three', 'four', 'five', 'six', 'seven'] as const;

/** Stems of a curve group whose height was measured at the earlier visits, as the office would fit them. */
function measuredTrees(seed: string | undefined, curveGroup: string): CurveTree[] {
  const { design, visits } = estateRecords(peopleIds, seed);
  const species = new Set(design.flatMap((change) =>
    (change.entity === 'speciesEntry' && change.kind === 'create' && change.values.curveGroup === curveGroup ? [change.values.id] : [])));
  return visits.flatMap(({ plotId, changes }) => changes.flatMap((change) => {
    if (change.entity !== 'stemMeasurement' || change.kind !== 'create') return [];
    const { speciesId, dbhCm, heightM } = change.values;
    return speciesId && species.has(speciesId) && dbhCm !== null && heightM !== null ? [{ dCm: dbhCm, hM: heightM, plot: plotId }] : [];
  }));
}

function fit(trees: readonly CurveTree[], tauSquared: number): HeightCurveFit {
  const result = fitHeightCurve({ form: 'curtis', breastHeightM: 1.3, trees, tauSquared });
  if (result.kind === 'refused') throw new Error(result.reason);
  return result;
}

const logHeightAt = ({ b0, b1 }: Pick<HeightCurveFit, 'b0' | 'b1'>, dCm: number) => b0 + b1 * curveForms.curtis(dCm);
function standardErrorAt({ xtxInverse: [c00, c01, c11], residualVariance }: HeightCurveFit, dCm: number): number {
  const x = curveForms.curtis(dCm);
  return Math.sqrt(residualVariance * (c00 + 2 * x * c01 + x * x * c11));
}

const truth = estateTruth();
const cases = truth.groups.map((group) => ({
  group,
  runs: seeds.map((seed) => {
    const trees = measuredTrees(seed, group.curveGroup);
    // The estimate is linear in ln(h − bh): mirror every error at the true curve, and the mean of both fits is the fit without errors.
    const fitted = fit(trees, truth.tauSquared);
    const mirrored = fit(trees.map(({ dCm, hM, plot }) => ({ dCm, plot, hM: 1.3 + (group.medianHeightM(dCm) - 1.3) ** 2 / (hM - 1.3) })), truth.tauSquared);
    const exact = { b0: (fitted.b0 + mirrored.b0) / 2, b1: (fitted.b1 + mirrored.b1) / 2 };
    return { fitted, exact };
  }),
}));
const named = cases.map((entry) => [entry.group.curveGroup, entry] as const);

describe('the curves fitted to the earlier visits recover the truth', () => {
  it.each(named.filter(([, { group }]) => group.curtis))('%s: without errors the fit returns the coefficients of the truth', (_, { group, runs }) => {
    for (const { exact } of runs) {
      expect(exact.b0 / group.curtis!.b0).toBeCloseTo(1, 9);
      expect(exact.b1 / group.curtis!.b1).toBeCloseTo(1, 9);
    }
  });

  it.each(named)('%s: every fit lies within four of its own standard errors at 18, 27 and 40 cm', (_, { runs }) => {
    for (const { fitted, exact } of runs) {
      for (const dCm of [18, 27, 40]) {
        expect(Math.abs(logHeightAt(fitted, dCm) - logHeightAt(exact, dCm)) / standardErrorAt(fitted, dCm)).toBeLessThan(4);
      }
    }
  });

  // The sum of eight squared standardised errors is χ² with 8 df; its 0.0005 and 0.9995 quantiles are 0.710 and 27.87 (χ² table).
  it.each(named)('%s: over the seeds the errors are as large as the standard errors say, neither more nor less', (_, { runs }) => {
    const sum = runs.reduce((total, { fitted, exact }) => total + ((logHeightAt(fitted, 27) - logHeightAt(exact, 27)) / standardErrorAt(fitted, 27)) ** 2, 0);
    expect(sum).toBeGreaterThan(0.71);
    expect(sum).toBeLessThan(27.87);
  });

  it.each(named)('%s: the residual variance is sigma² within four standard errors, √(2/df) each', (_, { runs }) => {
    for (const { fitted } of runs) {
      expect(Math.abs(fitted.residualVariance / truth.sigma ** 2 - 1)).toBeLessThan(4 * Math.sqrt(2 / fitted.residualDf));
    }
  });

  it.each(named)('%s: the form fits the truth closer than half a sigma from 15 to 50 cm, so that alarms come from slips and not from the form', (_, { group, runs }) => {
    for (const { exact } of runs) {
      for (let dCm = 15; dCm <= 50; dCm += 5) {
        expect(Math.abs(logHeightAt(exact, dCm) - Math.log(group.medianHeightM(dCm) - 1.3))).toBeLessThan(truth.sigma / 2);
      }
    }
  });
});

describe('the truth that tests read', () => {
  it('plot effects have mean 0 and variance tauSquared·sigma² over the plots of all seeds', () => {
    const effects = seeds.flatMap((seed) => estateTruth(seed).plots.map(({ effect }) => effect));
    const n = effects.length;
    const expected = truth.tauSquared * truth.sigma ** 2;
    const mean = effects.reduce((sum, effect) => sum + effect, 0) / n;
    const variance = effects.reduce((sum, effect) => sum + (effect - mean) ** 2, 0) / (n - 1);
    // Four standard errors of a normal mean and variance.
    expect(Math.abs(mean)).toBeLessThan(4 * Math.sqrt(expected / n));
    expect(Math.abs(variance / expected - 1)).toBeLessThan(4 * Math.sqrt(2 / (n - 1)));
  });

  it.each(truth.groups.map((group): [string, GroupTruth] => [group.curveGroup, group]))('%s: heights of whole stems are the curve, the plot’s effect and the stem’s own', (_, group) => {
    for (const { effect, trees } of truth.plots) {
      for (const tree of trees) {
        if (tree.curveGroup !== group.curveGroup || tree.form === 'broken') continue;
        for (const { dbhCm, heightM, residual } of tree.stems) {
          expect(Math.log(heightM - 1.3)).toBeCloseTo(Math.log(group.medianHeightM(dbhCm) - 1.3) + effect + residual, 10);
        }
      }
    }
  });
});
