import 'client-only';
import { v7 } from 'uuid';
import type { EntityName, EntityRecord } from '@/lib/schema/entities';
import { GENESIS_HASH } from '@/lib/schema/wire';
import type { SyncStore } from '@/lib/sync/ports';
import { commitChanges } from './commit-changes';
import { DATABASE_NAME, FieldDatabase, readDevice } from './db';
import type { FieldStore, QueueState } from './field-store-types';
import { guarded } from './guard';
import { makeSyncStore } from './sync-store';

export type OpenOptions = {
  readonly name?: string;
  /** Another implementation of the browser's database, for tests. */
  readonly indexedDB?: IDBFactory;
  readonly keyRange?: typeof IDBKeyRange;
};

const syncStores = new WeakMap<FieldStore, SyncStore>();

/** What a sync session needs of an opened store. */
export function syncStoreOf(store: FieldStore): SyncStore {
  const found = syncStores.get(store);
  if (!found) throw new Error('This store was not opened by openFieldStore.');
  return found;
}

/** A device keeps its id for as long as its storage lasts; found empty, it is a new device. */
async function setUp(db: FieldDatabase): Promise<string> {
  if (!(await db.meta.get('device')) && typeof navigator !== 'undefined') await navigator.storage?.persist?.().catch(() => false);
  return db.transaction('rw', db.meta, async () => {
    const known = await db.meta.get('device');
    if (known?.key === 'device') return known.deviceId;
    const deviceId = v7();
    await db.meta.add({ key: 'device', deviceId, lastSeq: 0, lastHash: GENESIS_HASH, ackSeq: 0, epoch: null, lastSyncAt: null });
    return deviceId;
  });
}

async function queueOf(db: FieldDatabase, projectId: string | undefined): Promise<QueueState> {
  return db.transaction('r', db.meta, db.outbox, db.quarantined, async () => {
    const { ackSeq, lastSyncAt } = await readDevice(db);
    const unsent = db.outbox.where('seq').above(ackSeq);
    const mine = (row: { readonly projectId: string }) => projectId === undefined || row.projectId === projectId;
    const quarantined = (await db.quarantined.toArray()).filter(mine).map(({ opId, reason, entity, recordId }) => ({ opId, reason, entity, recordId }));
    return { unsent: await (projectId === undefined ? unsent : unsent.filter(({ op }) => mine(op))).count(), lastSyncAt, quarantined };
  });
}

/** Opens the device's store, making it at the first run. Errors: the browser's own, or StorageHungError. */
export async function openFieldStore({ name = DATABASE_NAME, indexedDB, keyRange }: OpenOptions = {}): Promise<FieldStore> {
  const db = new FieldDatabase(name, indexedDB && keyRange ? { indexedDB, IDBKeyRange: keyRange } : {});
  let deviceId = await guarded(db, () => setUp(db));
  const listeners = new Set<(projectId: string | null) => void>();
  const changed = (projectId: string | null) => {
    for (const listener of listeners) listener(projectId);
  };
  const run = <T>(call: () => PromiseLike<T>) => guarded(db, call);
  const sync = makeSyncStore(db, changed);

  const store: FieldStore = {
    get deviceId() { return deviceId; },
    commit: async (changes, context, draft) => {
      const opIds = changes.map(() => v7());
      const result = await run(() => commitChanges(db, { changes, context, draft, opIds }));
      changed(context.projectId);
      return result;
    },
    list: <E extends EntityName>(projectId: string, entity: E) => run(async () => {
      const rows = await db.records.where('[projectId+entity]').equals([projectId, entity]).toArray();
      return rows.flatMap(({ view }) => (view === null ? [] : [view as unknown as EntityRecord[E]]));
    }),
    get: <E extends EntityName>(entity: E, id: string) => run(async () => ((await db.records.get([entity, id]))?.view ?? null) as unknown as EntityRecord[E] | null),
    subscribe: (listener) => {
      listeners.add(listener);
      return () => { listeners.delete(listener); };
    },
    identities: () => run(() => db.identities.toArray()),
    currentIdentity: () => run(async () => {
      const current = await db.meta.get('identity');
      return current?.key === 'identity' && current.userId !== null ? ((await db.identities.get(current.userId)) ?? null) : null;
    }),
    setIdentity: (identity) => run(() => db.transaction('rw', db.meta, db.identities, async () => {
      if (identity) await db.identities.put(identity);
      await db.meta.put({ key: 'identity', userId: identity?.userId ?? null });
    })),
    savePack: (pack) => run(() => sync.absorbPack(pack)),
    packs: () => run(async () => (await db.packs.toArray()).map(({ projectId, name: title, fetchedAt, cursor, people }) => ({ projectId, name: title, fetchedAt, cursor, people }))),
    saveDraft: (draft) => run(async () => { await db.drafts.put(draft); }),
    draft: (id) => run(async () => (await db.drafts.get(id)) ?? null),
    removeDraft: (id) => run(() => db.drafts.delete(id)),
    queue: (projectId) => run(() => queueOf(db, projectId)),
    setting: (key) => run(async () => (await db.settings.get(key))?.value ?? null),
    setSetting: (key, value) => run(async () => { await db.settings.put({ key, value }); }),
  };
  const renaming: SyncStore = {
    ...sync,
    rename: async () => {
      await sync.rename();
      ({ deviceId } = await readDevice(db));
    },
  };
  syncStores.set(store, renaming);
  return store;
}
