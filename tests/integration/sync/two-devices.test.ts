import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { syncStoreOf } from '@/lib/client/field-store';
import { digestOf } from '@/lib/sync/digest';
import { startTestServer } from '../../support/server';
import type { TestServer } from '../../support/server';
import { makeFieldDevice } from '../../support/field-device';
import type { FieldDevice } from '../../support/field-device';
import { remarksChange, treeChanges } from '../../support/field-records';
import { makeSyncProject, pack } from '../../support/sync';
import type { SyncProject } from '../../support/sync';

let server: TestServer;
let there: SyncProject;
let mine: FieldDevice;
let theirs: FieldDevice;
beforeAll(async () => { server = await startTestServer(); });
afterAll(async () => server.close());
beforeEach(async () => {
  there = await makeSyncProject();
  mine = await makeFieldDevice(there.crew);
  theirs = await makeFieldDevice(there.other);
  await mine.fetchPack(there.project.id);
  await theirs.fetchPack(there.project.id);
});

const context = () => ({ projectId: there.project.id, authorId: there.crew.id });
async function saveTree(device: FieldDevice, tag: string, dbhCm?: number): Promise<string> {
  const { changes, measurementId } = treeChanges(there, tag, dbhCm);
  await device.store.commit(changes, { projectId: there.project.id, authorId: device === mine ? there.crew.id : there.other.id });
  return measurementId;
}
const remarksOn = async (device: FieldDevice, id: string) => (await device.store.get('stemMeasurement', id))?.remarks;
const unsent = async (device: FieldDevice) => (await device.store.queue()).unsent;

/** Rule 9, invariant 9: at rest both phones see what the server has, with nothing left to send. */
async function expectAgreement(...devices: FieldDevice[]): Promise<void> {
  const { records } = await pack(there.crew, there.project.id);
  const rows = records.map(({ row }) => row).sort((a, b) => (String(a['id']) < String(b['id']) ? -1 : 1));
  for (const device of devices) {
    expect(device.engine.state).toMatchObject({ phase: 'idle', problem: null });
    expect(await unsent(device)).toBe(0);
    expect(await device.view(there.project.id)).toEqual(rows);
    const held = (await syncStoreOf(device.store).projects()).find(({ projectId }) => projectId === there.project.id);
    expect(held?.stale).toBe(false);
  }
  expect(digestOf(records)).toMatch(/^[0-9a-f]{64}$/);
}

