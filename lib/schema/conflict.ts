import { z } from 'zod';
import { idSchema, jsonSchema, recordBase, timeSchema } from './common';

/** One of the values that two devices gave for the same group. */
export const candidateSchema = z.object({
  opId: idSchema,
  values: z.record(z.string(), jsonSchema),
  authorId: idSchema,
  deviceId: idSchema,
  wallClock: timeSchema,
});
export type Candidate = z.infer<typeof candidateSchema>;

/** On screen: two values. The current value stays until a person picks. */
export const conflictSchema = z.object({
  ...recordBase,
  entity: z.string(),
  recordId: idSchema,
  group: z.string(),
  candidates: z.array(candidateSchema).min(1),
  state: z.enum(['open', 'settled']),
});
export type Conflict = z.infer<typeof conflictSchema>;
export const conflictGroups = { conflict: ['entity', 'recordId', 'group', 'candidates', 'state'] } as const;
