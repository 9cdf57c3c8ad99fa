import 'server-only';
import { Op } from 'sequelize';
import type { Json } from '@/lib/schema/common';
import { openDatabase } from '@/models';

export type ListedChange = {
  readonly cursor: number; readonly entity: string; readonly recordId: string; readonly kind: string; readonly group: string;
  readonly fields: readonly { readonly name: string; readonly old: Json; readonly new: Json }[];
  readonly reason: string | null; readonly author: string; readonly deviceId: string; readonly byServer: boolean;
  readonly wallClock: string; readonly receivedAt: string; readonly state: string; readonly stateReason: string | null;
};
export type ChangePage = { readonly changes: readonly ListedChange[]; /** Cursor to go on before; null at the beginning of the log. */ readonly before: number | null };

export type ChangeQuery = { readonly record?: string | undefined; readonly before?: number | undefined; readonly limit: number };

/**
 * The change log of a project, newest first: who changed what from which value to which, when, on which device, and why. `record`
 * narrows to one record. A creation has no old values; what changed nothing is listed too, with its state.
 */
export async function listChanges(projectId: string, { record, before, limit }: ChangeQuery): Promise<ChangePage> {
  const { models } = await openDatabase();
  const entries = await models.ChangeLogEntry.findAll({
    where: { projectId, ...(record === undefined ? {} : { recordId: record }), ...(before === undefined ? {} : { cursor: { [Op.lt]: before } }) },
    order: [['cursor', 'DESC']], limit: limit + 1,
  });
  const shown = entries.slice(0, limit);
  const [users, devices] = await Promise.all([
    models.User.findAll({ where: { id: [...new Set(shown.map(({ authorId }) => authorId))] }, attributes: ['id', 'name'] }),
    models.Device.findAll({ where: { id: [...new Set(shown.map(({ deviceId }) => deviceId))], userId: null }, attributes: ['id'] }),
  ]);
  const names = new Map(users.map(({ id, name }) => [id, name]));
  const own = new Set(devices.map(({ id }) => id));
  return {
    before: entries.length > limit ? shown.at(-1)!.cursor : null,
    changes: shown.map(({ cursor, entity, recordId, kind, group, fields, reason, authorId, deviceId, wallClock, receivedAt, state, stateReason }) => ({
      cursor, entity, recordId, kind, group, reason, deviceId, wallClock, receivedAt, state, stateReason,
      author: names.get(authorId) ?? 'somebody unknown here', byServer: own.has(deviceId),
      fields: Object.entries(fields).map(([name, values]) => ({ name, old: values.old, new: values.new })),
    })),
  };
}
