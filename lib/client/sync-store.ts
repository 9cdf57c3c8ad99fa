import 'client-only';
import { v7 } from 'uuid';
import { GENESIS_HASH, WIRE_VERSION } from '@/lib/schema/wire';
import type { PushReply } from '@/lib/schema/wire';
import { makeOperation } from '@/lib/sync/operation';
import type { SyncStore } from '@/lib/sync/ports';
import { absorbPack, absorbPage, refreshViews } from './absorb';
import { readDevice } from './db';
import type { DeviceMeta, FieldDatabase, OutboxRow, QuarantinedRow } from './db';

/** Acknowledged operations stay this long, for a server that is restored from a backup. */
const KEEP_MS = 30 * 86_400_000;

/** Whether our chain has this hash at this place; what was pruned is known by what followed it. */
async function isOurs(db: FieldDatabase, device: DeviceMeta, seq: number, hash: string): Promise<boolean> {
  if (seq === device.lastSeq) return hash === device.lastHash;
  const own = await db.outbox.get(seq);
  if (own) return own.op.hash === hash;
  const next = await db.outbox.get(seq + 1);
  return (next?.op.prevHash ?? (seq === 0 ? GENESIS_HASH : null)) === hash;
}

async function prune(db: FieldDatabase, ackSeq: number): Promise<void> {
  const old: number[] = [];
  await db.outbox.orderBy('seq').until(({ seq, absorbed, ackedAt }) => seq >= ackSeq || !absorbed || ackedAt === null || Date.now() - Date.parse(ackedAt) < KEEP_MS)
    .each(({ seq }) => { old.push(seq); });
  if (old.length > 0) await db.outbox.bulkDelete(old);
}

async function acknowledge(db: FieldDatabase, reply: PushReply): Promise<'taken' | 'mismatch'> {
  return db.transaction('rw', [db.meta, db.packs, db.records, db.outbox, db.quarantined], async () => {
    const device = await readDevice(db);
    if (reply.ackSeq > device.lastSeq || !(await isOurs(db, device, reply.ackSeq, reply.ackHash))) return 'mismatch';
    const results = new Map(reply.results.map((result) => [result.opId, result]));
    const rows = await db.outbox.where('opId').anyOf([...results.keys()]).toArray();
    const cursors = new Map((await db.packs.toArray()).map(({ projectId, cursor }) => [projectId, cursor]));
    const now = new Date().toISOString();
    const caughtUp: [string, string][] = [];
    const aside: QuarantinedRow[] = [];
    const answered = rows.flatMap((row): OutboxRow[] => {
      const result = results.get(row.opId);
      if (!result || row.seq > reply.ackSeq) return [];
      const { op, recordId } = row;
      const kept = result.state === 'quarantined';
      if (kept) aside.push({ opId: row.opId, projectId: op.projectId, reason: result.reason ?? '', entity: op.entity, recordId });
      // The copy here may have passed that place already, when an earlier answer was lost.
      const absorbed = row.absorbed || (!kept && result.cursor <= (cursors.get(op.projectId) ?? 0));
      if (absorbed && !row.absorbed) caughtUp.push([op.entity, recordId]);
      return [{ ...row, cursor: result.cursor, absorbed, ackedAt: row.ackedAt ?? now }];
    });
    await db.outbox.bulkPut(answered);
    await db.quarantined.bulkPut(aside);
    await refreshViews(db, caughtUp);
    await db.meta.put({ ...device, ackSeq: Math.max(device.ackSeq, reply.ackSeq), epoch: reply.epoch });
    await prune(db, reply.ackSeq);
    return 'taken';
  });
}

async function rename(db: FieldDatabase): Promise<void> {
  await db.transaction('rw', db.meta, db.outbox, async () => {
    const device = await readDevice(db);
    const deviceId = v7();
    let hash = GENESIS_HASH;
    const rows = (await db.outbox.orderBy('seq').toArray()).map((row, i): OutboxRow => {
      const { prevHash: _p, hash: _h, ...content } = row.op;
      const op = makeOperation({ ...content, deviceId, seq: i + 1 } as Parameters<typeof makeOperation>[0], hash);
      hash = op.hash;
      return { ...row, seq: op.seq, op };
    });
    await db.outbox.clear();
    await db.outbox.bulkAdd(rows);
    await db.meta.put({ ...device, deviceId, lastSeq: rows.length, lastHash: hash, ackSeq: 0 });
  });
}

const rewind = (db: FieldDatabase): SyncStore['rewind'] => ({ code, epoch, ackSeq, ackHash }) =>
  db.transaction('rw', db.meta, db.packs, db.outbox, db.quarantined, async () => {
    const device = await readDevice(db);
    // Cursors of another epoch mean nothing: every copy is fetched anew, after what the server lacks was sent.
    if (code === 'epoch') {
      await db.packs.toCollection().modify({ stale: true, digest: null, cursor: 0 });
      await db.meta.put({ ...device, epoch });
    }
    const first = await db.outbox.orderBy('seq').first();
    const from = ackSeq === 0 && ackHash === GENESIS_HASH && first ? first.seq - 1 : ackSeq;
    const ours = from === ackSeq ? ackSeq <= device.lastSeq && (await isOurs(db, device, ackSeq, ackHash)) : code === 'epoch';
    if (!ours) return 'mismatch';
    const lacking = await db.outbox.where('seq').above(from).toArray();
    await db.outbox.bulkPut(lacking.map((row) => ({ ...row, cursor: null, absorbed: false, ackedAt: null })));
    await db.quarantined.bulkDelete(lacking.map(({ opId }) => opId));
    await db.meta.put({ ...device, epoch, ackSeq: from });
    return 'taken';
  });

/** What a sync session needs of the device's database. `changed` is told each project whose records changed, or null. */
export function makeSyncStore(db: FieldDatabase, changed: (projectId: string | null) => void): SyncStore {
  return {
    batch: async (limit) => {
      const device = await readDevice(db);
      const rows = await db.outbox.where('seq').above(device.ackSeq).limit(limit).toArray();
      const ops = rows.map(({ op }) => op);
      const [first] = ops;
      return first ? { v: WIRE_VERSION, deviceId: device.deviceId, epoch: device.epoch, firstSeq: first.seq, prevHash: first.prevHash, ops } : null;
    },
    acknowledge: async (reply) => {
      const outcome = await acknowledge(db, reply);
      changed(null);
      return outcome;
    },
    rename: async () => {
      await rename(db);
      changed(null);
    },
    rewind: rewind(db),
    projects: async () => (await db.packs.toArray()).map(({ projectId, cursor, stale }) => ({ projectId, cursor, stale })),
    absorbPage: async (from, page) => {
      const outcome = await absorbPage(db, from, page);
      if (page.changes.length > 0) changed(page.projectId);
      return outcome;
    },
    absorbPack: async (pack) => {
      await absorbPack(db, pack);
      changed(pack.projectId);
    },
    epoch: async () => (await readDevice(db)).epoch,
    finished: async () => {
      await db.transaction('rw', db.meta, async () => {
        await db.meta.put({ ...(await readDevice(db)), lastSyncAt: new Date().toISOString() });
      });
      changed(null);
    },
  };
}
