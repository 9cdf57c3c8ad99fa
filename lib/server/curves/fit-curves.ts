import 'server-only';
import { curveFormSchema } from '@/lib/schema/design';
import type { CurveForm } from '@/lib/schema/design';
import { fitHeightCurve } from '@/lib/stats/fit-height-curve';
import type { HeightCurveFit, HeightCurveRefusal } from '@/lib/stats/fit-height-curve';
import { openDatabase } from '@/models';
import { collectCurveTrees } from './collect-curve-trees';
import type { CurveSourceTree } from './collect-curve-trees';

/** All groups of a project together. */
export const POOLED = '*';

export type GroupFits = {
  readonly curveGroup: string;
  readonly trees: readonly CurveSourceTree[];
  readonly fits: Readonly<Record<CurveForm, HeightCurveFit | HeightCurveRefusal>>;
};

/**
 * Fits every curve form to every curve group of a project, and to all groups pooled. Plot effects are used where every tree
 * of the group has a plot. Groups without trees are left out.
 * Errors: throws where there is no such project.
 */
export async function fitCurves(projectId: string): Promise<readonly GroupFits[]> {
  const { models } = await openDatabase();
  const project = await models.Project.findByPk(projectId);
  if (!project) throw new Error('There is no such project.');
  const { breastHeightM, tauSquared } = project;
  const trees = await collectCurveTrees(projectId);
  const groups = [...new Set(trees.map(({ group }) => group))].sort((a, b) => a.localeCompare(b));
  return [...groups, POOLED].map((curveGroup) => {
    const mine = curveGroup === POOLED ? trees : trees.filter(({ group }) => group === curveGroup);
    const fit = (form: CurveForm) => fitHeightCurve({ form, breastHeightM, tauSquared, trees: mine });
    return { curveGroup, trees: mine, fits: Object.fromEntries(curveFormSchema.options.map((form) => [form, fit(form)])) as GroupFits['fits'] };
  }).filter(({ trees: mine }) => mine.length > 0);
}
