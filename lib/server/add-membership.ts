import 'server-only';
import type { Role } from '@/lib/schema/common';
import { write } from './write-queue';

/** Gives a person a role in a project, or another one than before. Both must exist. */
export function addMembership({ userId, projectId, role }: { userId: string; projectId: string; role: Role }): Promise<void> {
  return write(async ({ models, transaction }) => {
    const former = await models.Membership.findOne({ where: { userId, projectId }, transaction });
    if (former) await models.Membership.update({ role }, { where: { userId, projectId }, transaction });
    else await models.Membership.create({ userId, projectId, role, createdAt: new Date().toISOString() }, { transaction });
  });
}
