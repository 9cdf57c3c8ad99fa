import 'server-only';
import { v7 } from 'uuid';
import { heightCurveSchema } from '@/lib/schema/design';
import type { CurveForm, HeightCurve } from '@/lib/schema/design';
import { openDatabase } from '@/models';
import { recordChanges } from '../log/record-changes';
import { write } from '../write-queue';
import { fitCurves } from './fit-curves';
import type { GroupFits } from './fit-curves';

export type PublishedCurve = { readonly id: string; readonly curveGroup: string; readonly form: CurveForm; readonly version: number; readonly n: number };

function sourceWords({ trees }: GroupFits): string {
  const references = trees.filter(({ from }) => from === 'reference').length;
  const visited = trees.length - references;
  return [references > 0 ? `${references} reference trees` : '', visited > 0 ? `${visited} trees of earlier visits` : ''].filter(Boolean).join(', ');
}

/**
 * Fits the project's height curves and publishes the next version of each, through the change log, so that they travel in work
 * packs and pulls. Groups with too few trees are left out.
 *
 * @param form the curve form; the project's own where none is given
 * @param groups curve groups to publish ('*' is all pooled); all where none are given
 * @returns what was published, in the order of the groups
 */
export async function fitAndPublishCurves({ projectId, authorId, form, groups }: {
  readonly projectId: string; readonly authorId: string; readonly form?: CurveForm; readonly groups?: readonly string[];
}): Promise<readonly PublishedCurve[]> {
  const { models } = await openDatabase();
  const project = await models.Project.findByPk(projectId);
  if (!project) throw new Error('There is no such project.');
  const chosen = form ?? project.curveForm;
  const fitted = (await fitCurves(projectId)).filter(({ curveGroup }) => groups === undefined || groups.includes(curveGroup));
  return write(async (context) => {
    const known = await context.models.HeightCurve.findAll({ where: { projectId }, transaction: context.transaction });
    const curves = fitted.flatMap((group): HeightCurve[] => {
      const fit = group.fits[chosen];
      if (fit.kind !== 'fit') return [];
      const { kind: _kind, xtxInverse, ...numbers } = fit;
      const version = 1 + Math.max(0, ...known.filter(({ curveGroup }) => curveGroup === group.curveGroup).map((curve) => curve.version));
      return [heightCurveSchema.parse({
        ...numbers, xtxInverse: [...xtxInverse], id: v7(), projectId, deleted: false, curveGroup: group.curveGroup, version,
        source: sourceWords(group), publishedAt: new Date().toISOString(),
      })];
    });
    if (curves.length > 0) {
      await recordChanges(context, curves.map((values) => ({ entity: 'heightCurve', recordId: values.id, kind: 'create', values })), { projectId, authorId, reason: 'curves published' });
    }
    return curves.map(({ id, curveGroup, form: published, version, n }) => ({ id, curveGroup, form: published, version, n }));
  });
}
