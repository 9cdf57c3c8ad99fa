import { gzipSync } from 'node:zlib';
import { v7 } from 'uuid';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { GENESIS_HASH } from '@/lib/schema/wire';
import type { Operation } from '@/lib/schema/wire';
import { POST } from '@/app/api/sync/push/route';
import { hashOf } from '@/lib/sync/operation';
import { makeUser, routeContext, signedInRequest, startTestServer } from '../../support/server';
import type { TestServer } from '../../support/server';
import { makeSyncProject, makeTree, makeWireDevice, post, pull, push, pushProblem } from '../../support/sync';
import type { SyncProject } from '../../support/sync';

let server: TestServer;
let there: SyncProject;
beforeAll(async () => { server = await startTestServer(); });
beforeEach(async () => { there = await makeSyncProject(); });
afterAll(async () => server.close());

function phoneWithTree(tag = '1', dbhCm = 31.5) {
  const phone = makeWireDevice(there.project.id, there.crew.id);
  const tree = makeTree(there, tag, dbhCm);
  for (const change of tree.changes) phone.make(change);
  return { phone, ...tree };
}
const remarks = (recordId: string, text: string) => ({ entity: 'stemMeasurement', recordId, kind: 'set', group: 'remarks', values: { remarks: text } });
const measurement = (id: string) => server.models.StemMeasurement.findByPk(id, { rejectOnEmpty: true });
const logged = (opId: string) => server.models.ChangeLogEntry.findOne({ where: { opId }, rejectOnEmpty: true });

describe('push (rule 3)', () => {
  it('appends every operation, applies it, and acknowledges the last with its hash', async () => {
    const { phone, measurementId } = phoneWithTree();
    const reply = await push(there.crew, phone.request());
    expect(reply).toMatchObject({ ackSeq: 5, ackHash: phone.made[4]!.hash, quarantined: [], conflicts: [] });
    expect(reply.results.map(({ state }) => state)).toEqual(Array(5).fill('applied'));
    const row = await measurement(measurementId);
    expect(row).toMatchObject({ dbhCm: 31.5, revision: reply.results[3]!.cursor });
    expect(JSON.parse((await logged(phone.made[3]!.opId)).raw)).toEqual(phone.made[3]);
  });

  it('takes gzip', async () => {
    const { phone } = phoneWithTree();
    const request = await signedInRequest(there.crew, '/api/sync/push', {
      method: 'POST', body: gzipSync(JSON.stringify(phone.request())), headers: { 'content-type': 'application/json', 'content-encoding': 'gzip' },
    });
    expect((await POST(request, routeContext())).status).toBe(200);
  });

  it('a device that knocks more than 120 times a minute is told when to come again, and what it sent before stays', async () => {
    const { phone } = phoneWithTree();
    const statuses: number[] = [];
    let late: Response | null = null;
    for (let i = 0; i < 121; i++) {
      late = await post(there.crew, phone.request());
      statuses.push(late.status);
    }
    expect(statuses.slice(0, 120)).toEqual(Array(120).fill(200));
    expect(late!.status).toBe(429);
    expect(Number(late!.headers.get('retry-after'))).toBeGreaterThan(0);
    expect(await server.models.ChangeLogEntry.count({ where: { deviceId: phone.deviceId } })).toBe(5);
  });

  it('answers what was sent before as it was answered then, and stores it once (invariant 5)', async () => {
    const { phone, measurementId } = phoneWithTree();
    const first = await push(there.crew, phone.request());
    phone.make(remarks(measurementId, 'leaning'));
    const again = await push(there.crew, phone.request(3));
    expect(again.results.slice(0, 3)).toEqual(first.results.slice(2));
    expect(again.ackSeq).toBe(6);
    expect(await server.models.ChangeLogEntry.count({ where: { deviceId: phone.deviceId } })).toBe(6);
  });

  it('the same seq with another hash is a fork: nothing of it is stored', async () => {
    const { phone, visitId } = phoneWithTree();
    await push(there.crew, phone.request());
    const copy = makeWireDevice(there.project.id, there.crew.id, phone.deviceId);
    for (let i = 0; i < 6; i += 1) copy.make({ entity: 'visit', recordId: visitId, kind: 'set', group: 'people', values: { measurerId: null, recorderId: null } });
    expect(await pushProblem(there.crew, copy.request())).toMatchObject({ status: 409, code: 'fork', ackSeq: 5, ackHash: phone.made[4]!.hash });
    expect(await pushProblem(there.crew, copy.request(6))).toMatchObject({ code: 'fork' });
    expect(await server.models.ChangeLogEntry.count({ where: { deviceId: phone.deviceId } })).toBe(5);
  });

  it('after a fork the same operations from the new device id are answered as at first and not stored twice', async () => {
    const { phone } = phoneWithTree();
    const first = await push(there.crew, phone.request());
    const renamed = makeWireDevice(there.project.id, there.crew.id);
    for (const { opId, entity, recordId, kind, group, fields } of phone.made) renamed.make({ entity, recordId, kind, group }, { opId, fields });
    const second = await push(there.crew, renamed.request());
    expect(second.results).toEqual(first.results);
    expect(second).toMatchObject({ ackSeq: 5, ackHash: renamed.made[4]!.hash });
    expect(await server.models.ChangeLogEntry.count({ where: { deviceId: renamed.deviceId } })).toBe(0);
  });

  it('a gap is told with what is there', async () => {
    const { phone } = phoneWithTree();
    await push(there.crew, phone.request(1, 2));
    expect(await pushProblem(there.crew, phone.request(4))).toMatchObject({ code: 'gap', ackSeq: 2, ackHash: phone.made[1]!.hash });
  });

  it('another epoch is told with what is there, and nothing is stored', async () => {
    const { phone } = phoneWithTree();
    expect(await pushProblem(there.crew, phone.request(1, 5, 'an epoch long gone'))).toMatchObject({ code: 'epoch', ackSeq: 0, ackHash: GENESIS_HASH });
    expect(await server.models.Device.findByPk(phone.deviceId)).toBeNull();
  });

  it('nobody speaks for the device of the server', async () => {
    const meta = await server.models.ServerMeta.findByPk('server-device-id', { rejectOnEmpty: true });
    const device = await server.models.Device.findByPk(meta.value, { rejectOnEmpty: true });
    const liar = makeWireDevice(there.project.id, there.crew.id, meta.value);
    liar.make(makeTree(there).changes[0]!);
    expect(await pushProblem(there.crew, { ...liar.request(), firstSeq: device.lastSeq + 1 })).toMatchObject({ code: 'fork' });
  });
});

