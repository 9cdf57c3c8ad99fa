import { dictionaryRows } from '@/lib/server/exports/dictionary';
import { projectOf, projectParams } from '@/lib/server/project-params';
import { readProject } from '@/lib/server/projects/project-overview';
import { route } from '@/lib/server/route';

/** What the columns of the exports hold, with units. */
export const GET = route({ access: { action: 'data.read', project: projectOf }, params: projectParams }, async ({ params }) => ({ columns: dictionaryRows(await readProject(params.projectId)) }));
