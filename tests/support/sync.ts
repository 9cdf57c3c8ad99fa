import { v7 } from 'uuid';
import type { Json } from '@/lib/schema/common';
import type { Plot, SpeciesEntry, Stratum } from '@/lib/schema/design';
import type { Project } from '@/lib/schema/project';
import { GENESIS_HASH, WIRE_VERSION } from '@/lib/schema/wire';
import type { Operation, PullReply, PushProblem, PushReply, PushRequest, WorkPack } from '@/lib/schema/wire';
import { recordChanges } from '@/lib/server/log/record-changes';
import { write } from '@/lib/server/write-queue';
import { makeOperation } from '@/lib/sync/operation';
import { makeProject, makeUser, routeContext, signedInRequest } from './server';
import type { TestUser } from './server';

/** A project with one stratum, one plot and one species, written by its analyst through the log; two people of a crew. */
export async function makeSyncProject(values: Partial<Project> = {}) {
  const project = await makeProject(values);
  const analyst = await makeUser({ name: 'Tove Marsh', roles: { [project.id]: 'analyst' } });
  const crew = await makeUser({ name: 'Odd Lien', roles: { [project.id]: 'crew' } });
  const other = await makeUser({ name: 'Ada Rush', roles: { [project.id]: 'crew' } });
  const base = { projectId: project.id, deleted: false };
  const stratum: Stratum = { ...base, id: v7(), name: 'Upper slope', areaHa: 120 };
  const plot: Plot = { ...base, id: v7(), stratumId: stratum.id, number: '12', plannedLat: null, plannedLon: null, wayIn: '', hazardNote: '' };
  const species: SpeciesEntry = {
    ...base, id: v7(), code: 'PA', localName: 'Spruce', scientificName: 'Picea abies', curveGroup: 'spruce', unknown: false, position: 0,
  };
  await write((context) => recordChanges(context, [
    { entity: 'stratum', recordId: stratum.id, kind: 'create', values: stratum },
    { entity: 'plot', recordId: plot.id, kind: 'create', values: plot },
    { entity: 'speciesEntry', recordId: species.id, kind: 'create', values: species },
  ], { projectId: project.id, authorId: analyst.id }));
  return { project, analyst, crew, other, stratum, plot, species };
}
export type SyncProject = Awaited<ReturnType<typeof makeSyncProject>>;

export type MadeChange = { readonly entity: string; readonly recordId: string; readonly kind: string; readonly group: string; readonly values?: Readonly<Record<string, Json>> };

/** A device as far as the wire sees it: it numbers and chains operations. */
export function makeWireDevice(projectId: string, authorId: string, deviceId = v7()) {
  const made: Operation[] = [];
  return {
    deviceId, made,
    make({ values = {}, ...change }: MadeChange, overrides: Partial<Operation> = {}): Operation {
      const op = makeOperation({
        opId: v7(), deviceId, seq: made.length + 1, projectId, authorId, reason: null, baseCursor: 0, schemaV: 1, appV: 'test',
        wallClock: '2026-06-01T08:00:00.000Z', monotonicMs: 1, ...change,
        fields: Object.fromEntries(Object.entries(values).map(([name, value]) => [name, { old: null, new: value }])), ...overrides,
      }, made.at(-1)?.hash ?? GENESIS_HASH);
      made.push(op);
      return op;
    },
    request(firstSeq = 1, lastSeq = made.length, epoch: string | null = null): PushRequest {
      return { v: WIRE_VERSION, deviceId, epoch, firstSeq, prevHash: firstSeq === 1 ? GENESIS_HASH : made[firstSeq - 2]!.hash, ops: made.slice(firstSeq - 1, lastSeq) };
    },
  };
}

/** The values of a visit, a tree with a stem, and a measurement with its reading, as a device makes them. */
export function makeTree({ project, plot, species, crew }: SyncProject, tag = '1', dbhCm = 31.5): { visitId: string; measurementId: string; changes: MadeChange[] } {
  const [visitId, treeId, stemId, measurementId, readingId] = [v7(), v7(), v7(), v7(), v7()];
  const create = (entity: string, recordId: string, values: Readonly<Record<string, Json>>): MadeChange => ({ entity, recordId, kind: 'create', group: '*', values });
  const digits = String(dbhCm);
  return {
    visitId, measurementId, changes: [
      create('visit', visitId, {
        plotId: plot.id, kind: 'production', startedAt: '2026-06-01T08:00:00.000Z', measurerId: crew.id, recorderId: crew.id, state: 'open',
        outcome: null, outcomeNote: '', finishedAt: null,
      }),
      create('tree', treeId, { plotId: plot.id, firstVisitId: visitId, tag }),
      create('stem', stemId, { treeId, label: 'A' }),
      create('stemMeasurement', measurementId, {
        visitId, stemId, order: 1, status: 'live', form: 'whole', speciesId: species.id, dbhDigits: digits, dbhUnit: project.dbhUnit, dbhCm,
        dbhReadingIds: [readingId], heightDigits: null, heightUnit: null, heightM: null, heightReadingIds: [], heightMethod: null, remarks: '',
      }),
      create('reading', readingId, {
        measurementId, quantity: 'dbh', digits, unit: project.dbhUnit, canonical: dbhCm, origin: 'first', instrument: null,
        measurerId: crew.id, recorderId: crew.id, takenAt: '2026-06-01T08:01:00.000Z',
      }),
    ],
  };
}

async function ask<T>(response: Response): Promise<T> {
  if (!response.ok) throw new Error(`${response.status} ${await response.text()}`);
  return (await response.json()) as T;
}

/** Sends by the route itself, as the person. */
export async function post(user: Pick<TestUser, 'id'>, body: unknown): Promise<Response> {
  const { POST } = await import('@/app/api/sync/push/route');
  return POST(await signedInRequest(user, '/api/sync/push', { method: 'POST', body: JSON.stringify(body), headers: { 'content-type': 'application/json' } }), routeContext());
}

export async function push(user: Pick<TestUser, 'id'>, body: unknown): Promise<PushReply> {
  return ask<PushReply>(await post(user, body));
}

export async function pushProblem(user: Pick<TestUser, 'id'>, body: unknown): Promise<PushProblem & { status: number }> {
  return (await (await post(user, body)).json()) as PushProblem & { status: number };
}

export async function pull(user: Pick<TestUser, 'id'>, project: string, cursor = 0, limit = 500): Promise<PullReply> {
  const { GET } = await import('@/app/api/sync/pull/route');
  return ask<PullReply>(await GET(await signedInRequest(user, `/api/sync/pull?project=${project}&cursor=${cursor}&limit=${limit}`), routeContext()));
}

export async function pack(user: Pick<TestUser, 'id'>, project: string): Promise<WorkPack> {
  const { GET } = await import('@/app/api/sync/pack/route');
  return ask<WorkPack>(await GET(await signedInRequest(user, `/api/sync/pack?project=${project}`), routeContext()));
}