describe('two devices on one project', () => {
  it('exchange their plots and end with equal digests', async () => {
    await saveTree(mine, '1');
    await saveTree(theirs, '2', 18.2);
    expect(await mine.store.list(there.project.id, 'tree')).toHaveLength(1);
    await mine.sync();
    await theirs.sync();
    await mine.sync();
    await expectAgreement(mine, theirs);
    expect((await mine.store.list(there.project.id, 'tree')).map(({ tag }) => tag).sort((a, b) => a.localeCompare(b))).toEqual(['1', '2']);
    expect(mine.log).toEqual([]);
  });

  it('two values for one group end as one flagged record that both see, and one\'s own edit is never gone before', async () => {
    const id = await saveTree(mine, '1');
    await mine.sync();
    await theirs.sync();
    await mine.store.commit([remarksChange(id, 'forked')], context());
    await theirs.store.commit([remarksChange(id, 'broken')], { ...context(), authorId: there.other.id });
    await mine.sync();
    expect(await remarksOn(theirs, id)).toBe('broken');
    await theirs.sync();
    await mine.sync();
    await expectAgreement(mine, theirs);
    for (const device of [mine, theirs]) {
      expect(device.log).toEqual([]);
      expect(await remarksOn(device, id)).toBe('forked');
      expect(await device.store.list(there.project.id, 'conflict')).toMatchObject([{ recordId: id, group: 'remarks', state: 'open' }]);
    }
  });

  it('a lost acknowledgement loses and doubles nothing', async () => {
    await saveTree(mine, '1');
    mine.network.now = async (path, deliver) => {
      const response = await deliver();
      if (path.includes('push')) throw new TypeError('the connection was cut');
      return response;
    };
    await mine.sync();
    expect(mine.engine.state).toMatchObject({ phase: 'backing-off', problem: 'offline' });
    expect(await unsent(mine)).toBe(5);
    mine.network.now = (_, deliver) => deliver();
    await mine.sync();
    await expectAgreement(mine);
    expect(await server.models.ChangeLogEntry.count({ where: { deviceId: mine.store.deviceId } })).toBe(5);
  });

  it('a page refetched while an acknowledgement was lost does not undo or double the own edit', async () => {
    const id = await saveTree(mine, '1');
    mine.network.now = async (path, deliver) => {
      const response = await deliver();
      if (path.includes('push')) throw new TypeError('the connection was cut');
      return response;
    };
    await mine.sync();
    mine.network.now = (_, deliver) => deliver();
    await mine.fetchPack(there.project.id);
    expect(await remarksOn(mine, id)).toBe('');
    await mine.sync();
    await expectAgreement(mine);
  });

  it('an edit that became one of two values while its answer was lost leaves the value that stands', async () => {
    const id = await saveTree(mine, '1');
    await mine.sync();
    await theirs.sync();
    await theirs.store.commit([remarksChange(id, 'broken')], { ...context(), authorId: there.other.id });
    await theirs.sync();
    await mine.store.commit([remarksChange(id, 'forked')], context());
    mine.network.now = async (path, deliver) => {
      const response = await deliver();
      if (path.includes('push')) throw new TypeError('the connection was cut');
      return response;
    };
    await mine.sync();
    mine.network.now = (_, deliver) => deliver();
    await mine.fetchPack(there.project.id);
    expect(await remarksOn(mine, id)).toBe('forked');
    await mine.sync();
    expect(await remarksOn(mine, id)).toBe('broken');
    await expectAgreement(mine);
  });

  it('a duplicated batch, at once or late, changes nothing (invariant 5)', async () => {
    await saveTree(mine, '1');
    const kept: (() => Promise<Response>)[] = [];
    mine.network.now = async (path, deliver) => {
      if (!path.includes('push')) return deliver();
      kept.push(deliver);
      await deliver();
      return deliver();
    };
    await mine.sync();
    await saveTree(mine, '2');
    await mine.sync();
    await Promise.all(kept.map((deliver) => deliver()));
    await mine.sync();
    await expectAgreement(mine);
    expect(await server.models.ChangeLogEntry.count({ where: { deviceId: mine.store.deviceId } })).toBe(10);
  });

  it.each([
    ['HTML', '<html>Welcome to Forest Lodge Wi-Fi</html>', 'text/html'],
    ['JSON', '{"ok":true}', 'application/json'],
  ])('a portal\'s 200 with %s does not clear the outbox (rule 3)', async (_, body, type) => {
    await saveTree(mine, '1');
    mine.network.now = () => Promise.resolve(new Response(body, { headers: { 'content-type': type } }));
    await mine.sync();
    expect(mine.engine.state).toMatchObject({ phase: 'backing-off', problem: 'not-ours' });
    // Even one that lets the question for the server's health through.
    mine.network.now = (path, deliver) => (path.includes('health') ? deliver() : Promise.resolve(new Response(body, { headers: { 'content-type': type } })));
    await mine.sync();
    expect(await unsent(mine)).toBe(5);
    mine.network.now = (path, deliver) => deliver();
    await mine.sync();
    await expectAgreement(mine);
  });

  it('an acknowledgement whose hash is not ours clears nothing: the device takes a new id and sends again (invariant 7)', async () => {
    await saveTree(mine, '1');
    const before = mine.store.deviceId;
    let lies = 1;
    mine.network.now = async (path, deliver) => {
      const response = await deliver();
      if (!path.includes('push') || lies === 0) return response;
      lies -= 1;
      return Response.json({ ...(await response.json() as object), ackHash: 'f'.repeat(64) });
    };
    await mine.sync();
    expect(mine.store.deviceId).not.toBe(before);
    await expectAgreement(mine);
    expect(await server.models.ChangeLogEntry.count({ where: { projectId: there.project.id, entity: 'tree' } })).toBe(1);
  });

  it('413 sends smaller batches until they fit (rule 3)', async () => {
    await saveTree(mine, '1');
    await saveTree(mine, '2');
    const sizes: number[] = [];
    mine.network.now = async (path, deliver) => {
      if (!path.includes('push')) return deliver();
      const limit = mine.engine.state.limit;
      if (limit > 3) return new Response(null, { status: 413 });
      sizes.push(limit);
      return deliver();
    };
    await mine.sync();
    expect(sizes.every((size) => size <= 3)).toBe(true);
    mine.network.now = (_, deliver) => deliver();
    await mine.sync();
    await expectAgreement(mine);
  });

  it('what is kept aside is told with its reason, stays on the own screen, and stops nothing', async () => {
    const { changes, measurementId } = treeChanges(there, '1');
    await mine.store.commit(changes.map((change) => (change.entity === 'stemMeasurement' && 'values' in change ? { ...change, values: { ...change.values, dbhUnit: 'in' } } as typeof change : change)), context());
    await saveTree(mine, '2');
    await mine.sync();
    const queue = await mine.store.queue(there.project.id);
    expect(queue.unsent).toBe(0);
    expect(queue.quarantined.map(({ entity }) => entity)).toEqual(['stemMeasurement', 'reading']);
    expect(queue.quarantined[0]?.reason).toMatch(/dbhUnit is in/);
    expect((await mine.store.get('stemMeasurement', measurementId))?.dbhUnit).toBe('in');
    expect(mine.engine.state.phase).toBe('idle');
  });

  it('a restored server gets again what it lacks, and both devices agree with it (rule 3: epoch)', async () => {
    await saveTree(mine, '1');
    await mine.sync();
    await saveTree(mine, '2');
    await mine.sync();
    await theirs.sync();
    // The backup is from before the second tree.
    const rows = await server.models.ChangeLogEntry.findAll({ where: { deviceId: mine.store.deviceId }, order: [['seq', 'ASC']] });
    const fifth = rows[4]!;
    for (const table of ['applied_operations', 'record_groups', 'readings', 'stem_measurements', 'stems', 'trees', 'visits', 'change_log']) {
      const column = { applied_operations: 'cursor', record_groups: 'last_cursor', change_log: 'cursor' }[table] ?? 'revision';
      await server.sequelize.query(`DELETE FROM ${table} WHERE ${column} > ${fifth.cursor}`);
    }
    await server.sequelize.query(`UPDATE sqlite_sequence SET seq = ${fifth.cursor} WHERE name = 'change_log'`);
    await server.models.Device.update({ lastSeq: 5, lastHash: fifth.hash }, { where: { id: mine.store.deviceId } });
    await server.models.ServerMeta.update({ value: `restored ${fifth.cursor}` }, { where: { key: 'epoch' } });
    await theirs.sync();
    await mine.sync();
    await theirs.sync();
    await expectAgreement(mine, theirs);
    expect(await theirs.store.list(there.project.id, 'tree')).toHaveLength(2);
    // By the epoch, not by a digest that happened to differ.
    expect([...mine.log, ...theirs.log]).toEqual([]);
  });

  it('a wrong copy is noticed by the digest and fetched anew by itself (rule 5)', async () => {
    await saveTree(theirs, '1');
    await theirs.sync();
    await mine.sync();
    const { FieldDatabase } = await import('@/lib/client/db');
    const { IDBKeyRange } = await import('fake-indexeddb');
    const db = new FieldDatabase(undefined, { indexedDB: mine.indexedDB, IDBKeyRange });
    await db.records.where('[projectId+entity]').equals([there.project.id, 'tree']).delete();
    db.close();
    await saveTree(theirs, '2');
    await theirs.sync();
    await mine.sync();
    expect(mine.log.some((line) => line.includes('differs from the server'))).toBe(true);
    await expectAgreement(mine, theirs);
  });
});
