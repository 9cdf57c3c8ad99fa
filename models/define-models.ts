import type { Sequelize } from 'sequelize';
import { defineAppliedOperation } from './applied-operation';
import { defineChangeLogEntry } from './change-log-entry';
import { defineConflict } from './conflict';
import { defineDevice } from './device';
import { defineHeightCurve } from './height-curve';
import { defineImportBatch } from './import-batch';
import { defineMembership } from './membership';
import { definePlot } from './plot';
import { defineProject } from './project';
import { defineReading } from './reading';
import { defineRecordGroup } from './record-group';
import { defineReferenceTree } from './reference-tree';
import { defineSecondLook } from './second-look';
import { defineServerMeta } from './server-meta';
import { defineSession } from './session';
import { defineSpeciesEntry } from './species-entry';
import { defineStem } from './stem';
import { defineStemMeasurement } from './stem-measurement';
import { defineStratum } from './stratum';
import { defineTree } from './tree';
import { defineUser } from './user';
import { defineVisit } from './visit';

/** Defines every model on one Sequelize instance. */
export function defineModels(sequelize: Sequelize) {
  return {
    Project: defineProject(sequelize),
    Stratum: defineStratum(sequelize),
    SpeciesEntry: defineSpeciesEntry(sequelize),
    Plot: definePlot(sequelize),
    HeightCurve: defineHeightCurve(sequelize),
    Visit: defineVisit(sequelize),
    Tree: defineTree(sequelize),
    Stem: defineStem(sequelize),
    StemMeasurement: defineStemMeasurement(sequelize),
    Reading: defineReading(sequelize),
    SecondLook: defineSecondLook(sequelize),
    Conflict: defineConflict(sequelize),
    User: defineUser(sequelize),
    Membership: defineMembership(sequelize),
    Session: defineSession(sequelize),
    Device: defineDevice(sequelize),
    ChangeLogEntry: defineChangeLogEntry(sequelize),
    AppliedOperation: defineAppliedOperation(sequelize),
    RecordGroup: defineRecordGroup(sequelize),
    ServerMeta: defineServerMeta(sequelize),
    ImportBatch: defineImportBatch(sequelize),
    ReferenceTree: defineReferenceTree(sequelize),
  };
}

export type Models = ReturnType<typeof defineModels>;
