import 'server-only';
import type { Role } from '@/lib/schema/common';
import { openDatabase } from '@/models';
import type { SignedIn } from '../policies';

export type ListedProject = { readonly id: string; readonly name: string; readonly state: string; readonly role: Role | 'admin'; readonly dbhUnit: string; readonly lengthUnit: string; readonly areaUnit: string };

/** The projects a person belongs to, by name; all of them for an administrator. */
export async function listProjects(user: Pick<SignedIn, 'admin' | 'roles'>): Promise<readonly ListedProject[]> {
  const { models } = await openDatabase();
  const rows = await models.Project.findAll({ where: { deleted: false, ...(user.admin ? {} : { id: [...user.roles.keys()] }) }, order: ['name'] });
  return rows.map(({ id, name, state, dbhUnit, lengthUnit, areaUnit }) => ({ id, name, state, dbhUnit, lengthUnit, areaUnit, role: user.roles.get(id) ?? 'admin' }));
}
