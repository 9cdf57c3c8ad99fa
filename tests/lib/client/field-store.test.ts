import { IDBFactory, IDBKeyRange } from 'fake-indexeddb';
import { v7 } from 'uuid';
import { beforeEach, describe, expect, it } from 'vitest';
import { openFieldStore, syncStoreOf } from '@/lib/client/field-store';
import type { FieldStore } from '@/lib/client/field-store-types';
import type { RecordChange } from '@/lib/schema/record-change';
import { GENESIS_HASH } from '@/lib/schema/wire';
import { verifyChain } from '@/lib/sync/operation';

const projectId = v7();
const context = { projectId, authorId: v7() };
let indexedDB: IDBFactory;
let store: FieldStore;
const open = () => openFieldStore({ indexedDB, keyRange: IDBKeyRange });
beforeEach(async () => {
  indexedDB = new IDBFactory();
  store = await open();
});

function visit(id = v7()): RecordChange {
  return { entity: 'visit', recordId: id, kind: 'create', values: {
    id, projectId, deleted: false, plotId: v7(), kind: 'production', startedAt: '2026-06-01T08:00:00.000Z', measurerId: null, recorderId: null,
    state: 'open', outcome: null, outcomeNote: '', finishedAt: null,
  } };
}
const people = (recordId: string, measurerId: string | null): RecordChange => ({ entity: 'visit', recordId, kind: 'set', group: 'people', values: { measurerId } });

describe('the device store', () => {
  it('keeps its device id, and is a new device when its storage is found empty (rule 1)', async () => {
    expect((await open()).deviceId).toBe(store.deviceId);
    indexedDB = new IDBFactory();
    expect((await open()).deviceId).not.toBe(store.deviceId);
  });

  it('record, operation and seq are there together after opening again (invariants 1 and 2)', async () => {
    const change = visit();
    expect(await store.commit([change, people(change.recordId, context.authorId)], context)).toEqual({ firstSeq: 1, lastSeq: 2 });
    const again = await open();
    expect(await again.get('visit', change.recordId)).toMatchObject({ id: change.recordId, projectId, deleted: false, measurerId: context.authorId });
    expect((await again.queue()).unsent).toBe(2);
    expect((await again.queue(v7())).unsent).toBe(0);
  });

  it('nothing is kept of a save of which one change is wrong', async () => {
    const change = visit();
    await expect(store.commit([change, people(v7(), null)], context)).rejects.toThrow('is not here');
    await expect(store.commit([change, people(change.recordId, 'nobody')], context)).rejects.toThrow();
    expect(await store.get('visit', change.recordId)).toBeNull();
    expect((await store.queue()).unsent).toBe(0);
  });

  it('concurrent saves make one chain without gap or twin (invariant 3), each group whole with the values it replaces', async () => {
    const change = visit();
    await store.commit([change], context);
    const names = Array.from({ length: 8 }, () => v7());
    await Promise.all(names.map((name) => store.commit([people(change.recordId, name)], context)));
    const batch = await syncStoreOf(store).batch(500);
    expect(batch?.ops.map(({ seq }) => seq)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9]);
    expect(verifyChain(batch!.ops, GENESIS_HASH).ok).toBe(true);
    expect(batch!.ops[0]).toMatchObject({ group: '*', kind: 'create', fields: { state: { old: null, new: 'open' } } });
    expect(batch!.ops[2]!.fields).toEqual({ measurerId: { old: names[0], new: names[1] }, recorderId: { old: null, new: null } });
  });

  it('text that has no hash is saved without what spoils it', async () => {
    const change = visit();
    await store.commit([change, { entity: 'visit', recordId: change.recordId, kind: 'set', group: 'ending', values: { outcomeNote: 'fog\ud83d\0' } }], context);
    expect((await store.get('visit', change.recordId))?.outcomeNote).toBe('fog\ufffd');
  });

  it('a draft is put and removed with the save', async () => {
    const draft = { id: 'd', projectId, updatedAt: '2026-06-01T08:00:00.000Z', body: { digits: '31' } };
    await store.commit([visit()], context, { put: draft });
    expect(await store.draft('d')).toEqual(draft);
    await store.commit([visit()], context, { remove: 'd' });
    expect(await store.draft('d')).toBeNull();
  });

  it('remembers who signed in, and small settings', async () => {
    const identity = { userId: v7(), name: 'Odd Lien', email: 'odd@lammas.test', signedInAt: '2026-06-01T08:00:00.000Z', projects: [] };
    await store.setIdentity(identity);
    await store.setSetting('theme', 'dark');
    const again = await open();
    expect(await again.currentIdentity()).toEqual(identity);
    expect(await again.setting('theme')).toBe('dark');
    await again.setIdentity(null);
    expect(await again.currentIdentity()).toBeNull();
    expect(await again.identities()).toEqual([identity]);
  });

  it('tells listeners the project after each save, until they stop', async () => {
    const told: (string | null)[] = [];
    const stop = store.subscribe((project) => told.push(project));
    await store.commit([visit()], context);
    stop();
    await store.commit([visit()], context);
    expect(told).toEqual([projectId]);
  });

  it('a second try of a save that went through after all saves nothing twice', async () => {
    const { commitChanges } = await import('@/lib/client/commit-changes');
    const { FieldDatabase } = await import('@/lib/client/db');
    const db = new FieldDatabase(undefined, { indexedDB, IDBKeyRange });
    const input = { changes: [visit()], context, opIds: [v7()] };
    const first = await commitChanges(db, input);
    expect(await commitChanges(db, input)).toEqual(first);
    expect(await db.outbox.count()).toBe(1);
    db.close();
  });
});

describe('a new device id (rule 1: FORK)', () => {
  it('chains all operations anew under the same opIds, all unsent', async () => {
    await store.commit([visit(), visit()], context);
    const sync = syncStoreOf(store);
    const before = (await sync.batch(500))!;
    await sync.rename();
    const after = (await sync.batch(500))!;
    expect(after.deviceId).not.toBe(before.deviceId);
    expect(store.deviceId).toBe(after.deviceId);
    expect(after.ops.map(({ opId }) => opId)).toEqual(before.ops.map(({ opId }) => opId));
    expect(verifyChain(after.ops, GENESIS_HASH).ok).toBe(true);
    await store.commit([visit()], context);
    expect(verifyChain((await sync.batch(500))!.ops, GENESIS_HASH).ok).toBe(true);
  });
});
