import 'client-only';
import type { Change, PullReply, WorkPack } from '@/lib/schema/wire';
import { digestOf } from '@/lib/sync/digest';
import { applyToRow } from '@/lib/sync/merge';
import type { Row } from '@/lib/sync/merge';
import { readDevice } from './db';
import type { FieldDatabase, OutboxRow, RecordRow } from './db';

/** What a record looks like here: what the server has, with the own operations that it lacks, in their order. */
export function viewOf(base: Row | null, pending: readonly OutboxRow[]): Row | null {
  const inOrder = [...pending].sort((a, b) => a.seq - b.seq);
  return inOrder.reduce<Row | null>((row, { op }) => {
    if (row === null && op.kind !== 'create') return null;
    return applyToRow(row ?? { id: op.recordId, projectId: op.projectId }, op);
  }, base);
}

/** Stores records with their views. Inside a transaction over records and outbox. */
async function putRecords(db: FieldDatabase, rows: readonly Omit<RecordRow, 'view'>[]): Promise<void> {
  const own = await db.outbox.where('recordId').anyOf(rows.map(({ id }) => id)).toArray();
  const pending = new Map<string, OutboxRow[]>();
  for (const row of own) if (!row.absorbed) pending.set(row.recordId, [...(pending.get(row.recordId) ?? []), row]);
  const full = rows.map((row) => ({ ...row, view: viewOf(row.base, pending.get(row.id) ?? []) }));
  await db.records.bulkPut(full.filter(({ view }) => view !== null));
  await db.records.bulkDelete(full.filter(({ view }) => view === null).map(({ entity, id }): [string, string] => [entity, id]));
}

/** Computes views anew after own operations were absorbed. Inside a transaction over records and outbox. */
export async function refreshViews(db: FieldDatabase, keys: readonly [string, string][]): Promise<void> {
  const found = await db.records.bulkGet([...keys]);
  await putRecords(db, found.filter((row) => row !== undefined).map(({ view: _, ...row }) => row));
}

async function recordsOf(db: FieldDatabase, projectId: string): Promise<RecordRow[]> {
  return db.records.where('[projectId+entity]').between([projectId, ''], [projectId, '\uffff'], true, true).toArray();
}

async function markAbsorbed(db: FieldDatabase, rows: readonly OutboxRow[]): Promise<void> {
  await db.outbox.bulkPut(rows.map((row) => ({ ...row, absorbed: true })));
}

/**
 * Takes a fresh copy of a project in place of the one here, in one transaction. Own operations that the copy does not
 * hold yet stay in the view.
 */
export async function absorbPack(db: FieldDatabase, pack: WorkPack): Promise<void> {
  await db.transaction('rw', db.meta, db.packs, db.records, db.outbox, async () => {
    const device = await readDevice(db);
    const { projectId, cursor } = pack;
    await markAbsorbed(db, await db.outbox.filter((row) => !row.absorbed && row.cursor !== null && row.cursor <= cursor && row.op.projectId === projectId).toArray());
    const bases = new Map<string, Omit<RecordRow, 'view'>>(pack.records.map(({ entity, id, revision, row }) => [`${entity} ${id}`, { entity, id, projectId, base: row, revision }]));
    for (const { entity, id } of await recordsOf(db, projectId)) {
      if (!bases.has(`${entity} ${id}`)) bases.set(`${entity} ${id}`, { entity, id, projectId, base: null, revision: 0 });
    }
    await putRecords(db, [...bases.values()]);
    const project = pack.records.find(({ entity, id }) => entity === 'project' && id === projectId);
    const name = project?.row['name'];
    await db.packs.put({
      projectId, cursor, people: pack.people, fetchedAt: pack.generatedAt, name: typeof name === 'string' ? name : '', digest: null, stale: false,
    });
    if (device.epoch === null) await db.meta.put({ ...device, epoch: pack.epoch });
  });
}

/** Base records after applied changes; what is older than the base already has is skipped. */
async function changedBases(db: FieldDatabase, projectId: string, changes: readonly Change[]): Promise<Omit<RecordRow, 'view'>[]> {
  const keys = [...new Map(changes.map(({ entity, recordId }) => [`${entity} ${recordId}`, [entity, recordId] as [string, string]])).values()];
  const found = await db.records.bulkGet(keys);
  const bases = new Map<string, Omit<RecordRow, 'view'>>(keys.map(([entity, id], i) => {
    const row = found[i];
    return [`${entity} ${id}`, { entity, id, projectId, base: row?.base ?? null, revision: row?.revision ?? 0 }];
  }));
  for (const change of changes) {
    const key = `${change.entity} ${change.recordId}`;
    const row = bases.get(key);
    if (!row || change.state !== 'applied' || change.cursor <= row.revision) continue;
    if (row.base === null && change.kind !== 'create') continue;
    bases.set(key, { ...row, base: applyToRow(row.base ?? { id: change.recordId, projectId }, change), revision: change.cursor });
  }
  return [...bases.values()];
}

async function digestAgrees(db: FieldDatabase, { projectId, digest }: PullReply): Promise<boolean> {
  const records = await recordsOf(db, projectId);
  return digestOf(records.filter(({ base }) => base !== null)) === digest;
}

/**
 * Takes a page of changes that was asked for from `from` on, with the new cursor, in one transaction.
 * `ignored`: another tab was faster, or the project is gone. `diverged`: at the end this copy is not the server's.
 */
export async function absorbPage(db: FieldDatabase, from: number, page: PullReply): Promise<'taken' | 'ignored' | 'diverged'> {
  return db.transaction('rw', db.meta, db.packs, db.records, db.outbox, async () => {
    const pack = await db.packs.get(page.projectId);
    if (!pack || pack.stale || pack.cursor !== from) return 'ignored';
    const settled = page.changes.filter(({ state }) => state !== 'quarantined');
    const own = await db.outbox.where('opId').anyOf(settled.map(({ opId }) => opId)).toArray();
    await markAbsorbed(db, own.filter(({ absorbed }) => !absorbed));
    await putRecords(db, await changedBases(db, page.projectId, settled));
    const known = page.changes.length === 0 && page.digest === pack.digest;
    const agrees = page.digest === null || known || (await digestAgrees(db, page));
    await db.packs.put({ ...pack, cursor: page.cursor, digest: agrees ? page.digest : null, stale: !agrees });
    return agrees ? 'taken' : 'diverged';
  });
}
