import { z } from 'zod';
import { idSchema } from '@/lib/schema/common';
import { projectOf, projectParams } from '@/lib/server/project-params';
import { listChanges } from '@/lib/server/projects/list-changes';
import { route } from '@/lib/server/route';

const query = z.object({
  record: idSchema.optional(),
  before: z.coerce.number().int().min(1).optional(),
  limit: z.coerce.number().int().min(1).max(500).default(100),
});

/** The change log, newest first, of a project or of one record. */
export const GET = route({ access: { action: 'data.read', project: projectOf }, params: projectParams, query }, ({ params, query: asked }) => listChanges(params.projectId, asked));
