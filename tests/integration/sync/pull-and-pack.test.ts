import { v7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { pullReplySchema, workPackSchema } from '@/lib/schema/wire';
import type { Change } from '@/lib/schema/wire';
import { recordChanges } from '@/lib/server/log/record-changes';
import { write } from '@/lib/server/write-queue';
import { digestOf } from '@/lib/sync/digest';
import { verifyChain } from '@/lib/sync/operation';
import { startTestServer } from '../../support/server';
import type { TestServer } from '../../support/server';
import { makeSyncProject, makeTree, makeWireDevice, pack, pull, push } from '../../support/sync';
import type { SyncProject } from '../../support/sync';

let server: TestServer;
let there: SyncProject;
beforeAll(async () => {
  server = await startTestServer();
  there = await makeSyncProject();
});
afterAll(async () => server.close());

describe('pull (rule 5)', () => {
  it('pages of any size give every change once, in commit order, and the digest at the end (invariant 14)', async () => {
    const phone = makeWireDevice(there.project.id, there.crew.id);
    for (const change of makeTree(there).changes) phone.make(change);
    await push(there.crew, phone.request());
    const whole = await pull(there.crew, there.project.id);
    expect(whole.more).toBe(false);
    const changes: Change[] = [];
    let cursor = 0;
    for (let more = true; more;) {
      const page = await pull(there.crew, there.project.id, cursor, 3);
      expect(pullReplySchema.parse(page)).toEqual(page);
      expect(page.digest === null).toBe(page.more);
      changes.push(...page.changes);
      ({ cursor, more } = page);
    }
    expect(changes).toEqual(whole.changes);
    expect(changes).toHaveLength(8);
    const { records } = await pack(there.crew, there.project.id);
    expect(whole.digest).toBe(digestOf(records));
    expect(cursor).toBe(whole.cursor);
  });
});

describe('the work pack', () => {
  it('holds every record of the project as it stands, its people, and nothing of another project', async () => {
    const elsewhere = await makeSyncProject({ name: 'Saltmere' });
    const got = await pack(there.crew, there.project.id);
    expect(workPackSchema.parse(got)).toEqual(got);
    expect(got.people.map(({ name, role }) => [name, role])).toEqual([['Ada Rush', 'crew'], ['Odd Lien', 'crew'], ['Tove Marsh', 'analyst']]);
    expect(got.records.filter(({ entity }) => entity === 'plot').map(({ row }) => row)).toEqual([there.plot]);
    expect(JSON.stringify(got)).not.toContain(elsewhere.project.id);
    expect(got.cursor).toBe((await pull(there.crew, there.project.id)).cursor);
  });
});

describe('changes by the office', () => {
  it('go through the log under the device of the server, chained, and reach a device by pull', async () => {
    const before = await pull(there.crew, there.project.id);
    const values = { wayIn: 'by the mill' };
    await write((context) => recordChanges(context, [{ entity: 'plot', recordId: there.plot.id, kind: 'set', group: 'notes', values }], { projectId: there.project.id, authorId: there.analyst.id, reason: 'told by phone' }));
    const { changes } = await pull(there.crew, there.project.id, before.cursor);
    expect(changes).toMatchObject([{ kind: 'set', group: 'notes', reason: 'told by phone', authorId: there.analyst.id, fields: { wayIn: { old: '', new: 'by the mill' }, hazardNote: { old: '', new: '' } } }]);
    const meta = await server.models.ServerMeta.findByPk('server-device-id', { rejectOnEmpty: true });
    const log = await server.models.ChangeLogEntry.findAll({ where: { deviceId: meta.value }, order: [['seq', 'ASC']] });
    const device = await server.models.Device.findByPk(meta.value, { rejectOnEmpty: true });
    expect(verifyChain(log.map(({ raw }) => JSON.parse(raw) as never), '0'.repeat(64))).toEqual({ ok: true, hash: device.lastHash });
    expect(device.lastSeq).toBe(log.length);
  });

  it('are given up whole when one value is wrong', async () => {
    const before = (await pull(there.crew, there.project.id)).cursor;
    const bad = write((context) => recordChanges(context, [
      { entity: 'plot', recordId: there.plot.id, kind: 'set', group: 'notes', values: { wayIn: 'x' } },
      { entity: 'stratum', recordId: there.stratum.id, kind: 'set', group: 'design', values: { areaHa: -1 } },
    ], { projectId: there.project.id, authorId: there.analyst.id }));
    await expect(bad).rejects.toThrow('areaHa');
    expect((await pull(there.crew, there.project.id)).cursor).toBe(before);
  });

  it('5,000 records take seconds, not minutes, and doubles come back to the last bit', async () => {
    const big = await makeSyncProject();
    const strata = Array.from({ length: 5000 }, (_, i) => ({ projectId: big.project.id, deleted: false, id: v7(), name: `S ${i}`, areaHa: Math.exp(Math.sin(i) * 20) }));
    const start = performance.now();
    await write((context) => recordChanges(context, strata.map((values) => ({ entity: 'stratum', recordId: values.id, kind: 'create', values })), { projectId: big.project.id, authorId: big.analyst.id }));
    const seconds = (performance.now() - start) / 1000;
    expect(seconds).toBeLessThan(30);
    const stored = new Map((await server.models.Stratum.findAll({ where: { projectId: big.project.id } })).map(({ id, areaHa }) => [id, areaHa]));
    expect(strata.filter(({ id, areaHa }) => stored.get(id) !== areaHa)).toEqual([]);
    console.info(`5,000 changes recorded in ${seconds.toFixed(1)} s`);
  });
});
