import { csvResponse } from '@/lib/server/exports/csv';
import { treeColumns } from '@/lib/server/exports/tree-columns';
import { treeFilterSchema } from '@/lib/server/exports/tree-filter';
import { treeRows } from '@/lib/server/exports/tree-rows';
import { projectOf, projectParams } from '@/lib/server/project-params';
import { readProject } from '@/lib/server/projects/project-overview';
import { route } from '@/lib/server/route';

/** The tree table as CSV; its columns are explained in dictionary.csv. */
export const GET = route(
  { access: { action: 'data.read', project: projectOf }, params: projectParams, query: treeFilterSchema },
  async ({ params, query }) => {
    const project = await readProject(params.projectId);
    const { rows } = await treeRows(project.id, query, null);
    return csvResponse(`${project.name} trees.csv`, treeColumns(project), rows);
  },
);
