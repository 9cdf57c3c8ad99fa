import { z } from 'zod';

/** Record ids are UUIDv7, made where the record is made; their time bits decide nothing. */
export const idSchema = z.uuidv7();
/** Wall-clock time of a device, ISO 8601 in UTC. Kept for people to read; it never decides an order. */
export const timeSchema = z.iso.datetime({ offset: false });
export const textSchema = z.string().max(10_000);
export const nameSchema = z.string().trim().min(1).max(200);
/** A finite number; JSON cannot carry NaN or infinity, and neither may a form. */
export const finiteSchema = z.number();

export const dbhUnitSchema = z.enum(['cm', 'in']);
export const lengthUnitSchema = z.enum(['m', 'ft']);
export const areaUnitSchema = z.enum(['ha', 'ac']);
export type DbhUnit = z.infer<typeof dbhUnitSchema>;
export type LengthUnit = z.infer<typeof lengthUnitSchema>;
export type AreaUnit = z.infer<typeof areaUnitSchema>;

/** Digits exactly as a person typed them, with the decimal sign they used. */
export const digitsSchema = z.string().min(1).max(12).regex(/^[0-9]*[.,]?[0-9]*$/, 'digits with at most one decimal sign');

export const roleSchema = z.enum(['crew', 'lead', 'analyst']);
export type Role = z.infer<typeof roleSchema>;

export type Json = string | number | boolean | null | readonly Json[] | { readonly [key: string]: Json };
export const jsonSchema: z.ZodType<Json> = z.lazy(() =>
  z.union([z.string(), z.number(), z.boolean(), z.null(), z.array(jsonSchema), z.record(z.string(), jsonSchema)]),
);

/** Every synced record carries these; `deleted` is a tombstone, never a missing row. */
export const recordBase = { id: idSchema, projectId: idSchema, deleted: z.boolean().default(false) } as const;
