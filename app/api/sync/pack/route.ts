import { z } from 'zod';
import { idSchema } from '@/lib/schema/common';
import { workPackSchema } from '@/lib/schema/wire';
import { readPack } from '@/lib/server/log/pack';
import { route } from '@/lib/server/route';

export const dynamic = 'force-dynamic';

export const GET = route(
  { access: { action: 'sync', project: ({ query }) => query.project }, query: z.object({ project: idSchema }), reply: workPackSchema },
  ({ projectId }) => readPack(projectId),
);
