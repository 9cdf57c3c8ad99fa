import 'client-only';
import { v7 } from 'uuid';
import type { Json } from '@/lib/schema/common';
import { entities, entitySchemas } from '@/lib/schema/entities';
import type { ChangeContext, RecordChange } from '@/lib/schema/record-change';
import { SCHEMA_VERSION } from '@/lib/schema/wire';
import { applyToRow } from '@/lib/sync/merge';
import type { Fields, Row } from '@/lib/sync/merge';
import { makeOperation } from '@/lib/sync/operation';
import { readDevice } from './db';
import type { FieldDatabase, OutboxRow, RecordRow } from './db';
import type { Draft } from './field-store-types';

const APP_VERSION = '0.1.0';
/** Named by the operation itself, so not among its fields. */
const NAMES: readonly string[] = ['id', 'projectId', 'deleted'];

export type CommitResult = { readonly firstSeq: number; readonly lastSeq: number };
export type CommitInput = {
  readonly changes: readonly RecordChange[];
  readonly context: ChangeContext;
  readonly draft?: { readonly put?: Draft; readonly remove?: string } | undefined;
  /** One for each change, chosen before the first try: a second try finds by them what the first has done after all. */
  readonly opIds: readonly string[];
};

/** Text without what neither a hash nor the server's store can carry: halves of characters, and NUL. */
function clean(value: Json): Json {
  if (typeof value === 'string') return value.toWellFormed().replaceAll('\0', '');
  if (typeof value !== 'object' || value === null) return value;
  if (Array.isArray(value)) return (value as readonly Json[]).map(clean);
  return Object.fromEntries(Object.entries(value).map(([name, inner]) => [name, clean(inner)]));
}

/** A group is always written whole, so that halves of two people's values are never mixed. */
function fieldsOf(change: RecordChange, current: Row | null): { group: string; fields: Fields } {
  if (!('values' in change)) return { group: 'life', fields: {} };
  const values = change.values as Row;
  const group = 'group' in change ? change.group : '*';
  const names = 'group' in change ? entities[change.entity].groups[group] : Object.keys(entitySchemas[change.entity].shape).filter((name) => !NAMES.includes(name));
  const strange = Object.keys(values).find((name) => ![...(names ?? []), ...NAMES].includes(name));
  if (!names || strange !== undefined) throw new Error(`A ${change.entity} has no ${strange ?? 'such fields'} in a group "${group}".`);
  const fields = names.map((name) => [name, { old: current?.[name] ?? null, new: clean((name in values ? values[name] : current?.[name]) ?? null) }] as const);
  return { group, fields: Object.fromEntries(fields) };
}

/** Records, operations, the chain's head and the draft change together or not at all. Nothing else is awaited inside. */
export async function commitChanges(db: FieldDatabase, { changes, context, draft, opIds }: CommitInput): Promise<CommitResult> {
  return db.transaction('rw', db.meta, db.packs, db.records, db.outbox, db.drafts, async () => {
    const device = await readDevice(db);
    const earlier = opIds[0] === undefined ? undefined : await db.outbox.where('opId').equals(opIds[0]).first();
    if (earlier) return { firstSeq: earlier.seq, lastSeq: earlier.seq + changes.length - 1 };
    const { projectId, authorId, reason = null } = context;
    const baseCursor = (await db.packs.get(projectId))?.cursor ?? 0;
    const touched = new Map<string, RecordRow>();
    const out: OutboxRow[] = [];
    let { lastSeq: seq, lastHash: hash } = device;
    for (const [i, change] of changes.entries()) {
      const { entity, recordId, kind } = change;
      const key = `${entity} ${recordId}`;
      const row = touched.get(key) ?? (await db.records.get([entity, recordId]));
      if (kind === 'create' ? row !== undefined : row?.projectId !== projectId) throw new Error(`The ${entity} ${recordId} ${kind === 'create' ? 'is here already' : 'is not here'}.`);
      const op = makeOperation({
        opId: opIds[i] ?? v7(), deviceId: device.deviceId, seq: seq + 1, projectId, authorId, entity, recordId, kind, ...fieldsOf(change, row?.view ?? null), reason,
        baseCursor, schemaV: SCHEMA_VERSION, appV: APP_VERSION, wallClock: new Date().toISOString(), monotonicMs: performance.now(),
      }, hash);
      const view = applyToRow(row?.view ?? { id: recordId, projectId }, op);
      entitySchemas[entity].parse(view);
      touched.set(key, { ...(row ?? { entity, id: recordId, projectId, base: null, revision: 0 }), view });
      out.push({ seq: op.seq, opId: op.opId, recordId, op, cursor: null, absorbed: false, ackedAt: null });
      ({ seq, hash } = op);
    }
    await db.records.bulkPut([...touched.values()]);
    await db.outbox.bulkAdd(out);
    await db.meta.put({ ...device, lastSeq: seq, lastHash: hash });
    if (draft?.put) await db.drafts.put(draft.put);
    if (draft?.remove !== undefined) await db.drafts.delete(draft.remove);
    return { firstSeq: device.lastSeq + 1, lastSeq: seq };
  });
}
