import type { Sequelize } from 'sequelize';
import { integer, json, real, recordColumns, tableOptions, text } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `height_curves`; fields as in the `heightCurve` schema. */
export function defineHeightCurve(sequelize: Sequelize): SyncedModel<'heightCurve'> {
  return sequelize.define<SyncedInstance<'heightCurve'>>(
    'HeightCurve',
    {
      ...recordColumns(),
      curveGroup: text(),
      version: integer(),
      form: text(),
      b0: real(),
      b1: real(),
      xtxInverse: json(),
      residualVariance: real(),
      residualDf: real(),
      n: integer(),
      plots: integer(),
      tauSquared: real(),
      breastHeightM: real(),
      dMinCm: real(),
      dMaxCm: real(),
      logDMean: real(),
      logDSd: real(),
      source: text(),
      publishedAt: text(),
    },
    tableOptions('height_curves'),
  );
}
