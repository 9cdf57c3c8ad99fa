import { listProjects } from '@/lib/server/projects/list-projects';
import { route } from '@/lib/server/route';

/** The caller's projects. */
export const GET = route({ access: 'signed-in' }, async ({ user }) => ({ projects: await listProjects(user) }));
