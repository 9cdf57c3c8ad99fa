import 'server-only';
import { entities, entitySchemas } from '@/lib/schema/entities';
import type { EntityName } from '@/lib/schema/entities';
import { SCHEMA_VERSION, operationKindSchema, operationSchema } from '@/lib/schema/wire';
import type { Operation } from '@/lib/schema/wire';
import { applyToRow } from '@/lib/sync/merge';
import type { Row } from '@/lib/sync/merge';
import { hashOf } from '@/lib/sync/operation';
import type { AnyRow } from '@/models';
import { can } from '../policies';
import type { SignedIn } from '../policies';
import type { LogBatch } from './log-batch';

/** People whom a quarantined operation of another project must not reach know it by these. */
export const DENIED_SENDER = 'The person who sent this may not send to its project.';
export const DENIED_AUTHOR = 'The person named as its author may not record in this project.';

/** An operation as it arrived: only what the chain needs is certain. */
export type ArrivedOperation = { readonly opId: string; readonly deviceId: string; readonly seq: number; readonly prevHash: string; readonly hash: string };
export type Person = Pick<SignedIn, 'admin' | 'roles'>;
export type JudgeContext = {
  readonly deviceId: string;
  readonly uploader: Person;
  readonly authors: ReadonlyMap<string, Person>;
};

/** `row`: the record as it would be, for operations that carry values. */
export type Verdict =
  | { readonly ok: true; readonly op: Operation; readonly entity: EntityName; readonly row: Row }
  | { readonly ok: false; readonly reason: string };

const no = (reason: string): Verdict => ({ ok: false, reason });
const isEntity = (name: string): name is EntityName => Object.hasOwn(entities, name);

/** Nothing that this program writes nests deeper; more would only cost stack. */
const MOST_DEPTH = 32;

/** SQL text ends at a NUL, and half a surrogate pair has neither UTF-8 nor a hash: such text cannot be read back as it was sent. */
function storable(value: unknown, depth = 0): boolean {
  if (typeof value === 'string') return value.isWellFormed() && !value.includes('\0');
  if (typeof value !== 'object' || value === null) return true;
  return depth < MOST_DEPTH && Object.entries(value).every(([name, inner]) => storable(name) && storable(inner, depth + 1));
}

/** The unit fields of a record against the project's; null when they agree. */
function foreignUnit(entity: EntityName, values: Row, row: Row, project: AnyRow): string | null {
  const { dbhUnit, lengthUnit } = project as unknown as { readonly dbhUnit: string; readonly lengthUnit: string };
  const wanted: Readonly<Record<string, string>> = entity === 'stemMeasurement' ? { dbhUnit, heightUnit: lengthUnit }
    : entity === 'reading' ? { unit: row['quantity'] === 'dbh' ? dbhUnit : lengthUnit } : {};
  for (const [field, unit] of Object.entries(wanted)) {
    const given = values[field];
    if (given !== undefined && given !== null && given !== unit) return `The unit does not belong to this project: ${field} is ${String(given)}, the project measures in ${unit}.`;
  }
  return null;
}

function missingParent(batch: LogBatch, entity: EntityName, values: Row, projectId: string): string | null {
  for (const [field, parent] of Object.entries(entities[entity].parents)) {
    const id = values[field];
    if (typeof id !== 'string') continue;
    if (batch.row(parent, id)?.projectId !== projectId) return `The ${parent} that ${field} names is not here.`;
  }
  return null;
}

function whoMay(op: Operation, context: JudgeContext): string | null {
  if (!can(context.uploader, 'sync', op.projectId)) return DENIED_SENDER;
  const author = context.authors.get(op.authorId);
  return author && can(author, 'sync', op.projectId) ? null : DENIED_AUTHOR;
}

/** The fields that an operation may name, or why its kind and group make no sense here. */
function fieldsOf(op: Operation, entity: EntityName): readonly string[] | string {
  const kind = operationKindSchema.safeParse(op.kind);
  if (!kind.success || kind.data === 'resolve') return `This version does not know the kind of change "${op.kind}".`;
  const groups = entities[entity].groups;
  if (kind.data === 'create') return op.group === '*' ? Object.keys(entitySchemas[entity].shape) : `A new record is one group "*", not "${op.group}".`;
  if (kind.data === 'set') return Object.hasOwn(groups, op.group) ? groups[op.group]! : `This version does not know the group "${op.group}" of ${entity}.`;
  return op.group === 'life' ? [] : `A ${kind.data} is of the group "life", not "${op.group}".`;
}

/**
 * Whether an operation may be merged, or why it is kept aside. Its record, the record's groups, its parents and its
 * project must be loaded. Nothing here throws for what an operation holds.
 */
export function judge(batch: LogBatch, arrived: ArrivedOperation, context: JudgeContext): Verdict {
  if (!storable(arrived)) return no('It holds a character that cannot be stored, or nests too deep.');
  const parsed = operationSchema.safeParse(arrived);
  if (!parsed.success) return no(`It is not a whole operation: ${parsed.error.issues[0]?.path.join('.') ?? ''} is not as it must be.`);
  const op = parsed.data;
  if (op.deviceId !== context.deviceId) return no('It names another device than the one that sent it.');
  if (hashOf(arrived) !== op.hash) return no('Its content is not what its checksum was made of.');
  const denied = whoMay(op, context);
  if (denied !== null) return no(denied);
  const project = batch.row('project', op.projectId);
  if (project === null) return no(DENIED_SENDER);
  if (op.schemaV > SCHEMA_VERSION) return no(`It was made by a newer version (records of version ${op.schemaV}; this server knows ${SCHEMA_VERSION}).`);
  const { entity } = op;
  if (!isEntity(entity)) return no(`This version does not know records of the kind "${entity}".`);
  if (entities[entity].writer !== 'field') return no(`A device does not write ${entity}; the office does.`);
  const fields = fieldsOf(op, entity);
  if (typeof fields === 'string') return no(fields);
  const stranger = Object.keys(op.fields).find((name) => !fields.includes(name));
  if (stranger !== undefined) return no(`This version does not know the field "${stranger}" there.`);

  const current = batch.row(entity, op.recordId);
  if (current === null && op.kind !== 'create') return no(`The ${entity} that it changes is not here.`);
  const otherKind = [...batch.heads(op.recordId).values()].some((head) => head.entity !== entity);
  if (otherKind || (current !== null && current.projectId !== op.projectId)) return no('The id of its record belongs to another record.');

  const names = { id: op.recordId, projectId: op.projectId };
  const before: Row = op.kind === 'create' ? names : current as unknown as Row;
  const row = applyToRow(before, op);
  if (row['id'] !== names.id || row['projectId'] !== names.projectId || (op.kind === 'create' && row['deleted'] !== false)) return no('A field of it contradicts the record that it names.');
  const values = entitySchemas[entity].safeParse(row);
  if (!values.success) {
    return no(`A value is not one that can be stored: ${values.error.issues.map(({ path, message }) => `${path.join('.')}: ${message}`).join('; ')}.`.slice(0, 1000));
  }
  const given = applyToRow({}, op);
  const fault = foreignUnit(entity, given, row, project) ?? missingParent(batch, entity, given, op.projectId);
  // Defaults fill what a create left out; what was sent is stored as sent, so that every device reads the same.
  return fault === null ? { ok: true, op, entity, row: { ...(values.data as unknown as Row), ...row } } : no(fault);
}
