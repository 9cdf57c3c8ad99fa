import 'server-only';
import { Op } from 'sequelize';
import { entityNames } from '@/lib/schema/entities';
import { PAGE, WIRE_VERSION, changeSchema } from '@/lib/schema/wire';
import type { Change, PullReply } from '@/lib/schema/wire';
import { digestOf } from '@/lib/sync/digest';
import { anyEntityModel } from '@/models';
import type { ChangeLogEntryInstance } from '@/models/change-log-entry';
import { readSnapshot, serverEpoch } from '../database';
import type { ReadContext } from '../database';
import { DENIED_AUTHOR, DENIED_SENDER } from './judge';

/** Ids and revisions of all records of a project, tombstones too. */
async function revisionsOf(projectId: string, { models, transaction }: ReadContext): Promise<{ id: string; revision: number }[]> {
  const tables = [];
  for (const entity of entityNames) {
    tables.push(await anyEntityModel(models, entity).findAll({ attributes: ['id', 'revision'], where: { projectId }, raw: true, transaction }));
  }
  return tables.flat().map((row) => row as unknown as { id: string; revision: number });
}

function changeOf(row: ChangeLogEntryInstance): Change | null {
  const { cursor, opId, deviceId, seq, authorId, entity, recordId, kind, group, fields, reason, wallClock, state, stateReason } = row;
  // What is kept aside may not even have the form of a change.
  const change = changeSchema.safeParse({ cursor, opId, deviceId, seq, authorId, entity, recordId, kind, group, fields, reason, wallClock, state, stateReason });
  return change.success ? change.data : null;
}

/**
 * The changes of a project after a cursor, in commit order, at most `limit` (500) at once, all read as of one moment.
 * The cursor of the last page is the end of the whole log, and that page carries the digest of the project.
 * What somebody sent who may not write to this project is not shown to its members.
 */
export function pullChanges({ projectId, cursor, limit = PAGE }: { readonly projectId: string; readonly cursor: number; readonly limit?: number }): Promise<PullReply> {
  return readSnapshot(async (context) => {
    const { models, transaction } = context;
    const notDenied = { [Op.or]: [{ stateReason: null }, { stateReason: { [Op.notIn]: [DENIED_SENDER, DENIED_AUTHOR] } }] };
    const found = await models.ChangeLogEntry.findAll({
      where: { projectId, cursor: { [Op.gt]: cursor }, ...notDenied }, order: [['cursor', 'ASC']], limit: limit + 1, transaction,
    });
    const page = found.slice(0, limit);
    const more = found.length > limit;
    const end = more ? page.at(-1)!.cursor : ((await models.ChangeLogEntry.max<number | null, ChangeLogEntryInstance>('cursor', { transaction })) ?? 0);
    return {
      v: WIRE_VERSION, epoch: await serverEpoch(context), projectId, cursor: end, more,
      changes: page.map(changeOf).filter((change) => change !== null),
      digest: more ? null : digestOf(await revisionsOf(projectId, context)),
    };
  });
}
