import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { QueryTypes } from 'sequelize';
import type { Model, ModelStatic } from 'sequelize';
import { v7 } from 'uuid';
import { entityNames, entitySchemas } from '@/lib/schema/entities';
import type { EntityName, EntityRecord } from '@/lib/schema/entities';
import { anyEntityModel } from '@/models';
import { freshDatabase } from '../../support/server-database';

let database: Awaited<ReturnType<typeof freshDatabase>>;
beforeAll(async () => { database = await freshDatabase(); });
afterAll(async () => database.close());

const id = Object.fromEntries(entityNames.map((name) => [name, v7()])) as Record<EntityName, string>;
const person = v7();
const at = '2026-05-04T06:07:08.009Z';
const base = (name: EntityName) => ({ id: id[name], projectId: id.project, deleted: false });

/** One of each, parents first, with every nullable field once filled and once null where that is allowed. */
const samples: { [E in EntityName]: EntityRecord[E] } = {
  project: {
    ...base('project'), name: 'Harrowdene', state: 'active', dbhUnit: 'cm', lengthUnit: 'm', areaUnit: 'ha', breastHeightM: 1.3, dbhDecimals: 1,
    heightDecimals: 1, rounding: 'nearest', crs: 'EPSG:32632', plotDesign: { kind: 'circle', areaM2: 400, radiusM: 11.28 }, alarmRatePer100: 1,
    tauSquared: 0.5, curveForm: 'curtis', expectationShown: 'on-request', emergencyNote: '',
  },
  stratum: { ...base('stratum'), name: 'North bank', areaHa: 12.5 },
  speciesEntry: { ...base('speciesEntry'), code: 'B', localName: 'beech', scientificName: 'Fagus sylvatica', curveGroup: 'beech', unknown: true, position: 0 },
  plot: { ...base('plot'), stratumId: id.stratum, number: '007', plannedLat: 51.25, plannedLon: null, wayIn: 'by the ford', hazardNote: '' },
  heightCurve: {
    ...base('heightCurve'), curveGroup: '*', version: 1, form: 'curtis', b0: 3.4, b1: -8.25, xtxInverse: [0.25, -0.5, 1e-9], residualVariance: 0.01,
    residualDf: 29, n: 31, plots: 0, tauSquared: 0.5, breastHeightM: 1.3, dMinCm: 8.3, dMaxCm: 52, logDMean: 3.4, logDSd: 0.25, source: 's', publishedAt: at,
  },
  visit: {
    ...base('visit'), plotId: id.plot, kind: 'production', startedAt: at, measurerId: person, recorderId: null, state: 'finished', outcome: 'full',
    outcomeNote: '', finishedAt: at,
  },
  tree: { ...base('tree'), plotId: id.plot, firstVisitId: id.visit, tag: '1' },
  stem: { ...base('stem'), treeId: id.tree, label: 'a' },
  stemMeasurement: {
    ...base('stemMeasurement'), visitId: id.visit, stemId: id.stem, order: 1, status: 'live', form: 'whole', speciesId: null, dbhDigits: '12,50',
    dbhUnit: 'cm', dbhCm: 12.5, dbhReadingIds: [id.reading], heightDigits: null, heightUnit: null, heightM: null, heightReadingIds: [],
    heightMethod: null, remarks: 'ivy – thick; "quoted"',
  },
  reading: {
    ...base('reading'), measurementId: id.stemMeasurement, quantity: 'dbh', digits: '12,50', unit: 'cm', canonical: 12.5, origin: 'first',
    instrument: null, measurerId: person, recorderId: null, takenAt: at,
  },
  secondLook: {
    ...base('secondLook'), visitId: id.visit, measurementId: id.stemMeasurement, readingId: id.reading, rule: 'band', moment: 'tape', level: 'look',
    quantity: 'height', enteredDigits: '243', enteredCanonical: 243, expectedLow: 18.125, expectedHigh: 31, tailProbability: 1e-7, cause: 'decimal-height',
    causeProbability: 0.75, suggestedQuantity: 'height', suggestedDigits: '24.3', raisedBy: 'device', raisedAt: at, answer: 'open', reason: null,
    answerNote: '', answeredById: null, answeredAt: null, answerReadingId: null,
  },
  conflict: {
    ...base('conflict'), entity: 'visit', recordId: id.visit, group: 'ending', state: 'open',
    candidates: [{ opId: v7(), values: { outcome: 'full', outcomeNote: null }, authorId: person, deviceId: v7(), wallClock: at }],
  },
};

describe('schemas and models', () => {
  it.each(entityNames)('%s: the model has the fields of the schema, a revision, and nothing else', (name) => {
    const attributes = Object.keys(anyEntityModel(database.models, name).getAttributes());
    expect(new Set(attributes)).toEqual(new Set([...Object.keys(entitySchemas[name].shape), 'revision']));
  });

  it.each(entityNames)('%s: a stored record is read back as the schema parses it', async (name) => {
    const sample = entitySchemas[name].parse(samples[name]);
    const model = anyEntityModel(database.models, name);
    await model.create({ ...sample, revision: 7 });
    const read = await model.findByPk(id[name]);
    expect(read?.get({ plain: true })).toEqual({ ...sample, revision: 7 });
  });

  it('a record whose parent is missing is refused', async () => {
    const orphan = { ...samples.stem, id: v7(), treeId: v7(), revision: 1 };
    await expect(database.models.Stem.create(orphan)).rejects.toThrow(/FOREIGN KEY/);
  });

  it('every column of every model exists in its table, and the other way round', async () => {
    for (const model of Object.values(database.models)) {
      const { tableName: table } = model;
      const columns = await database.sequelize.query<{ name: string }>(`SELECT name FROM pragma_table_info('${table}')`, { type: QueryTypes.SELECT });
      const fields = Object.values((model as ModelStatic<Model>).getAttributes()).map((attribute) => attribute.field);
      expect(new Set(columns.map(({ name }) => name)), table).toEqual(new Set(fields));
    }
  });

  it('no foreign key cascades', async () => {
    const keys = await database.sequelize.query<{ from: string; on_delete: string; on_update: string }>(
      "SELECT t.name AS 'table', k.* FROM sqlite_schema t, pragma_foreign_key_list(t.name) k WHERE t.type = 'table'", { type: QueryTypes.SELECT });
    expect(keys.length).toBeGreaterThan(20);
    expect(keys.filter((key) => key.on_delete !== 'NO ACTION' || key.on_update !== 'NO ACTION')).toEqual([]);
  });
});
