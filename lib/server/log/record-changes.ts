import 'server-only';
import type { Json } from '@/lib/schema/common';
import { entities, entitySchemas } from '@/lib/schema/entities';
import type { EntityName } from '@/lib/schema/entities';
import type { ChangeContext, RecordChange } from '@/lib/schema/record-change';
import { applyToRow } from '@/lib/sync/merge';
import type { Fields, Row } from '@/lib/sync/merge';
import type { WriteContext } from '../write-queue';
import { LogBatch } from './log-batch';
import { serverOperation } from './log-entry';
import { settle } from './settle';

/** Named by the operation itself, so not among its fields. */
const NAMES: readonly string[] = ['id', 'projectId', 'deleted'];

/** The fields of a change with what stood there; a group is always written whole. */
function fieldsOf(change: RecordChange, current: Row | null): { group: string; fields: Fields } {
  if (!('values' in change)) return { group: 'life', fields: {} };
  const values = change.values as Row;
  const group = 'group' in change ? change.group : '*';
  const names = 'group' in change ? entities[change.entity].groups[group] ?? [] : Object.keys(values).filter((name) => !NAMES.includes(name));
  const strange = Object.keys(values).find((name) => ![...names, ...NAMES].includes(name));
  if (names.length === 0 || strange !== undefined) throw new Error(`A ${change.entity} has no ${strange ?? 'fields'} in a group "${group}".`);
  const fields = names.map((name) => [name, { old: current?.[name] ?? null, new: (name in values ? values[name] : current?.[name]) ?? null }] as const);
  return { group, fields: Object.fromEntries(fields) };
}

/**
 * Makes changes as the office does: through the log, as operations of the server's own device, inside the caller's
 * write. They have seen all that stands, so they apply at once; where two values stand open, the new one joins them.
 * Parents come before their children. Result: cursors of the first and the last entry.
 * Errors: a record that is not there, of another project or there already; values that the schema does not take
 * (ZodError); then the write must be given up.
 */
export async function recordChanges(context: WriteContext, changes: readonly RecordChange[], { projectId, authorId, reason }: ChangeContext): Promise<{ readonly firstCursor: number; readonly lastCursor: number }> {
  const batch = await LogBatch.open(context);
  const firstCursor = batch.cursor + 1;
  const ids = new Map<EntityName, Set<string>>();
  for (const { entity, recordId } of changes) ids.set(entity, (ids.get(entity) ?? new Set()).add(recordId));
  for (const [entity, wanted] of ids) await batch.load(entity, wanted, true);

  for (const change of changes) {
    const { entity, recordId, kind } = change;
    const current = batch.row(entity, recordId) as Row | null;
    if (kind === 'create' && current !== null) throw new Error(`There is a ${entity} ${recordId} already.`);
    if (kind !== 'create' && current?.['projectId'] !== projectId) throw new Error(`There is no ${entity} ${recordId} in this project.`);
    const op = await serverOperation(batch, { projectId, authorId, entity, recordId, kind, ...fieldsOf(change, current), reason: reason ?? null });
    const row = applyToRow(kind === 'create' ? { id: recordId, projectId } : current, op);
    const values = entitySchemas[entity].parse(row) as unknown as Row;
    await settle(batch, { op, entity, row: { ...values, ...row } as Row & { readonly id: Json } });
  }
  await batch.flush();
  return { firstCursor, lastCursor: batch.cursor };
}
