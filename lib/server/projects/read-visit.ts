import 'server-only';
import type { Reading, SecondLook, StemMeasurement } from '@/lib/schema/field';
import { openDatabase } from '@/models';
import { Problem } from '../errors';
import { recheckVisit } from '../second-looks/recheck-visit';
import type { Recheck } from '../second-looks/recheck-visit';
import { listVisits } from './list-visits';
import type { ListedVisit } from './list-visits';

export type VisitStem = {
  readonly tag: string; readonly stem: string; readonly species: string | null;
  readonly measurement: StemMeasurement;
  readonly readings: readonly (Reading & { readonly measurer: string | null; readonly recorder: string | null })[];
  readonly looks: readonly (SecondLook & { readonly answeredBy: string | null })[];
  /** What the server's own screening says of the stem beside what the device said. */
  readonly recheck: Recheck;
};
export type VisitDetail = { readonly visit: ListedVisit; readonly stems: readonly VisitStem[] };

function listOf<T>(rows: readonly T[], key: (row: T) => string): ReadonlyMap<string, readonly T[]> {
  const lists = new Map<string, T[]>();
  for (const row of rows) lists.set(key(row), [...(lists.get(key(row)) ?? []), row]);
  return lists;
}

/** A visit with every stem, reading and second look. Errors: Problem not-found when it is not in this project. */
export async function readVisit(projectId: string, visitId: string): Promise<VisitDetail> {
  const [visit] = await listVisits(projectId, visitId);
  if (!visit) throw new Problem('not-found');
  const { models } = await openDatabase();
  const measurements = (await models.StemMeasurement.findAll({ where: { visitId, deleted: false }, order: ['order', 'id'] })).map((row) => row.get({ plain: true }));
  const ids = measurements.map(({ id }) => id);
  const [readings, looks, stems, species, users] = await Promise.all([
    models.Reading.findAll({ where: { measurementId: ids, deleted: false }, order: ['takenAt', 'id'] }),
    models.SecondLook.findAll({ where: { measurementId: ids, deleted: false }, order: ['raisedAt', 'id'] }),
    models.Stem.findAll({ where: { id: measurements.map(({ stemId }) => stemId) } }),
    models.SpeciesEntry.findAll({ where: { projectId } }),
    models.User.findAll({ attributes: ['id', 'name'] }),
  ]);
  const trees = await models.Tree.findAll({ where: { id: stems.map(({ treeId }) => treeId) } });
  const names = new Map(users.map(({ id, name }) => [id, name]));
  const name = (id: string | null) => (id === null ? null : names.get(id) ?? null);
  const stemById = new Map(stems.map((stem) => [stem.id, stem]));
  const tagById = new Map(trees.map(({ id, tag }) => [id, tag]));
  const speciesById = new Map(species.map(({ id, localName }) => [id, localName]));
  const readingsOf = listOf(readings.map((row) => row.get({ plain: true })), ({ measurementId }) => measurementId);
  const looksOf = listOf(looks.map((row) => row.get({ plain: true })), ({ measurementId }) => measurementId);
  const rechecks = await recheckVisit(projectId, visitId, measurements, looksOf);
  return {
    visit,
    stems: measurements.map((measurement) => {
      const stem = stemById.get(measurement.stemId);
      return {
        tag: (stem && tagById.get(stem.treeId)) ?? '', stem: stem?.label ?? '', species: measurement.speciesId === null ? null : speciesById.get(measurement.speciesId) ?? null, measurement,
        readings: (readingsOf.get(measurement.id) ?? []).map((reading) => ({ ...reading, measurer: name(reading.measurerId), recorder: name(reading.recorderId) })),
        looks: (looksOf.get(measurement.id) ?? []).map((look) => ({ ...look, answeredBy: name(look.answeredById) })),
        recheck: rechecks.get(measurement.id) ?? { state: 'agrees', rules: [] },
      };
    }),
  };
}
