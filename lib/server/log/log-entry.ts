import 'server-only';
import { v7 } from 'uuid';
import { SCHEMA_VERSION } from '@/lib/schema/wire';
import type { Operation, OperationResult } from '@/lib/schema/wire';
import { makeOperation } from '@/lib/sync/operation';
import type { ChangeLogEntryRow } from '@/models/change-log-entry';
import type { LogBatch } from './log-batch';

/** How the program calls itself in operations of the server's own device. */
const SERVER_APP = 'server';

/** A log entry of an operation that is well formed. */
export function entryOf(op: Operation, state: OperationResult['state'], stateReason: string | null, now: string): Omit<ChangeLogEntryRow, 'cursor'> {
  return {
    opId: op.opId, deviceId: op.deviceId, seq: op.seq, projectId: op.projectId, authorId: op.authorId, entity: op.entity, recordId: op.recordId,
    kind: op.kind, group: op.group, fields: op.fields, reason: op.reason, baseCursor: op.baseCursor, schemaV: op.schemaV, appV: op.appV,
    wallClock: op.wallClock, receivedAt: now, prevHash: op.prevHash, hash: op.hash, state, stateReason, raw: JSON.stringify(op),
  };
}

export type ServerChange = Pick<Operation, 'projectId' | 'authorId' | 'entity' | 'recordId' | 'kind' | 'group' | 'fields' | 'reason'>;

/** Makes an operation of the server's own device, next in its chain. It has seen everything before it. */
export async function serverOperation(batch: LogBatch, change: ServerChange): Promise<Operation> {
  const device = await batch.device(batch.serverDeviceId);
  const op = makeOperation({
    ...change, opId: v7(), deviceId: device.id, seq: device.lastSeq + 1, baseCursor: batch.cursor, schemaV: SCHEMA_VERSION,
    appV: SERVER_APP, wallClock: batch.now, monotonicMs: 0,
  }, device.lastHash);
  device.lastSeq = op.seq;
  device.lastHash = op.hash;
  device.lastSeenAt = batch.now;
  return op;
}
