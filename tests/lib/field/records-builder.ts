import type { ProjectRecords } from '@/app/(field)/field/_data/project-records';
import { applyChanges, viewedEntities } from '@/app/(field)/field/_data/project-records';
import type { RecordChange } from '@/lib/schema/record-change';

/** A project's records after changes, from nothing. */
export function recordsAfter(changes: readonly RecordChange[], from?: ProjectRecords): ProjectRecords {
  const empty = Object.fromEntries(viewedEntities.map((entity) => [entity, new Map()])) as unknown as ProjectRecords;
  return applyChanges(from ?? empty, changes);
}
