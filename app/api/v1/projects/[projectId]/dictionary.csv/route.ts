import { csvResponse } from '@/lib/server/exports/csv';
import { dictionaryRows } from '@/lib/server/exports/dictionary';
import { dictionaryColumns } from '@/lib/server/exports/tree-columns';
import { projectOf, projectParams } from '@/lib/server/project-params';
import { readProject } from '@/lib/server/projects/project-overview';
import { route } from '@/lib/server/route';

/** What the columns of the exports hold, with units, as CSV. */
export const GET = route({ access: { action: 'data.read', project: projectOf }, params: projectParams }, async ({ params }) => {
  const project = await readProject(params.projectId);
  return csvResponse(`${project.name} dictionary.csv`, dictionaryColumns, dictionaryRows(project));
});
