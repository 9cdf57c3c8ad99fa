import { projectOf, projectParams } from '@/lib/server/project-params';
import { projectOverview } from '@/lib/server/projects/project-overview';
import { route } from '@/lib/server/route';

/** What stands of a project: units, plots by state, doubts, people. */
export const GET = route({ access: { action: 'data.read', project: projectOf }, params: projectParams }, ({ params }) => projectOverview(params.projectId, new Date()));
