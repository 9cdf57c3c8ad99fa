import 'server-only';
import { v7 } from 'uuid';
import type { Json } from '@/lib/schema/common';
import { timeSchema } from '@/lib/schema/common';
import type { Candidate } from '@/lib/schema/conflict';
import { entities } from '@/lib/schema/entities';
import type { EntityName } from '@/lib/schema/entities';
import type { Operation, OperationResult } from '@/lib/schema/wire';
import { applyToRow, decide } from '@/lib/sync/merge';
import type { GroupHead, Row } from '@/lib/sync/merge';
import type { RecordGroupRow } from '@/models/record-group';
import type { LogBatch } from './log-batch';
import { entryOf, serverOperation } from './log-entry';

type Settled = { readonly cursor: number; readonly state: OperationResult['state']; readonly conflictIds: readonly string[] };
type Subject = { readonly op: Operation; readonly entity: EntityName; readonly row: Row };

function newer(a: RecordGroupRow | null, b: RecordGroupRow): RecordGroupRow {
  return a === null || b.lastCursor > a.lastCursor ? b : a;
}

/** What the operation is compared with: its group's last change, or, for a delete, the record's last by another device. */
function headFor(batch: LogBatch, op: Operation): RecordGroupRow | null {
  const heads = batch.heads(op.recordId);
  if (op.kind !== 'delete') return heads.get(op.group) ?? heads.get('*') ?? null;
  return [...heads.values()].filter(({ lastDeviceId }) => lastDeviceId !== op.deviceId).reduce(newer, null as RecordGroupRow | null);
}

function noteHead(batch: LogBatch, op: Operation, entity: EntityName, cursor: number): void {
  batch.setHead({
    recordId: op.recordId, group: op.group, entity, projectId: op.projectId, lastCursor: cursor, lastDeviceId: op.deviceId,
    lastAuthorId: op.authorId, lastOpId: op.opId, lastWallClock: op.wallClock,
  });
}

const clock = (wallClock: string, now: string): string => (timeSchema.safeParse(wallClock).success ? wallClock : now);

function candidateOf(op: Operation, now: string): Candidate {
  const values = op.group === 'life' ? { deleted: op.kind === 'delete' }
    : Object.fromEntries(Object.entries(op.fields).map(([name, { new: value }]) => [name, value]));
  return { opId: op.opId, values, authorId: op.authorId, deviceId: op.deviceId, wallClock: clock(op.wallClock, now) };
}

function standing(head: GroupHead & RecordGroupRow, values: Candidate['values'], now: string): Candidate {
  return { opId: head.lastOpId, values, authorId: head.lastAuthorId, deviceId: head.lastDeviceId, wallClock: clock(head.lastWallClock, now) };
}

/** What stands for the fields of a group; '*' is all of a record. */
function valuesOf(row: Row, entity: EntityName, group: string): Candidate['values'] {
  if (group === 'life') return { deleted: row['deleted'] === true };
  const names = group === '*' ? Object.values(entities[entity].groups).flat() : entities[entity].groups[group] ?? [];
  return Object.fromEntries(names.map((name) => [name, row[name] ?? null]));
}

/** Opens a conflict about a group, or adds to the one there is; one that was settled is open again. */
async function flag(batch: LogBatch, { op, entity }: Subject, group: string, candidates: readonly Candidate[]): Promise<string> {
  const former = batch.conflictOf(op.recordId, group);
  const before = (former?.['candidates'] ?? []) as readonly Candidate[];
  const added = candidates.filter(({ opId }) => !before.some((candidate) => candidate.opId === opId));
  if (former && added.length === 0 && former['state'] === 'open') return former.id;
  const all = [...before, ...added] as unknown as Json;
  const change = (name: string, value: Json) => [name, { old: (former?.[name] as Json | undefined) ?? null, new: value }] as const;
  const fields = former ? [change('candidates', all), change('state', 'open')]
    : [change('entity', entity), change('recordId', op.recordId), change('group', group), change('candidates', all), change('state', 'open')];
  const id = former?.id ?? v7();
  const own = await serverOperation(batch, {
    projectId: op.projectId, authorId: op.authorId, entity: 'conflict', recordId: id, kind: former ? 'set' : 'create',
    group: former ? 'conflict' : '*', fields: Object.fromEntries(fields), reason: null,
  });
  const cursor = batch.append(entryOf(own, 'applied', null, batch.now));
  batch.setRow('conflict', applyToRow(former as Row | null ?? { id, projectId: op.projectId }, own) as Row & { id: Json }, cursor);
  noteHead(batch, own, 'conflict', cursor);
  return id;
}

/** An edit made without knowledge of a delete: the record comes back, and the delete becomes one of two values. */
async function bringBack(batch: LogBatch, subject: Subject, life: RecordGroupRow): Promise<string> {
  const { op, entity } = subject;
  const own = await serverOperation(batch, {
    projectId: op.projectId, authorId: op.authorId, entity, recordId: op.recordId, kind: 'restore', group: 'life', fields: {},
    reason: 'edited where the delete was not known',
  });
  const cursor = batch.append(entryOf(own, 'applied', null, batch.now));
  const row = batch.row(entity, op.recordId) as unknown as Row;
  batch.setRow(entity, applyToRow(row, own) as Row & { id: Json }, cursor);
  noteHead(batch, own, entity, cursor);
  const edit = { ...candidateOf(op, batch.now), values: { deleted: false } };
  return flag(batch, subject, 'life', [standing(life, { deleted: true }, batch.now), edit]);
}

/**
 * Merges an accepted operation: appends it to the log and applies it, or keeps both values and flags the record by a
 * conflict that the server's own device writes into the same log. `row` is the record with the operation applied.
 */
export async function settle(batch: LogBatch, subject: Subject): Promise<Settled> {
  const { op, entity, row } = subject;
  const current = batch.row(entity, op.recordId) as Row | null;
  const head = headFor(batch, op);
  const life = batch.heads(op.recordId).get('life');
  const decision = decide({ op, group: head, current });
  const state = decision === 'apply' ? 'applied' : decision;
  const cursor = batch.append(entryOf(op, state, null, batch.now));
  if (decision === 'same') return { cursor, state, conflictIds: [] };

  const conflictIds: string[] = [];
  if (decision === 'apply') {
    batch.setRow(entity, row as Row & { id: Json }, cursor);
    noteHead(batch, op, entity, cursor);
    const open = batch.conflictOf(op.recordId, op.group);
    if (open?.['state'] === 'open') conflictIds.push(await flag(batch, subject, op.group, [candidateOf(op, batch.now)]));
  } else if (current !== null && head !== null) {
    const stands = standing(head, valuesOf(current, entity, op.group), batch.now);
    conflictIds.push(await flag(batch, subject, op.group, [stands, candidateOf(op, batch.now)]));
  }
  const unseenDelete = current?.['deleted'] === true && life !== undefined && life.lastDeviceId !== op.deviceId && life.lastCursor > op.baseCursor;
  if (op.kind === 'set' && unseenDelete) conflictIds.push(await bringBack(batch, subject, life));
  return { cursor, state, conflictIds };
}
