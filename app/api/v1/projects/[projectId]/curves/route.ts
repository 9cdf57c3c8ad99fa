import { z } from 'zod';
import { curveFormSchema } from '@/lib/schema/design';
import { fitAndPublishCurves } from '@/lib/server/curves/fit-and-publish';
import { curvesOfProject } from '@/lib/server/curves/present-curves';
import { projectOf, projectParams } from '@/lib/server/project-params';
import { route } from '@/lib/server/route';

/** The height curves as fitted to the data at hand, and those published. */
export const GET = route({ access: { action: 'data.read', project: projectOf }, params: projectParams }, ({ params }) => curvesOfProject(params.projectId));

/** Publishes the next version of one group's curve. */
export const POST = route(
  { access: { action: 'curve.publish', project: projectOf }, params: projectParams, body: z.object({ curveGroup: z.string().min(1).max(60), form: curveFormSchema }) },
  async ({ params, body, user }) => ({ published: await fitAndPublishCurves({ projectId: params.projectId, authorId: user.id, form: body.form, groups: [body.curveGroup] }) }),
);
