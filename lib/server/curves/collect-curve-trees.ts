import 'server-only';
import { Op } from 'sequelize';
import { openDatabase } from '@/models';

/** One measured height that a curve may rest on. `plot` tells plots apart; null where the tree came without one. */
export type CurveSourceTree = {
  readonly id: string;
  readonly group: string;
  readonly dCm: number;
  readonly hM: number;
  readonly plot: string | null;
  readonly from: 'reference' | 'visit';
};

/**
 * The trees for a project's height curves: imported reference trees, and measured heights of live, whole stems from finished
 * production visits, without an open doubt, each plot visit being a plot of its own. d in cm, h in m.
 */
export async function collectCurveTrees(projectId: string): Promise<readonly CurveSourceTree[]> {
  const { models } = await openDatabase();
  const alive = { projectId, deleted: false };
  const [species, references, visits, looks] = await Promise.all([
    models.SpeciesEntry.findAll({ where: alive }),
    models.ReferenceTree.findAll({ where: { projectId } }),
    models.Visit.findAll({ where: { ...alive, kind: 'production', state: ['finished', 'signedOff'] } }),
    models.SecondLook.findAll({ where: { ...alive, level: 'look', answer: 'open' }, attributes: ['measurementId'] }),
  ]);
  const groups = new Map(species.map(({ id, curveGroup }) => [id, curveGroup]));
  const doubted = new Set(looks.map(({ measurementId }) => measurementId));
  const finished = new Set(visits.map(({ id }) => id));
  const measured = await models.StemMeasurement.findAll({
    where: { ...alive, status: 'live', form: 'whole', heightMethod: 'measured', dbhCm: { [Op.gt]: 0 }, heightM: { [Op.gt]: 0 } },
  });
  const byGroup = (speciesId: string | null): string | null => (speciesId === null ? null : groups.get(speciesId) ?? null);
  return [
    ...references.flatMap(({ id, speciesId, dbhCm, heightM, plotLabel }): CurveSourceTree[] => {
      const group = byGroup(speciesId);
      return group === null ? [] : [{ id, group, dCm: dbhCm, hM: heightM, plot: plotLabel === null ? null : `reference ${plotLabel}`, from: 'reference' }];
    }),
    ...measured.flatMap(({ id, visitId, speciesId, dbhCm, heightM }): CurveSourceTree[] => {
      const group = byGroup(speciesId);
      if (group === null || dbhCm === null || heightM === null || !finished.has(visitId) || doubted.has(id)) return [];
      return [{ id, group, dCm: dbhCm, hM: heightM, plot: visitId, from: 'visit' }];
    }),
  ];
}
