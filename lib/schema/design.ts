import { z } from 'zod';
import { finiteSchema, idSchema, nameSchema, recordBase, textSchema, timeSchema } from './common';

export const stratumSchema = z.object({ ...recordBase, name: nameSchema, areaHa: finiteSchema.positive() });
export type Stratum = z.infer<typeof stratumSchema>;
export const stratumGroups = { design: ['name', 'areaHa'] } as const;

export const speciesEntrySchema = z.object({
  ...recordBase,
  /** The project's own short code, also the label on the species button. */
  code: z.string().trim().min(1).max(12),
  localName: nameSchema,
  scientificName: z.string().max(200).default(''),
  /** Species that share a height curve share a curve group. */
  curveGroup: z.string().trim().min(1).max(60),
  unknown: z.boolean().default(false),
  position: z.int().min(0).default(0),
});
export type SpeciesEntry = z.infer<typeof speciesEntrySchema>;
export const speciesEntryGroups = { design: ['code', 'localName', 'scientificName', 'curveGroup', 'unknown', 'position'] } as const;

export const plotSchema = z.object({
  ...recordBase,
  stratumId: idSchema,
  number: z.string().trim().min(1).max(20),
  /** Planned centre, degrees WGS 84. */
  plannedLat: finiteSchema.min(-90).max(90).nullable(),
  plannedLon: finiteSchema.min(-180).max(180).nullable(),
  wayIn: textSchema.default(''),
  hazardNote: textSchema.default(''),
});
export type Plot = z.infer<typeof plotSchema>;
export const plotGroups = { design: ['stratumId', 'number', 'plannedLat', 'plannedLon'], notes: ['wayIn', 'hazardNote'] } as const;

export const curveFormSchema = z.enum(['curtis', 'michailoff', 'wykoff', 'power']);
export type CurveForm = z.infer<typeof curveFormSchema>;

/**
 * A published height curve: ln(h - bh) = b0 + b1 x(d), d in cm, h in m, natural logs.
 * `xtxInverse` is the unscaled covariance factor of (b0, b1): their covariance is residualVariance times it.
 * With plots, residualVariance is the tree variance given tauSquared; without, it holds plot and tree spread together.
 */
export const heightCurveSchema = z.object({
  ...recordBase,
  /** A curve group of the project, or '*' for all groups pooled. */
  curveGroup: z.string().min(1).max(60),
  version: z.int().min(1),
  form: curveFormSchema,
  b0: finiteSchema,
  b1: finiteSchema,
  xtxInverse: z.tuple([finiteSchema, finiteSchema, finiteSchema]).describe('c00, c01, c11'),
  residualVariance: finiteSchema.positive(),
  residualDf: finiteSchema.positive(),
  n: z.int().min(3),
  plots: z.int().min(0).describe('number of plots in the fit; 0 when the trees came without plots'),
  tauSquared: finiteSchema.positive(),
  breastHeightM: finiteSchema.positive(),
  dMinCm: finiteSchema.positive(),
  dMaxCm: finiteSchema.positive(),
  /** Log-normal description of the diameters fitted: mean and standard deviation of ln d, d in cm. */
  logDMean: finiteSchema,
  logDSd: finiteSchema.nonnegative(),
  source: textSchema,
  publishedAt: timeSchema,
});
export type HeightCurve = z.infer<typeof heightCurveSchema>;
export const heightCurveGroups = {
  fit: ['curveGroup', 'version', 'form', 'b0', 'b1', 'xtxInverse', 'residualVariance', 'residualDf', 'n', 'plots', 'tauSquared',
    'breastHeightM', 'dMinCm', 'dMaxCm', 'logDMean', 'logDSd', 'source', 'publishedAt'],
} as const;
