import 'server-only';
import type { Json } from '@/lib/schema/common';
import { entityNames } from '@/lib/schema/entities';
import { SCHEMA_VERSION, WIRE_VERSION } from '@/lib/schema/wire';
import type { SnapshotRecord, WorkPack } from '@/lib/schema/wire';
import { anyEntityModel } from '@/models';
import type { ChangeLogEntryInstance } from '@/models/change-log-entry';
import { readSnapshot, serverEpoch } from '../database';

/** All records of a project with their revisions, its people, and the cursor that they stand at, as of one moment. */
export function readPack(projectId: string): Promise<WorkPack> {
  return readSnapshot(async (context) => {
    const { models, transaction } = context;
    const records: SnapshotRecord[] = [];
    for (const entity of entityNames) {
      for (const found of await anyEntityModel(models, entity).findAll({ where: { projectId }, transaction })) {
        const { revision, ...row } = found.get({ plain: true });
        records.push({ entity, id: row.id, revision, row: row as unknown as Record<string, Json> });
      }
    }
    const memberships = await models.Membership.findAll({ where: { projectId }, transaction });
    const roles = new Map(memberships.map(({ userId, role }) => [userId, role]));
    const people = await models.User.findAll({ where: { id: [...roles.keys()] }, order: [['name', 'ASC'], ['id', 'ASC']], transaction });
    const cursor = (await models.ChangeLogEntry.max<number | null, ChangeLogEntryInstance>('cursor', { transaction })) ?? 0;
    return {
      v: WIRE_VERSION, schemaV: SCHEMA_VERSION, epoch: await serverEpoch(context), projectId, cursor, generatedAt: new Date().toISOString(),
      people: people.map(({ id, name }) => ({ id, name, role: roles.get(id) ?? null })), records,
    };
  });
}
