import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applyToRow, decide } from '@/lib/sync/merge';
import type { Row } from '@/lib/sync/merge';

const row: Row = { id: 'r', deleted: false, dbhCm: 31.5, dbhUnit: 'cm', later: { kept: true } };
const set = (value: number, { deviceId = 'mine', baseCursor = 10 } = {}) =>
  ({ kind: 'set', deviceId, baseCursor, fields: { dbhCm: { old: 31.5, new: value }, dbhUnit: { old: 'cm', new: 'cm' } } });

describe('merging one group (rule 4)', () => {
  it('a record not there yet is made', () => {
    expect(decide({ op: { kind: 'create', deviceId: 'mine', baseCursor: 0, fields: {} }, group: null, current: null })).toBe('apply');
  });
  it('a change seen by the device is replaced, up to and including its base', () => {
    expect(decide({ op: set(13.5), group: { lastCursor: 10, lastDeviceId: 'other' }, current: row })).toBe('apply');
  });
  it('a change not seen by the device makes a conflict', () => {
    expect(decide({ op: set(13.5), group: { lastCursor: 11, lastDeviceId: 'other' }, current: row })).toBe('conflict');
  });
  it('a change of the same device is replaced, whatever its base', () => {
    expect(decide({ op: set(13.5), group: { lastCursor: 99, lastDeviceId: 'mine' }, current: row })).toBe('apply');
  });
  it('an equal value changes nothing, even unseen', () => {
    expect(decide({ op: set(31.5), group: { lastCursor: 99, lastDeviceId: 'other' }, current: row })).toBe('same');
  });
  it('a delete does not hide an edit that it has not seen', () => {
    const op = { kind: 'delete', deviceId: 'mine', baseCursor: 10, fields: {} };
    expect(decide({ op, group: { lastCursor: 11, lastDeviceId: 'other' }, current: row })).toBe('conflict');
    expect(decide({ op, group: { lastCursor: 10, lastDeviceId: 'other' }, current: row })).toBe('apply');
    expect(decide({ op, group: null, current: { ...row, deleted: true } })).toBe('same');
  });
  it('two creates of one id are the same or a conflict, never one over the other', () => {
    const create = (dbhCm: number) => ({ kind: 'create', deviceId: 'mine', baseCursor: 99, fields: { dbhCm: { old: null, new: dbhCm } } });
    expect(decide({ op: create(31.5), group: { lastCursor: 1, lastDeviceId: 'mine' }, current: row })).toBe('same');
    expect(decide({ op: create(30), group: { lastCursor: 1, lastDeviceId: 'mine' }, current: row })).toBe('conflict');
  });
  it('any unseen change of another device to another value is a conflict (invariant 11), and nothing else is (invariant 12)', () => {
    fc.assert(fc.property(fc.nat(50), fc.nat(50), fc.boolean(), fc.constantFrom(31.5, 13.5), (lastCursor, baseCursor, own, value) => {
      const decision = decide({ op: set(value, { baseCursor }), group: { lastCursor, lastDeviceId: own ? 'mine' : 'other' }, current: row });
      const equal = value === row['dbhCm'];
      expect(decision).toBe(equal ? 'same' : !own && lastCursor > baseCursor ? 'conflict' : 'apply');
    }));
  });
});

describe('applying to a record', () => {
  it('keeps fields that the operation does not name, known or not', () => {
    expect(applyToRow(row, set(13.5))).toEqual({ ...row, dbhCm: 13.5 });
    expect(row['dbhCm']).toBe(31.5);
  });
  it('delete and restore keep every value', () => {
    const gone = applyToRow(row, { kind: 'delete', fields: {} });
    expect(gone).toEqual({ ...row, deleted: true });
    expect(applyToRow(gone, { kind: 'restore', fields: {} })).toEqual(row);
  });
  it('create starts from the names of the record', () => {
    expect(applyToRow({ id: 'r', projectId: 'p' }, { kind: 'create', fields: { tag: { old: null, new: '7' } } }))
      .toEqual({ id: 'r', projectId: 'p', deleted: false, tag: '7' });
  });
});
