import { z } from 'zod';
import { areaUnitSchema, dbhUnitSchema, finiteSchema, lengthUnitSchema, nameSchema, recordBase, textSchema } from './common';

/** Other designs (nested circles, angle count, clusters) join this union. */
export const plotDesignSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('circle'), areaM2: finiteSchema.positive(), radiusM: finiteSchema.positive() }),
]);

export const projectSchema = z.object({
  ...recordBase,
  name: nameSchema,
  state: z.enum(['draft', 'active', 'closed']),
  /** Locked when the project is activated. */
  dbhUnit: dbhUnitSchema,
  lengthUnit: lengthUnitSchema,
  areaUnit: areaUnitSchema,
  breastHeightM: finiteSchema.min(0.5).max(2),
  dbhDecimals: z.int().min(0).max(2),
  heightDecimals: z.int().min(0).max(2),
  rounding: z.enum(['nearest', 'down']),
  crs: z.string().max(200),
  plotDesign: plotDesignSchema,
  /** False second looks per 100 correct trees. */
  alarmRatePer100: finiteSchema.min(0.1).max(20).default(1),
  /** Plot variance over tree variance on the log scale (statistics: tau squared). */
  tauSquared: finiteSchema.positive().default(0.5),
  curveForm: z.enum(['curtis', 'michailoff', 'wykoff', 'power']).default('curtis'),
  /** When the expected numbers may be seen at the tree. */
  expectationShown: z.enum(['on-request', 'after-second-reading']).default('on-request'),
  emergencyNote: textSchema.default(''),
});
export type Project = z.infer<typeof projectSchema>;
export const projectGroups = { design: Object.keys(projectSchema.shape).filter((k) => !['id', 'projectId', 'deleted'].includes(k)) } as const;
