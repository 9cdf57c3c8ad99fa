import 'server-only';
import { openDatabase } from '@/models';

export type QuarantinedOperation = {
  readonly opId: string; readonly cursor: number; readonly entity: string; readonly recordId: string; readonly kind: string;
  readonly reason: string; readonly author: string; readonly deviceId: string; readonly wallClock: string; readonly raw: string;
};

/** Operations kept verbatim because they could not be applied, newest first, at most 500. */
export async function listQuarantine(projectId: string): Promise<readonly QuarantinedOperation[]> {
  const { models } = await openDatabase();
  const entries = await models.ChangeLogEntry.findAll({ where: { projectId, state: 'quarantined' }, order: [['cursor', 'DESC']], limit: 500 });
  const authors = await models.User.findAll({ where: { id: [...new Set(entries.map(({ authorId }) => authorId))] } });
  const names = new Map(authors.map(({ id, name }) => [id, name]));
  return entries.map(({ opId, cursor, entity, recordId, kind, stateReason, authorId, deviceId, wallClock, raw }) => ({
    opId, cursor, entity, recordId, kind, deviceId, wallClock, raw, reason: stateReason ?? '', author: names.get(authorId) ?? 'somebody unknown here',
  }));
}
