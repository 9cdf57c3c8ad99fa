import type { EntityName } from '@/lib/schema/entities';
import type { RecordChange } from '@/lib/schema/record-change';

/** The record as it stood before the changes; null when there was none. */
export type FormerRecord = (entity: EntityName, id: string) => Readonly<Record<string, unknown>> | null;

function inverseOf(change: RecordChange, former: FormerRecord): RecordChange | null {
  const { entity, recordId } = change;
  if (change.kind === 'create' || change.kind === 'restore') return { entity, recordId, kind: 'delete' };
  if (!('values' in change)) return { entity, recordId, kind: 'restore' };
  const record = former(entity, recordId);
  if (!record) return null;
  const values = Object.fromEntries(Object.keys(change.values).map((field) => [field, record[field]]));
  return { ...change, values } as RecordChange;
}

/**
 * The changes that put things back, last first. They are new operations: what is undone stays in the log.
 * A record that the same changes made is only deleted, whatever else was set on it.
 */
export function inverse(changes: readonly RecordChange[], former: FormerRecord): RecordChange[] {
  const made = new Set(changes.filter(({ kind }) => kind === 'create').map(({ recordId }) => recordId));
  return changes
    .filter(({ kind, recordId }) => kind === 'create' || !made.has(recordId))
    .flatMap((change) => inverseOf(change, former) ?? [])
    .reverse();
}
