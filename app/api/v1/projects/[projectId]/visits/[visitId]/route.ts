import { idSchema } from '@/lib/schema/common';
import { projectOf, projectParams } from '@/lib/server/project-params';
import { readVisit } from '@/lib/server/projects/read-visit';
import { route } from '@/lib/server/route';

/** One visit with every stem, reading and second look. */
export const GET = route(
  { access: { action: 'data.read', project: projectOf }, params: projectParams.extend({ visitId: idSchema }) },
  ({ params }) => readVisit(params.projectId, params.visitId),
);
