import type { FieldStore } from '@/lib/client/field-store-types';
import { viewedEntities } from './project-records';
import type { ProjectRecords } from './project-records';

/** All records of a project on this device, deleted ones too (they can be restored); null when its pack is not here. */
export async function loadProject(store: FieldStore, projectId: string): Promise<ProjectRecords | null> {
  const lists = await Promise.all(viewedEntities.map(async (entity) => {
    const records: readonly { readonly id: string }[] = await store.list(projectId, entity);
    return [entity, new Map(records.map((record) => [record.id, record]))] as const;
  }));
  const records = Object.fromEntries(lists) as unknown as ProjectRecords;
  return records.project.has(projectId) ? records : null;
}