describe('what cannot be applied is kept aside, acknowledged, and stops nothing (rule 3)', () => {
  type Case = readonly [string, (there: SyncProject, tree: ReturnType<typeof makeTree>) => { change: Parameters<ReturnType<typeof makeWireDevice>['make']>[0]; overrides?: Partial<Operation> }, RegExp];
  const of = (tree: ReturnType<typeof makeTree>, entity: string) => tree.changes.find((change) => change.entity === entity)!;
  const withValues = (change: ReturnType<typeof of>, values: object) => ({ ...change, recordId: v7(), values: { ...change.values, ...values } });
  const cases: readonly Case[] = [
    ['unknown entity', (_, tree) => ({ change: { ...of(tree, 'tree'), entity: 'lichen' } }), /records of the kind "lichen"/],
    ['an entity named like a part of the language', (_, tree) => ({ change: { ...of(tree, 'tree'), entity: 'constructor' } }), /records of the kind/],
    ['unknown kind', (_, tree) => ({ change: { ...of(tree, 'tree'), kind: 'move' } }), /kind of change "move"/],
    ['unknown group', (_, tree) => ({ change: { ...remarks(tree.measurementId, 'x'), group: 'bark' } }), /group "bark"/],
    ['unknown field', (_, tree) => ({ change: withValues(of(tree, 'tree'), { bark: 1 }) }), /field "bark"/],
    ['newer schema', (_, tree) => ({ change: withValues(of(tree, 'tree'), {}), overrides: { schemaV: 2 } }), /newer version/],
    ['invalid value', (_, tree) => ({ change: withValues(of(tree, 'stemMeasurement'), { dbhCm: 'thick' }) }), /dbhCm/],
    ['DBH in a foreign unit', (_, tree) => ({ change: withValues(of(tree, 'stemMeasurement'), { dbhUnit: 'in' }) }), /dbhUnit is in, the project measures in cm/],
    ['height in a foreign unit', (_, tree) => ({ change: withValues(of(tree, 'stemMeasurement'), { heightUnit: 'ft' }) }), /heightUnit is ft, the project measures in m/],
    ['reading in a foreign unit', (_, tree) => ({ change: withValues(of(tree, 'reading'), { unit: 'in' }) }), /unit is in, the project measures in cm/],
    ['reading of a height in cm', (_, tree) => ({ change: withValues(of(tree, 'reading'), { quantity: 'height', unit: 'cm' }) }), /unit is cm, the project measures in m/],
    ['missing parent', (_, tree) => ({ change: withValues(of(tree, 'stem'), { treeId: v7() }) }), /tree that treeId names is not here/],
    ['missing record', () => ({ change: remarks(v7(), 'x') }), /is not here/],
    ['an office record', (p) => ({ change: { entity: 'plot', recordId: p.plot.id, kind: 'set', group: 'notes', values: { wayIn: 'by boat', hazardNote: '' } } }), /the office does/],
    ['a stranger as author', (_, tree) => ({ change: withValues(of(tree, 'tree'), {}), overrides: { authorId: v7() } }), /author/],
    ['not even the form of an operation', (_, tree) => ({ change: withValues(of(tree, 'tree'), {}), overrides: { wallClock: 7 as unknown as string } }), /not a whole operation: wallClock/],
    ['text that ends SQL', (_, tree) => ({ change: remarks(tree.measurementId, 'a\0b') }), /character that cannot be stored/],
    ['the id of another kind of record', (_, tree) => ({ change: { ...withValues(of(tree, 'tree'), {}), recordId: tree.visitId } }), /belongs to another record/],
  ];
  it.each(cases)('%s', async (_, make, reason) => {
    const { phone, measurementId, ...tree } = phoneWithTree();
    const { change, overrides } = make(there, { ...tree, measurementId });
    const bad = phone.make(change, overrides);
    phone.make(remarks(measurementId, 'after it'));
    const reply = await push(there.crew, phone.request());
    expect(reply.ackSeq).toBe(7);
    expect(reply.quarantined).toEqual([{ opId: bad.opId, reason: expect.stringMatching(reason) as string }]);
    expect((await measurement(measurementId)).remarks).toBe('after it');
    const entry = await logged(bad.opId);
    expect(entry).toMatchObject({ state: 'quarantined', hash: bad.hash });
    expect(JSON.parse(entry.raw)).toEqual(bad);
  });

  it('content that was changed after it was hashed (invariant 17)', async () => {
    const { phone, measurementId } = phoneWithTree();
    phone.made[3] = { ...phone.made[3]!, wallClock: '2026-06-02T08:00:00.000Z' };
    expect(hashOf(phone.made[3])).not.toBe(phone.made[3].hash);
    const reply = await push(there.crew, phone.request());
    expect(reply.results.map(({ state }) => state)).toEqual(['applied', 'applied', 'applied', 'quarantined', 'quarantined']);
    expect(await server.models.StemMeasurement.findByPk(measurementId)).toBeNull();
  });

  it('half a character, which has no hash at all', async () => {
    const { phone, measurementId } = phoneWithTree();
    const good = phone.make(remarks(measurementId, 'x'));
    phone.made[5] = { ...good, fields: { remarks: { old: '', new: 'a\ud83d' } } };
    expect((await push(there.crew, phone.request())).quarantined[0]?.reason).toMatch(/character that cannot be stored/);
  });

  it('operations for a project that the sender does not belong to change and show nothing there (invariant 18)', async () => {
    const stranger = await makeUser({ roles: { [(await makeSyncProject()).project.id]: 'crew' } });
    const { phone } = phoneWithTree();
    const reply = await push(stranger, phone.request());
    expect(reply.quarantined).toHaveLength(5);
    expect(await server.models.Visit.count({ where: { projectId: there.project.id } })).toBe(0);
    const seen = await pull(there.crew, there.project.id);
    expect(seen.changes.filter(({ deviceId }) => deviceId === phone.deviceId)).toEqual([]);
  });

  it('a record of another project is not changed through the own project (invariant 18)', async () => {
    const { phone, measurementId } = phoneWithTree();
    await push(there.crew, phone.request());
    const elsewhere = await makeSyncProject();
    const other = makeWireDevice(elsewhere.project.id, elsewhere.crew.id);
    other.make(remarks(measurementId, 'mine now'));
    expect((await push(elsewhere.crew, other.request())).quarantined[0]?.reason).toMatch(/another record/);
    expect((await measurement(measurementId)).remarks).toBe('');
  });

  it('an id used for something else before', async () => {
    const { phone, measurementId } = phoneWithTree();
    phone.make(remarks(measurementId, 'x'), { opId: phone.made[0]!.opId });
    const reply = await push(there.crew, phone.request());
    expect(reply.results[5]).toMatchObject({ state: 'quarantined', reason: 'Its id belongs to another operation.' });
  });
});

