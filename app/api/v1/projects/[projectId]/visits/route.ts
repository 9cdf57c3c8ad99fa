import { projectOf, projectParams } from '@/lib/server/project-params';
import { listVisits } from '@/lib/server/projects/list-visits';
import { route } from '@/lib/server/route';

/** The visits of a project, newest first. */
export const GET = route({ access: { action: 'data.read', project: projectOf }, params: projectParams }, async ({ params }) => ({ visits: await listVisits(params.projectId) }));
