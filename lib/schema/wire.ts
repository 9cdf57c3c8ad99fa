import { z } from 'zod';
import { idSchema, jsonSchema, roleSchema, timeSchema } from './common';

/** Version of the wire format, and of the record schemas that operations carry. */
export const WIRE_VERSION = 1;
export const SCHEMA_VERSION = 1;
/** Most operations in one push, most changes in one page of a pull. */
export const PAGE = 500;
/** The chain of a new device starts from this. */
export const GENESIS_HASH = '0'.repeat(64);
export const hashSchema = z.string().regex(/^[0-9a-f]{64}$/);

/** Operation kinds; `resolve` settles a conflict and names the candidates it saw. */
export const operationKindSchema = z.enum(['create', 'set', 'delete', 'restore', 'resolve']);

/**
 * One change, as a device made it. `entity`, `group` and the fields stay loose here on purpose: what this
 * version does not know is quarantined verbatim, never refused (sync rule: nothing is refused for its content).
 * A `create` has group '*' and all fields; `delete` and `restore` have group 'life' and no fields.
 * hash = SHA-256(prevHash || RFC 8785 JSON of the operation without `hash`), lower-case hex.
 */
export const operationSchema = z.looseObject({
  opId: idSchema,
  deviceId: idSchema,
  seq: z.int().min(1),
  projectId: idSchema,
  authorId: idSchema,
  entity: z.string().min(1).max(60),
  recordId: idSchema,
  kind: z.string().min(1).max(20),
  group: z.string().min(1).max(60),
  fields: z.record(z.string(), z.object({ old: jsonSchema, new: jsonSchema })),
  reason: z.string().max(10_000).nullable(),
  baseCursor: z.int().min(0),
  schemaV: z.int().min(1),
  appV: z.string().max(60),
  wallClock: z.string().max(40),
  monotonicMs: z.number().min(0),
  prevHash: hashSchema,
  hash: hashSchema,
});
export type Operation = z.infer<typeof operationSchema>;

export const pushRequestSchema = z.object({
  v: z.literal(WIRE_VERSION),
  deviceId: idSchema,
  /** Null until the device has heard from a server. */
  epoch: z.string().max(60).nullable(),
  firstSeq: z.int().min(1),
  prevHash: hashSchema,
  ops: z.array(operationSchema).min(1).max(PAGE),
});
export type PushRequest = z.infer<typeof pushRequestSchema>;

export const operationResultSchema = z.object({
  seq: z.int().min(1),
  opId: idSchema,
  cursor: z.int().min(1),
  /** same: equal to what stood; conflict: kept as a candidate; quarantined: kept verbatim, not applied. */
  state: z.enum(['applied', 'same', 'conflict', 'quarantined']),
  reason: z.string().nullable(),
});
export type OperationResult = z.infer<typeof operationResultSchema>;

export const pushReplySchema = z.object({
  v: z.literal(WIRE_VERSION),
  ackSeq: z.int().min(0),
  ackHash: hashSchema,
  epoch: z.string(),
  results: z.array(operationResultSchema),
  conflicts: z.array(idSchema),
  quarantined: z.array(z.object({ opId: idSchema, reason: z.string() })),
  cursor: z.int().min(0),
  serverTime: timeSchema,
});
export type PushReply = z.infer<typeof pushReplySchema>;

/**
 * Answers other than 200 to a push are problem+json (409) with these extra members:
 * code 'fork' (same seq, other hash), 'epoch' (server restored: rewind to ackSeq), 'gap' (send from ackSeq + 1).
 */
export const pushProblemSchema = z.looseObject({
  code: z.enum(['fork', 'epoch', 'gap']),
  epoch: z.string(),
  ackSeq: z.int().min(0),
  ackHash: hashSchema,
});
export type PushProblem = z.infer<typeof pushProblemSchema>;

/** One line of the log as a device reads it. */
export const changeSchema = z.looseObject({
  cursor: z.int().min(1),
  opId: idSchema,
  deviceId: idSchema,
  seq: z.int().min(1),
  authorId: idSchema,
  entity: z.string(),
  recordId: idSchema,
  kind: z.string(),
  group: z.string(),
  fields: z.record(z.string(), z.object({ old: jsonSchema, new: jsonSchema })),
  reason: z.string().nullable(),
  wallClock: z.string(),
  state: z.enum(['applied', 'same', 'conflict', 'quarantined']),
  stateReason: z.string().nullable(),
});
export type Change = z.infer<typeof changeSchema>;

export const pullReplySchema = z.object({
  v: z.literal(WIRE_VERSION),
  epoch: z.string(),
  projectId: idSchema,
  cursor: z.int().min(0),
  more: z.boolean(),
  changes: z.array(changeSchema),
  /** On the last page: hash of the sorted `recordId:revision` lines of the project. */
  digest: hashSchema.nullable(),
});
export type PullReply = z.infer<typeof pullReplySchema>;

/** A record as the server holds it; `revision` is the cursor of its last applied change. */
export const snapshotRecordSchema = z.object({
  entity: z.string(),
  id: idSchema,
  revision: z.int().min(1),
  row: z.record(z.string(), jsonSchema),
});
export type SnapshotRecord = z.infer<typeof snapshotRecordSchema>;

export const packPersonSchema = z.object({ id: idSchema, name: z.string(), role: roleSchema.nullable() });
export const workPackSchema = z.object({
  v: z.literal(WIRE_VERSION),
  schemaV: z.int().min(1),
  epoch: z.string(),
  projectId: idSchema,
  cursor: z.int().min(0),
  generatedAt: timeSchema,
  people: z.array(packPersonSchema),
  records: z.array(snapshotRecordSchema),
});
export type WorkPack = z.infer<typeof workPackSchema>;
