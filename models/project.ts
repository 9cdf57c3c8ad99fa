import type { Sequelize } from 'sequelize';
import { integer, json, real, recordColumns, tableOptions, text } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `projects`; fields as in the `project` schema. */
export function defineProject(sequelize: Sequelize): SyncedModel<'project'> {
  return sequelize.define<SyncedInstance<'project'>>(
    'Project',
    {
      ...recordColumns(),
      name: text(),
      state: text(),
      dbhUnit: text(),
      lengthUnit: text(),
      areaUnit: text(),
      breastHeightM: real(),
      dbhDecimals: integer(),
      heightDecimals: integer(),
      rounding: text(),
      crs: text(),
      plotDesign: json(),
      alarmRatePer100: real(),
      tauSquared: real(),
      curveForm: text(),
      expectationShown: text(),
      emergencyNote: text(),
    },
    tableOptions('projects'),
  );
}
