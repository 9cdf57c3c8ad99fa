import type { EntityName, EntityRecord } from '@/lib/schema/entities';
import type { RecordChange } from '@/lib/schema/record-change';

/** What the field reads of a project, each by id. */
export const viewedEntities = [
  'project', 'stratum', 'speciesEntry', 'plot', 'heightCurve', 'visit', 'tree', 'stem', 'stemMeasurement', 'reading', 'secondLook',
] as const satisfies readonly EntityName[];
export type ViewedEntity = (typeof viewedEntities)[number];
export type ProjectRecords = { readonly [E in ViewedEntity]: ReadonlyMap<string, EntityRecord[E]> };

function isViewed(entity: EntityName): entity is ViewedEntity {
  return (viewedEntities as readonly EntityName[]).includes(entity);
}

/** The records after changes that were saved; maps that no change touches stay the same object. */
export function applyChanges(records: ProjectRecords, changes: readonly RecordChange[]): ProjectRecords {
  const touched: { [E in ViewedEntity]?: Map<string, EntityRecord[ViewedEntity]> } = {};
  for (const { entity, recordId, ...change } of changes) {
    if (!isViewed(entity)) continue;
    const map = touched[entity] ??= new Map<string, EntityRecord[ViewedEntity]>(records[entity]);
    const former = map.get(recordId);
    if (change.kind === 'create') map.set(recordId, change.values as EntityRecord[ViewedEntity]);
    else if (!former) continue;
    else if (change.kind === 'set') map.set(recordId, { ...former, ...change.values } as EntityRecord[ViewedEntity]);
    else map.set(recordId, { ...former, deleted: change.kind === 'delete' });
  }
  return { ...records, ...touched } as ProjectRecords;
}
