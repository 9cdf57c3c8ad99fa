import { z } from 'zod';
import { idSchema } from '@/lib/schema/common';
import { PAGE, hashSchema, pushReplySchema, pushRequestSchema } from '@/lib/schema/wire';
import { Problem } from '@/lib/server/errors';
import { pushOperations } from '@/lib/server/log/append';
import { syncPerDevice } from '@/lib/server/rate-limit';
import { enforceLimit } from '@/lib/server/rate-limit-guard';
import { route } from '@/lib/server/route';

export const dynamic = 'force-dynamic';

// Only what the chain needs is asked of an operation here; the rest is judged one by one and never stops a push.
const arrivedSchema = z.looseObject({ opId: idSchema, deviceId: idSchema, seq: z.int().min(1), prevHash: hashSchema, hash: hashSchema });
const bodySchema = z.looseObject({ ...pushRequestSchema.shape, ops: z.array(arrivedSchema).min(1).max(PAGE) });

export const POST = route(
  { access: 'signed-in', body: bodySchema, maxBodyBytes: 8 * 1024 * 1024, verbatim: true, reply: pushReplySchema },
  async ({ body, user }) => {
    enforceLimit(`sync:${body.deviceId}`, syncPerDevice);
    const outcome = await pushOperations(body, user);
    if (!('problem' in outcome)) return outcome;
    const { code, ...members } = outcome.problem;
    throw new Problem(code, { members });
  },
);
