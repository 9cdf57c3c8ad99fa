import 'server-only';
import { Op } from 'sequelize';
import { v7 } from 'uuid';
import { entities } from '@/lib/schema/entities';
import type { EntityName } from '@/lib/schema/entities';
import { GENESIS_HASH, WIRE_VERSION } from '@/lib/schema/wire';
import type { Operation, OperationResult, PushProblem, PushReply } from '@/lib/schema/wire';
import { sameJson } from '@/lib/sync/merge';
import type { DeviceRow } from '@/models/device';
import type { SignedIn } from '../policies';
import { write } from '../write-queue';
import type { WriteContext } from '../write-queue';
import { judge } from './judge';
import type { ArrivedOperation, JudgeContext, Person } from './judge';
import { LogBatch } from './log-batch';
import { entryOf } from './log-entry';
import { settle } from './settle';

/** A push of which only the envelope is certain; the operations may hold anything. */
export type ArrivedPush = {
  readonly deviceId: string;
  readonly epoch: string | null;
  readonly firstSeq: number;
  readonly prevHash: string;
  readonly ops: readonly ArrivedOperation[];
};
type Outcome = PushReply | { readonly problem: PushProblem };

/** Text of an unknown thing for a column of the log; the operation itself is kept in `raw`. */
function plain(value: unknown, longest = 60): string {
  return typeof value === 'string' ? value.replaceAll('\0', '').toWellFormed().slice(0, longest) : '';
}

function whole(value: unknown): number {
  return typeof value === 'number' && Number.isSafeInteger(value) && value >= 0 ? value : 0;
}

/** The log entry of an operation that is kept aside; what cannot be read from it stays empty. */
function entryAside(arrived: ArrivedOperation, deviceId: string, opId: string, reason: string, now: string) {
  const loose: Partial<Record<keyof Operation, unknown>> = arrived;
  const op: Operation = {
    opId, deviceId, seq: arrived.seq, projectId: plain(loose.projectId), authorId: plain(loose.authorId), entity: plain(loose.entity),
    recordId: plain(loose.recordId), kind: plain(loose.kind), group: plain(loose.group), fields: {},
    reason: loose.reason === null ? null : plain(loose.reason, 10_000), baseCursor: whole(loose.baseCursor), schemaV: whole(loose.schemaV),
    appV: plain(loose.appV), wallClock: plain(loose.wallClock), monotonicMs: 0, prevHash: arrived.prevHash, hash: arrived.hash,
  };
  return { ...entryOf(op, 'quarantined', reason, now), fields: (loose.fields ?? {}) as Operation['fields'], raw: JSON.stringify(arrived) };
}

async function peopleOf(ids: Iterable<string>, { models, transaction }: WriteContext): Promise<Map<string, Person>> {
  const wanted = [...new Set(ids)];
  const people = await models.User.findAll({ where: { id: wanted }, transaction });
  const memberships = await models.Membership.findAll({ where: { userId: wanted }, transaction });
  return new Map(people.map(({ id, admin }) => [
    id, { admin, roles: new Map(memberships.filter(({ userId }) => userId === id).map(({ projectId, role }) => [projectId, role])) },
  ]));
}

/** Reads whatever the operations name, in a few questions instead of several for each. */
async function loadFor(batch: LogBatch, operations: readonly ArrivedOperation[]): Promise<void> {
  const records = new Map<EntityName, Set<string>>();
  const parents = new Map<EntityName, Set<string>>();
  const note = (into: typeof records, entity: EntityName, id: unknown) => {
    if (typeof id === 'string') into.set(entity, (into.get(entity) ?? new Set()).add(id));
  };
  for (const { entity, recordId, projectId, fields } of operations as readonly Partial<Operation>[]) {
    note(parents, 'project', projectId);
    if (typeof entity !== 'string' || !Object.hasOwn(entities, entity)) continue;
    const name = entity as EntityName;
    note(records, name, recordId);
    for (const [field, parent] of Object.entries(entities[name].parents)) note(parents, parent, fields?.[field]?.new);
  }
  for (const [entity, ids] of records) await batch.load(entity, ids, true);
  for (const [entity, ids] of parents) await batch.load(entity, ids, false);
}

/** The same change, whichever device and place in a chain it comes in. */
function sameChange(a: ArrivedOperation, raw: string): boolean {
  const content = ({ deviceId: _d, seq: _s, prevHash: _p, hash: _h, ...rest }: Record<string, unknown>) => rest;
  return sameJson(content({ ...a }), content(JSON.parse(raw) as Record<string, unknown>));
}

type Earlier = OperationResult & { readonly raw: string };

/** Operations of these ids that the log has: after a fork the same ones come again from a new device. */
async function earlierEntries(opIds: readonly string[], { models, transaction }: WriteContext): Promise<Map<string, Earlier>> {
  const found = await models.ChangeLogEntry.findAll({ where: { opId: [...opIds] }, transaction });
  return new Map(found.map((row) => [row.opId, { seq: row.seq, opId: row.opId, cursor: row.cursor, state: row.state, reason: row.stateReason, raw: row.raw }]));
}

