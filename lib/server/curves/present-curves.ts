import 'server-only';
import type { CurveForm, HeightCurve } from '@/lib/schema/design';
import { heightCurveSchema } from '@/lib/schema/design';
import { curveForms } from '@/lib/stats/forms/curve-forms';
import type { HeightCurveFit, HeightCurveRefusal } from '@/lib/stats/fit-height-curve';
import { openDatabase } from '@/models';
import { fitCurves } from './fit-curves';

/** A tree as the pictures of a fit need it: d in cm, h in m, the fitted ln(h − bh) and the residual on that scale. */
export type CurvePoint = { readonly dCm: number; readonly hM: number; readonly fitted: number; readonly residual: number };
export type PresentedFit = (HeightCurveFit & { readonly points: readonly CurvePoint[]; readonly line: readonly { readonly dCm: number; readonly hM: number }[] }) | HeightCurveRefusal;
export type PresentedGroup = { readonly curveGroup: string; readonly n: number; readonly fits: Readonly<Record<CurveForm, PresentedFit>> };
export type CurvesOfProject = { readonly groups: readonly PresentedGroup[]; readonly published: readonly HeightCurve[] };

/** Most points a picture gets; more would only blacken it. */
const MOST_POINTS = 2000;
const LINE_STEPS = 60;

function present(fit: HeightCurveFit | HeightCurveRefusal, trees: readonly { readonly dCm: number; readonly hM: number }[]): PresentedFit {
  if (fit.kind !== 'fit') return fit;
  const x = curveForms[fit.form];
  const expected = (dCm: number) => fit.b0 + fit.b1 * x(dCm);
  const step = Math.max(1, Math.ceil(trees.length / MOST_POINTS));
  return {
    ...fit,
    points: trees.filter((_, i) => i % step === 0).map(({ dCm, hM }) => ({ dCm, hM, fitted: expected(dCm), residual: Math.log(hM - fit.breastHeightM) - expected(dCm) })),
    line: Array.from({ length: LINE_STEPS + 1 }, (_, i) => {
      const dCm = fit.dMinCm + ((fit.dMaxCm - fit.dMinCm) * i) / LINE_STEPS;
      return { dCm, hM: fit.breastHeightM + Math.exp(expected(dCm)) };
    }),
  };
}

/** The fits of every curve form by group as the data now stand, and the curves published so far, newest first. */
export async function curvesOfProject(projectId: string): Promise<CurvesOfProject> {
  const { models } = await openDatabase();
  const rows = await models.HeightCurve.findAll({ where: { projectId, deleted: false } });
  const published = rows.map((row) => heightCurveSchema.parse(row.get({ plain: true }))).sort((a, b) => a.curveGroup.localeCompare(b.curveGroup) || b.version - a.version);
  const groups = (await fitCurves(projectId)).map(({ curveGroup, trees, fits }): PresentedGroup => ({
    curveGroup, n: trees.length,
    fits: Object.fromEntries(Object.entries(fits).map(([form, fit]) => [form, present(fit, trees)])) as Record<CurveForm, PresentedFit>,
  }));
  return { groups, published };
}
