import { lookRows } from '@/lib/server/exports/look-rows';
import { lookColumns } from '@/lib/server/exports/tree-columns';
import { projectOf, projectParams } from '@/lib/server/project-params';
import { readProject } from '@/lib/server/projects/project-overview';
import { route } from '@/lib/server/route';

/** Every second look with its answer. */
export const GET = route({ access: { action: 'data.read', project: projectOf }, params: projectParams }, async ({ params }) => {
  const project = await readProject(params.projectId);
  return { columns: lookColumns(project), rows: await lookRows(project) };
});
