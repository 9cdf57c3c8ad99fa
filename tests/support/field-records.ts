import type { RecordChange } from '@/lib/schema/record-change';
import type { SyncProject } from './sync';
import { makeTree } from './sync';

/** The changes of a visit with one tree, as the field's screens save them. */
export function treeChanges(there: SyncProject, tag: string, dbhCm = 31.5): { measurementId: string; changes: RecordChange[] } {
  const { changes, measurementId } = makeTree(there, tag, dbhCm);
  const base = { projectId: there.project.id, deleted: false };
  return {
    measurementId,
    changes: changes.map(({ entity, recordId, values }) => ({ entity, recordId, kind: 'create', values: { ...base, id: recordId, ...values } }) as RecordChange),
  };
}

export function remarksChange(recordId: string, remarks: string): RecordChange {
  return { entity: 'stemMeasurement', recordId, kind: 'set', group: 'remarks', values: { remarks } };
}