/** Answers already given to the front of the push; null when one of them was given for something else. */
async function replays(push: ArrivedPush, device: DeviceRow, { models, transaction }: WriteContext): Promise<OperationResult[] | null> {
  const old = push.ops.filter(({ seq }) => seq <= device.lastSeq);
  if (push.firstSeq === 1 && push.prevHash !== GENESIS_HASH) return null;
  if (push.firstSeq === device.lastSeq + 1 && push.prevHash !== device.lastHash) return null;
  if (old.length === 0) return [];
  const given = await models.AppliedOperation.findAll({
    where: { deviceId: device.id, seq: { [Op.between]: [old[0]!.seq, old.at(-1)!.seq] } }, order: [['seq', 'ASC']], transaction,
  });
  if (given.length !== old.length || given.some(({ hash }, i) => hash !== old[i]!.hash)) return null;
  return given.map(({ seq, opId, cursor, state, reason }) => ({ seq, opId, cursor, state, reason }));
}

function chained(push: ArrivedPush): boolean {
  return push.ops.every(({ prevHash }, i) => prevHash === (i === 0 ? push.prevHash : push.ops[i - 1]!.hash));
}

async function appendNew(batch: LogBatch, fresh: readonly ArrivedOperation[], judging: JudgeContext, device: DeviceRow, conflicts: Set<string>): Promise<OperationResult[]> {
  await loadFor(batch, fresh);
  const earlier = await earlierEntries(fresh.map(({ opId }) => opId), batch.context);
  const results: OperationResult[] = [];
  for (const arrived of fresh) {
    const { seq, opId } = arrived;
    const before = earlier.get(opId);
    let result: OperationResult;
    if (before && sameChange(arrived, before.raw)) {
      result = { seq, opId, cursor: before.cursor, state: before.state, reason: before.reason };
    } else {
      const verdict = before ? { ok: false as const, reason: 'Its id belongs to another operation.' } : judge(batch, arrived, judging);
      if (verdict.ok) {
        const { cursor, state, conflictIds } = await settle(batch, verdict);
        for (const id of conflictIds) conflicts.add(id);
        result = { seq, opId, cursor, state, reason: null };
      } else {
        const cursor = batch.append(entryAside(arrived, device.id, before ? v7() : opId, verdict.reason, batch.now));
        result = { seq, opId, cursor, state: 'quarantined', reason: verdict.reason };
      }
      if (!before) earlier.set(opId, { ...result, raw: JSON.stringify(arrived) });
    }
    batch.answer({ deviceId: device.id, seq, opId, hash: arrived.hash, cursor: result.cursor, state: result.state, reason: result.reason });
    device.lastSeq = seq;
    device.lastHash = arrived.hash;
    results.push(result);
  }
  return results;
}

async function append(push: ArrivedPush, uploader: SignedIn, context: WriteContext): Promise<Outcome> {
  const batch = await LogBatch.open(context);
  const epoch = (await context.models.ServerMeta.findByPk('epoch', { transaction: context.transaction, rejectOnEmpty: true })).value;
  const device = await batch.device(push.deviceId);
  const problem = (code: PushProblem['code']): Outcome => ({ problem: { code, epoch, ackSeq: device.lastSeq, ackHash: device.lastHash } });
  // Nobody speaks for the server's own device.
  if (device.id === batch.serverDeviceId) return { problem: { code: 'fork', epoch, ackSeq: 0, ackHash: GENESIS_HASH } };
  if (push.epoch !== null && push.epoch !== epoch) return problem('epoch');
  if (push.firstSeq > device.lastSeq + 1 || push.ops.some(({ seq }, i) => seq !== push.firstSeq + i)) return problem('gap');
  const old = chained(push) ? await replays(push, device, context) : null;
  if (old === null) return problem('fork');

  const fresh = push.ops.slice(old.length);
  const authors = await peopleOf((fresh as readonly Partial<Operation>[]).map(({ authorId }) => plain(authorId)), context);
  const conflicts = new Set<string>();
  const results = [...old, ...(await appendNew(batch, fresh, { deviceId: device.id, uploader, authors }, device, conflicts))];
  device.userId = uploader.id;
  device.lastSeenAt = batch.now;
  await batch.flush();
  return {
    v: WIRE_VERSION, ackSeq: device.lastSeq, ackHash: device.lastHash, epoch, results, conflicts: [...conflicts],
    quarantined: results.filter(({ state }) => state === 'quarantined').map(({ opId, reason }) => ({ opId, reason: reason ?? '' })),
    cursor: batch.cursor, serverTime: batch.now,
  };
}

/**
 * Takes a device's operations into the log, in one write, and answers once that is committed. Nothing is refused for
 * its content: what cannot be applied is kept verbatim, acknowledged and told with its reason. What was sent before is
 * answered as it was then. A problem instead of a reply: `fork` (this device's history is not the one known), `epoch`
 * (the server was restored since) or `gap` (operations before these are missing); then nothing is stored.
 * Errors: StoreError.
 */
export function pushOperations(push: ArrivedPush, uploader: SignedIn): Promise<Outcome> {
  return write((context) => append(push, uploader, context));
}
