import 'server-only';
import { z } from 'zod';
import { idSchema } from '@/lib/schema/common';

/** Addresses below /projects/[projectId]. */
export const projectParams = z.object({ projectId: idSchema });
export const projectOf = ({ params }: { readonly params: { readonly projectId: string } }): string => params.projectId;