describe('two values (rule 4)', () => {
  async function twoPhones() {
    const { phone, measurementId } = phoneWithTree();
    const { cursor } = await push(there.crew, phone.request());
    const second = makeWireDevice(there.project.id, there.other.id);
    return { phone, second, measurementId, cursor };
  }
  const conflicts = (recordId: string) => server.models.Conflict.findAll({ where: { recordId } });

  it('a concurrent different value keeps what stands and opens one conflict with both (invariant 11)', async () => {
    const { phone, second, measurementId, cursor } = await twoPhones();
    const mine = phone.make(remarks(measurementId, 'forked'));
    await push(there.crew, phone.request(6));
    const theirs = second.make(remarks(measurementId, 'broken'), { baseCursor: cursor });
    const reply = await push(there.other, second.request());
    expect(reply.results[0]!.state).toBe('conflict');
    expect((await measurement(measurementId)).remarks).toBe('forked');
    const found = await conflicts(measurementId);
    expect(found).toHaveLength(1);
    expect(reply.conflicts).toEqual([found[0]!.id]);
    expect(found[0]).toMatchObject({ state: 'open', group: 'remarks', entity: 'stemMeasurement' });
    expect(found[0]!.candidates.map(({ opId, values, authorId }) => ({ opId, values, authorId }))).toEqual([
      { opId: mine.opId, values: { remarks: 'forked' }, authorId: there.crew.id }, { opId: theirs.opId, values: { remarks: 'broken' }, authorId: there.other.id },
    ]);
    const seen = await pull(there.crew, there.project.id, cursor);
    expect(seen.changes.map(({ entity, state }) => [entity, state])).toEqual([['stemMeasurement', 'applied'], ['stemMeasurement', 'conflict'], ['conflict', 'applied']]);
  });

  it('later values join the same conflict, also by the device whose value stands', async () => {
    const { phone, second, measurementId, cursor } = await twoPhones();
    phone.make(remarks(measurementId, 'forked'));
    await push(there.crew, phone.request(6));
    second.make(remarks(measurementId, 'broken'), { baseCursor: cursor });
    second.make(remarks(measurementId, 'broken top'), { baseCursor: cursor });
    await push(there.other, second.request());
    phone.make(remarks(measurementId, 'forked at 3 m'));
    await push(there.crew, phone.request(7));
    const found = await conflicts(measurementId);
    expect(found).toHaveLength(1);
    expect(found[0]!.candidates.map(({ values }) => values['remarks'])).toEqual(['forked', 'broken', 'broken top', 'forked at 3 m']);
    expect((await measurement(measurementId)).remarks).toBe('forked at 3 m');
  });

  it('equal or sequential values make none (invariant 12), and other groups do not touch each other', async () => {
    const { phone, second, measurementId, cursor } = await twoPhones();
    phone.make(remarks(measurementId, 'forked'));
    await push(there.crew, phone.request(6));
    second.make(remarks(measurementId, 'forked'), { baseCursor: cursor });
    second.make({ entity: 'stemMeasurement', recordId: measurementId, kind: 'set', group: 'stem', values: { status: 'dead', form: 'whole' } }, { baseCursor: cursor });
    second.make(remarks(measurementId, 'forked low'), { baseCursor: cursor + 1 });
    const reply = await push(there.other, second.request());
    expect(reply.results.map(({ state }) => state)).toEqual(['same', 'applied', 'applied']);
    expect(await conflicts(measurementId)).toEqual([]);
  });

  it('a delete does not hide an edit that it had not seen (invariant 13)', async () => {
    const { phone, second, measurementId, cursor } = await twoPhones();
    phone.make(remarks(measurementId, 'forked'));
    await push(there.crew, phone.request(6));
    second.make({ entity: 'stemMeasurement', recordId: measurementId, kind: 'delete', group: 'life' }, { baseCursor: cursor });
    await push(there.other, second.request());
    expect((await measurement(measurementId)).deleted).toBe(false);
    expect((await conflicts(measurementId)).map(({ group, candidates }) => [group, candidates.map(({ values }) => values['deleted'])])).toEqual([['life', [false, true]]]);
  });

  it('an edit that had not seen the delete brings the record back, flagged (invariant 13)', async () => {
    const { phone, second, measurementId, cursor } = await twoPhones();
    second.make({ entity: 'stemMeasurement', recordId: measurementId, kind: 'delete', group: 'life' }, { baseCursor: cursor });
    await push(there.other, second.request());
    expect((await measurement(measurementId)).deleted).toBe(true);
    phone.make(remarks(measurementId, 'forked'));
    await push(there.crew, phone.request(6));
    expect(await measurement(measurementId)).toMatchObject({ deleted: false, remarks: 'forked' });
    expect((await conflicts(measurementId)).map(({ group, state }) => [group, state])).toEqual([['life', 'open']]);
  });
});

describe('the log', () => {
  it('holds each device in seq order without gap (invariants 3 and 8), the server too', async () => {
    const rows = await server.models.ChangeLogEntry.findAll({ order: [['cursor', 'ASC']] });
    const seqs = new Map<string, number[]>();
    for (const { deviceId, seq } of rows) seqs.set(deviceId, [...(seqs.get(deviceId) ?? []), seq]);
    expect(seqs.size).toBeGreaterThan(5);
    for (const list of seqs.values()) expect(list).toEqual(list.map((_, i) => i + 1));
  });

  it('an empty or unreadable push is refused', async () => {
    expect((await post(there.crew, { v: 1 })).status).toBe(422);
  });
});
