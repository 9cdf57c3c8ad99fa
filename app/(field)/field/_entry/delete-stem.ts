import type { RecordChange } from '@/lib/schema/record-change';
import type { ProjectRecords } from '../_data/project-records';

/** Records that came into being with a stem's measurement: the measurement, and the stem and tree if this visit found them. */
function recordsOf(records: ProjectRecords, measurementId: string): readonly Omit<Extract<RecordChange, { kind: 'delete' | 'restore' }>, 'kind'>[] {
  const measurement = records.stemMeasurement.get(measurementId);
  const stem = measurement && records.stem.get(measurement.stemId);
  const tree = stem && records.tree.get(stem.treeId);
  if (!measurement || !stem || !tree) return [];
  const ofStem = [...records.stemMeasurement.values()].filter(({ stemId, id, deleted }) => stemId === stem.id && id !== measurementId && !deleted);
  const siblings = [...records.stem.values()].filter(({ treeId, id, deleted }) => treeId === tree.id && id !== stem.id && !deleted);
  const stemToo = ofStem.length === 0;
  return [
    { entity: 'stemMeasurement', recordId: measurementId },
    ...(stemToo ? [{ entity: 'stem', recordId: stem.id } as const] : []),
    ...(stemToo && siblings.length === 0 ? [{ entity: 'tree', recordId: tree.id } as const] : []),
  ];
}

/** Tombstones for a stem of this visit; a tree that other visits or other stems know stays. */
export function deleteStem(records: ProjectRecords, measurementId: string): RecordChange[] {
  return recordsOf(records, measurementId).map((record) => ({ ...record, kind: 'delete' }));
}

/** Brings a deleted stem back, with its tree. */
export function restoreStem(records: ProjectRecords, measurementId: string): RecordChange[] {
  const measurement = records.stemMeasurement.get(measurementId);
  const stem = measurement && records.stem.get(measurement.stemId);
  const tree = stem && records.tree.get(stem.treeId);
  if (!measurement || !stem || !tree) return [];
  const back: RecordChange[] = [{ entity: 'stemMeasurement', recordId: measurementId, kind: 'restore' }];
  if (stem.deleted) back.unshift({ entity: 'stem', recordId: stem.id, kind: 'restore' });
  if (tree.deleted) back.unshift({ entity: 'tree', recordId: tree.id, kind: 'restore' });
  return back;
}
