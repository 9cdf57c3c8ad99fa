import type { EntityName, EntityRecord } from '@/lib/schema/entities';
import type { RecordChange } from '@/lib/schema/record-change';

/** The change that makes a record. */
export function createChange<E extends EntityName>(entity: E, values: EntityRecord[E]): RecordChange {
  return { entity, recordId: values.id, kind: 'create', values } as RecordChange;
}
