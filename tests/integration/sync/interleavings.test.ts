import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Candidate } from '@/lib/schema/conflict';
import { startTestServer } from '../../support/server';
import type { TestServer } from '../../support/server';
import { makeFieldDevice } from '../../support/field-device';
import type { FieldDevice, Network } from '../../support/field-device';
import { remarksChange, treeChanges } from '../../support/field-records';
import { makeSyncProject, pack } from '../../support/sync';

let server: TestServer;
beforeAll(async () => { server = await startTestServer(); });
afterAll(async () => server.close());

const fault = fc.constantFrom('none', 'none', 'request lost', 'reply lost', 'twice', 'portal', 'too big');
const action = fc.oneof(
  { weight: 1, arbitrary: fc.record({ kind: fc.constant('tree' as const), by: fc.nat(1) }) },
  { weight: 3, arbitrary: fc.record({ kind: fc.constant('edit' as const), by: fc.nat(1), at: fc.nat(5) }) },
  { weight: 1, arbitrary: fc.record({ kind: fc.constantFrom('delete' as const, 'restore' as const), by: fc.nat(1), at: fc.nat(5) }) },
  { weight: 3, arbitrary: fc.record({ kind: fc.constant('sync' as const), by: fc.nat(1), fault }) },
);
type Action = typeof action extends fc.Arbitrary<infer A> ? A : never;

function networkOf(kind: string): Network {
  return async (path, deliver) => {
    const hit = path.includes('push') || path.includes('pull');
    if (hit && kind === 'request lost') throw new TypeError('no connection');
    if (hit && kind === 'portal') return new Response('<html>Log in</html>', { headers: { 'content-type': 'text/html' } });
    if (path.includes('push') && kind === 'too big') return new Response(null, { status: 413 });
    const response = await deliver();
    if (hit && kind === 'reply lost') throw new TypeError('the connection was cut');
    return hit && kind === 'twice' ? deliver() : response;
  };
}

async function play(actions: readonly Action[]): Promise<void> {
  const there = await makeSyncProject();
  const people = [there.crew, there.other];
  const devices: FieldDevice[] = [];
  for (const person of people) {
    const device = await makeFieldDevice(person);
    await device.fetchPack(there.project.id);
    devices.push(device);
  }
  const written: { id: string; value: string }[] = [];
  let saved = 0;
  const commit = async (by: number, changes: Parameters<FieldDevice['store']['commit']>[0]) => {
    await devices[by]!.store.commit(changes, { projectId: there.project.id, authorId: people[by]!.id });
    saved += changes.length;
  };
  for (const [i, act] of actions.entries()) {
    const device = devices[act.by]!;
    if (act.kind === 'tree') {
      await commit(act.by, treeChanges(there, String(i)).changes);
    } else if (act.kind === 'sync') {
      device.network.now = networkOf(act.fault);
      await device.sync();
    } else {
      const known = (await device.store.list(there.project.id, 'stemMeasurement')).sort((a, b) => (a.id < b.id ? -1 : 1));
      const one = known[act.at % Math.max(1, known.length)];
      if (!one) continue;
      if (act.kind !== 'edit') {
        await commit(act.by, [{ entity: 'stemMeasurement', recordId: one.id, kind: act.kind }]);
        continue;
      }
      written.push({ id: one.id, value: `value ${i}` });
      await commit(act.by, [remarksChange(one.id, `value ${i}`)]);
      // Invariant 15: one's own edit is in the view at once.
      expect((await device.store.get('stemMeasurement', one.id))?.remarks).toBe(`value ${i}`);
    }
  }

  // Invariant 20: once the faults stop, three rounds are enough.
  for (let round = 0; round < 3; round += 1) {
    for (const device of devices) {
      device.network.now = (_, deliver) => deliver();
      await device.sync();
    }
  }
  const { records } = await pack(there.crew, there.project.id);
  const rows = records.map(({ row }) => row).sort((a, b) => (String(a['id']) < String(b['id']) ? -1 : 1));
  for (const device of devices) {
    expect(device.engine.state).toMatchObject({ phase: 'idle', problem: null });
    expect(await device.store.queue()).toMatchObject({ unsent: 0, quarantined: [] });
    expect(await device.view(there.project.id)).toEqual(rows);
    expect(device.log).toEqual([]);
  }
  // Invariant 6: what was shown as saved is in the log, once.
  const log = await server.models.ChangeLogEntry.findAll({ where: { projectId: there.project.id, deviceId: devices.map(({ store }) => store.deviceId) } });
  expect(log).toHaveLength(saved);
  // Invariant 10: every value is current, was seen by who replaced it, or is a candidate.
  const conflicts = rows.filter((row) => 'candidates' in row);
  for (const { id, value } of written) {
    const current = rows.find((row) => row['id'] === id)?.['remarks'] === value;
    const seen = log.some(({ recordId, fields }) => recordId === id && fields['remarks']?.old === value);
    const candidate = conflicts.some((row) => row['recordId'] === id && (row['candidates'] as unknown as Candidate[]).some(({ values }) => values['remarks'] === value));
    expect(current || seen || candidate, `${value} of ${id}`).toBe(true);
  }
  // Invariant 11: at most one conflict for a group of a record.
  const groups = conflicts.map((row) => `${String(row['recordId'])} ${String(row['group'])}`);
  expect(new Set(groups).size).toBe(groups.length);
}

describe('two devices, any order of saves, syncs and faults', () => {
  it('agree with the server within three rounds, and nothing that a person saved is lost (invariants 6, 9, 10, 11, 15, 20)', async () => {
    await fc.assert(fc.asyncProperty(fc.array(action, { minLength: 5, maxLength: 25 }), play), { numRuns: 30, endOnFailure: false });
  }, 300_000);
});
