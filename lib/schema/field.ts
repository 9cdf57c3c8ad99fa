import { z } from 'zod';
import { dbhUnitSchema, digitsSchema, finiteSchema, idSchema, lengthUnitSchema, recordBase, textSchema, timeSchema } from './common';

/** How a visit ended. Every planned plot ends with one; zero trees is a result, not a gap. */
export const visitOutcomeSchema = z.enum(['full', 'part', 'no-trees', 'not-forest', 'access-refused', 'hazard', 'not-found']);
export type VisitOutcome = z.infer<typeof visitOutcomeSchema>;

export const visitSchema = z.object({
  ...recordBase,
  plotId: idSchema,
  kind: z.enum(['production', 'blind', 'cold', 'hot']),
  startedAt: timeSchema,
  /** Who measures and calls, who records; null until set. User ids. */
  measurerId: idSchema.nullable(),
  recorderId: idSchema.nullable(),
  state: z.enum(['open', 'finished', 'signedOff', 'sentBack']),
  outcome: visitOutcomeSchema.nullable(),
  outcomeNote: textSchema.default(''),
  finishedAt: timeSchema.nullable(),
});
export type Visit = z.infer<typeof visitSchema>;
export const visitGroups = {
  start: ['plotId', 'kind', 'startedAt'],
  people: ['measurerId', 'recorderId'],
  ending: ['state', 'outcome', 'outcomeNote', 'finishedAt'],
} as const;

export const treeSchema = z.object({
  ...recordBase,
  plotId: idSchema,
  firstVisitId: idSchema,
  tag: z.string().trim().min(1).max(20),
});
export type Tree = z.infer<typeof treeSchema>;
export const treeGroups = { tree: ['plotId', 'firstVisitId', 'tag'] } as const;

export const stemSchema = z.object({ ...recordBase, treeId: idSchema, label: z.string().min(1).max(8) });
export type Stem = z.infer<typeof stemSchema>;
export const stemGroups = { stem: ['treeId', 'label'] } as const;

export const stemStatusSchema = z.enum(['live', 'dead']);
export const stemFormSchema = z.enum(['whole', 'broken', 'forked', 'leaning']);

/**
 * One stem at one visit. A value is kept as typed (digits, unit) and canonical (cm for DBH, m for height),
 * together with the ids of the readings it rests on; all of that is one group of merging.
 */
export const stemMeasurementSchema = z.object({
  ...recordBase,
  visitId: idSchema,
  stemId: idSchema,
  order: z.int().min(1).describe('order of entry within the visit'),
  status: stemStatusSchema,
  form: stemFormSchema,
  speciesId: idSchema.nullable(),
  dbhDigits: digitsSchema.nullable(),
  dbhUnit: dbhUnitSchema.nullable(),
  dbhCm: finiteSchema.nullable(),
  dbhReadingIds: z.array(idSchema).default([]),
  heightDigits: digitsSchema.nullable(),
  heightUnit: lengthUnitSchema.nullable(),
  heightM: finiteSchema.nullable(),
  heightReadingIds: z.array(idSchema).default([]),
  heightMethod: z.enum(['measured', 'estimated']).nullable(),
  remarks: textSchema.default(''),
});
export type StemMeasurement = z.infer<typeof stemMeasurementSchema>;
export const stemMeasurementGroups = {
  place: ['visitId', 'stemId', 'order'],
  stem: ['status', 'form'],
  species: ['speciesId'],
  dbh: ['dbhDigits', 'dbhUnit', 'dbhCm', 'dbhReadingIds'],
  height: ['heightDigits', 'heightUnit', 'heightM', 'heightReadingIds', 'heightMethod'],
  remarks: ['remarks'],
} as const;

export const quantitySchema = z.enum(['dbh', 'height']);
export type Quantity = z.infer<typeof quantitySchema>;

/** One act of measuring one thing. Made once, never changed; a mistaken one stays beside the next. */
export const readingSchema = z.object({
  ...recordBase,
  measurementId: idSchema,
  quantity: quantitySchema,
  digits: digitsSchema,
  unit: z.union([dbhUnitSchema, lengthUnitSchema]),
  /** cm for DBH, m for height. */
  canonical: finiteSchema,
  /** first: entered; again: taken again at the tree; retyped: mended without measuring; converted: the suggested value taken. */
  origin: z.enum(['first', 'again', 'retyped', 'converted']),
  instrument: z.string().max(200).nullable(),
  measurerId: idSchema.nullable(),
  recorderId: idSchema.nullable(),
  takenAt: timeSchema,
});
export type Reading = z.infer<typeof readingSchema>;
export const readingGroups = {
  reading: ['measurementId', 'quantity', 'digits', 'unit', 'canonical', 'origin', 'instrument', 'measurerId', 'recorderId', 'takenAt'],
} as const;

export const momentSchema = z.enum(['tape', 'tree', 'plot', 'camp', 'office']);
export type Moment = z.infer<typeof momentSchema>;
export const causeSchema = z.enum([
  'dbh-other-unit', 'height-other-unit', 'girth-for-dbh', 'decimal-dbh', 'decimal-height', 'digits-swapped-dbh', 'digits-swapped-height',
  'digit-replaced-dbh', 'digit-replaced-height', 'fields-swapped', 'angle-unit', 'other-tree', 'unexplained',
]);
export type Cause = z.infer<typeof causeSchema>;
export const answerSchema = z.enum([
  'open', 'measured-again', 'read-again', 'converted', 'accepted', 'settled-in-office', 'withdrawn',
]);
export type Answer = z.infer<typeof answerSchema>;
export const acceptReasonSchema = z.enum(['broken-top', 'swelling', 'suppressed', 'read-twice', 'other']);
export type AcceptReason = z.infer<typeof acceptReasonSchema>;

/** One doubt about one entry. `level` look wants an answer; quiet is a mark only. Canonical values: cm or m. */
export const secondLookSchema = z.object({
  ...recordBase,
  visitId: idSchema,
  measurementId: idSchema,
  readingId: idSchema.nullable(),
  rule: z.string().min(1).max(60),
  moment: momentSchema,
  level: z.enum(['look', 'quiet']),
  quantity: quantitySchema,
  enteredDigits: digitsSchema.nullable(),
  enteredCanonical: finiteSchema.nullable(),
  expectedLow: finiteSchema.nullable(),
  expectedHigh: finiteSchema.nullable(),
  tailProbability: finiteSchema.min(0).max(1).nullable(),
  cause: causeSchema.nullable(),
  causeProbability: finiteSchema.min(0).max(1).nullable(),
  suggestedQuantity: quantitySchema.nullable(),
  suggestedDigits: digitsSchema.nullable(),
  raisedBy: z.enum(['device', 'server']),
  raisedAt: timeSchema,
  answer: answerSchema,
  reason: acceptReasonSchema.nullable(),
  answerNote: textSchema.default(''),
  answeredById: idSchema.nullable(),
  answeredAt: timeSchema.nullable(),
  /** The reading that answered it, where there is one. */
  answerReadingId: idSchema.nullable(),
});
export type SecondLook = z.infer<typeof secondLookSchema>;
export const secondLookGroups = {
  doubt: ['visitId', 'measurementId', 'readingId', 'rule', 'moment', 'level', 'quantity', 'enteredDigits', 'enteredCanonical', 'expectedLow',
    'expectedHigh', 'tailProbability', 'cause', 'causeProbability', 'suggestedQuantity', 'suggestedDigits', 'raisedBy', 'raisedAt'],
  answer: ['answer', 'reason', 'answerNote', 'answeredById', 'answeredAt', 'answerReadingId'],
} as const;
