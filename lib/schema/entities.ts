import { conflictGroups, conflictSchema } from './conflict';
import type { Conflict } from './conflict';
import { heightCurveGroups, heightCurveSchema, plotGroups, plotSchema, speciesEntryGroups, speciesEntrySchema, stratumGroups, stratumSchema } from './design';
import type { HeightCurve, Plot, SpeciesEntry, Stratum } from './design';
import {
  readingGroups, readingSchema, secondLookGroups, secondLookSchema, stemGroups, stemMeasurementGroups, stemMeasurementSchema, stemSchema,
  treeGroups, treeSchema, visitGroups, visitSchema,
} from './field';
import type { Reading, SecondLook, Stem, StemMeasurement, Tree, Visit } from './field';
import { projectGroups, projectSchema } from './project';
import type { Project } from './project';

/** Records that travel by sync. Each name is also the `entity` of an operation. */
export type EntityRecord = {
  project: Project;
  stratum: Stratum;
  speciesEntry: SpeciesEntry;
  plot: Plot;
  heightCurve: HeightCurve;
  visit: Visit;
  tree: Tree;
  stem: Stem;
  stemMeasurement: StemMeasurement;
  reading: Reading;
  secondLook: SecondLook;
  conflict: Conflict;
};
export type EntityName = keyof EntityRecord;

type EntityDefinition = {
  /** Groups of fields measured together; the unit of merging. */
  readonly groups: Readonly<Record<string, readonly string[]>>;
  /** Field that names a record which must exist first, with that record's entity. */
  readonly parents: Readonly<Record<string, EntityName>>;
  /** Who may write it from a device: crews write field records, the office writes the design. */
  readonly writer: 'field' | 'office' | 'server';
};

export const entitySchemas = {
  project: projectSchema, stratum: stratumSchema, speciesEntry: speciesEntrySchema, plot: plotSchema, heightCurve: heightCurveSchema,
  visit: visitSchema, tree: treeSchema, stem: stemSchema, stemMeasurement: stemMeasurementSchema, reading: readingSchema,
  secondLook: secondLookSchema, conflict: conflictSchema,
} as const;

export const entities: Readonly<Record<EntityName, EntityDefinition>> = {
  project: { groups: projectGroups, parents: {}, writer: 'office' },
  stratum: { groups: stratumGroups, parents: {}, writer: 'office' },
  speciesEntry: { groups: speciesEntryGroups, parents: {}, writer: 'office' },
  plot: { groups: plotGroups, parents: { stratumId: 'stratum' }, writer: 'office' },
  heightCurve: { groups: heightCurveGroups, parents: {}, writer: 'office' },
  visit: { groups: visitGroups, parents: { plotId: 'plot' }, writer: 'field' },
  tree: { groups: treeGroups, parents: { plotId: 'plot', firstVisitId: 'visit' }, writer: 'field' },
  stem: { groups: stemGroups, parents: { treeId: 'tree' }, writer: 'field' },
  stemMeasurement: { groups: stemMeasurementGroups, parents: { visitId: 'visit', stemId: 'stem', speciesId: 'speciesEntry' }, writer: 'field' },
  reading: { groups: readingGroups, parents: { measurementId: 'stemMeasurement' }, writer: 'field' },
  secondLook: { groups: secondLookGroups, parents: { visitId: 'visit', measurementId: 'stemMeasurement' }, writer: 'field' },
  conflict: { groups: conflictGroups, parents: {}, writer: 'server' },
};

export const entityNames = Object.keys(entities) as readonly EntityName[];
