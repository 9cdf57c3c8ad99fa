import type { Json } from '@/lib/schema/common';
import type { Operation } from '@/lib/schema/wire';

/** A record as fields; what this version does not know is among them and stays. */
export type Row = { readonly [field: string]: Json };
/** The last applied change of a group of fields. */
export type GroupHead = { readonly lastCursor: number; readonly lastDeviceId: string };
export type Decision = 'apply' | 'same' | 'conflict';
export type Fields = Operation['fields'];

function isObject(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null;
}

/** Whether two JSON values are the same value; the order of an object's members does not count. Missing is null. */
export function sameJson(a: unknown, b: unknown): boolean {
  const [left, right] = [a ?? null, b ?? null];
  if (left === right) return true;
  if (!isObject(left) || !isObject(right) || Array.isArray(left) !== Array.isArray(right)) return false;
  const names = Object.keys(left);
  return names.length === Object.keys(right).length && names.every((name) => Object.hasOwn(right, name) && sameJson(left[name], right[name]));
}

function changesNothing(kind: string, fields: Fields, current: Row): boolean {
  if (kind === 'delete') return current['deleted'] === true;
  if (kind === 'restore') return current['deleted'] !== true;
  return Object.entries(fields).every(([name, { new: value }]) => sameJson(current[name], value));
}

/**
 * What becomes of an operation. A group whose last change the operation's device had seen (cursor at most
 * `baseCursor`), or made itself, takes the new values. An equal value changes nothing. Anything else was written
 * without knowledge of what stands: the current value stays, and both are candidates of a conflict.
 *
 * `group`: for `create` and `set` the last change of that group; for `delete` the last change of the whole record by
 * another device, because a delete must not hide an edit that it has not seen. Null where nothing was applied yet.
 * No clock is looked at. Where the record does not exist, only `create` makes sense; the caller keeps others back.
 */
export function decide({ op, group, current }: {
  readonly op: Pick<Operation, 'kind' | 'deviceId' | 'baseCursor' | 'fields'>;
  readonly group: GroupHead | null;
  readonly current: Row | null;
}): Decision {
  if (current === null) return 'apply';
  if (changesNothing(op.kind, op.fields, current)) return 'same';
  // A second create of one id is never an edit of the first, even from the same device.
  if (op.kind === 'create') return 'conflict';
  if (group === null || group.lastCursor <= op.baseCursor || group.lastDeviceId === op.deviceId) return 'apply';
  return 'conflict';
}

/**
 * The record after an applied operation; the one given is not changed. `create` starts from `row` as well, which then
 * holds only what names the record. Fields that the operation does not name stay, known or not.
 */
export function applyToRow(row: Row | null, { kind, fields }: { readonly kind: string; readonly fields: Fields }): Row {
  const before = row ?? {};
  if (kind === 'delete') return { ...before, deleted: true };
  if (kind === 'restore') return { ...before, deleted: false };
  const values = Object.fromEntries(Object.entries(fields).map(([name, { new: value }]) => [name, value]));
  return kind === 'create' ? { deleted: false, ...before, ...values } : { ...before, ...values };
}
