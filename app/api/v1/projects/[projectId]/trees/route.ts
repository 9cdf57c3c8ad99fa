import { treeColumns } from '@/lib/server/exports/tree-columns';
import { treePageSchema } from '@/lib/server/exports/tree-filter';
import { treeRows } from '@/lib/server/exports/tree-rows';
import { projectOf, projectParams } from '@/lib/server/project-params';
import { readProject } from '@/lib/server/projects/project-overview';
import { route } from '@/lib/server/route';

/** A page of the tree table with its dictionary of columns: the same rows as the CSV. */
export const GET = route(
  { access: { action: 'data.read', project: projectOf }, params: projectParams, query: treePageSchema },
  async ({ params, query: { limit, offset, ...filter } }) => {
    const project = await readProject(params.projectId);
    const { total, rows } = await treeRows(project.id, filter, { limit, offset });
    return { columns: treeColumns(project), total, limit, offset, rows };
  },
);
