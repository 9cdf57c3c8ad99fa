import 'server-only';
import { z } from 'zod';
import { roleSchema } from '@/lib/schema/common';
import { openDatabase } from '@/models';
import type { SignedIn } from './policies';

export const meSchema = z.strictObject({
  user: z.strictObject({ id: z.string(), name: z.string(), email: z.string(), admin: z.boolean() }),
  projects: z.array(z.strictObject({ id: z.string(), name: z.string(), role: z.union([roleSchema, z.literal('admin')]) })),
});
export type Me = z.infer<typeof meSchema>;

/** A person as they see themselves, with the projects they may open, by name. An administrator opens all. */
export async function presentMe({ id, name, email, admin, roles }: SignedIn): Promise<Me> {
  const { models } = await openDatabase();
  const mine = admin ? { deleted: false } : { deleted: false, id: [...roles.keys()] };
  const projects = await models.Project.findAll({ where: mine, order: [['name', 'ASC']] });
  return {
    user: { id, name, email, admin },
    projects: projects.flatMap((project) => {
      const role = roles.get(project.id) ?? (admin ? 'admin' : null);
      return role ? [{ id: project.id, name: project.name, role }] : [];
    }),
  };
}
