import { projectOf, projectParams } from '@/lib/server/project-params';
import { listQuarantine } from '@/lib/server/projects/list-quarantine';
import { route } from '@/lib/server/route';

/** What could not be applied, verbatim, with the reason. */
export const GET = route({ access: { action: 'data.read', project: projectOf }, params: projectParams }, async ({ params }) => ({ operations: await listQuarantine(params.projectId) }));
