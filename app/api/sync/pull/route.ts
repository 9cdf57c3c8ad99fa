import { z } from 'zod';
import { idSchema } from '@/lib/schema/common';
import { PAGE, pullReplySchema } from '@/lib/schema/wire';
import { pullChanges } from '@/lib/server/log/pull';
import { route } from '@/lib/server/route';

export const dynamic = 'force-dynamic';

const querySchema = z.object({ project: idSchema, cursor: z.coerce.number().int().min(0), limit: z.coerce.number().int().min(1).max(PAGE).default(PAGE) });

export const GET = route(
  { access: { action: 'sync', project: ({ query }) => query.project }, query: querySchema, reply: pullReplySchema },
  ({ projectId, query: { cursor, limit } }) => pullChanges({ projectId, cursor, limit }),
);
