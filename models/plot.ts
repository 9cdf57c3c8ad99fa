import type { Sequelize } from 'sequelize';
import { realOrNull, recordColumns, tableOptions, text } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `plots`; fields as in the `plot` schema. */
export function definePlot(sequelize: Sequelize): SyncedModel<'plot'> {
  return sequelize.define<SyncedInstance<'plot'>>(
    'Plot',
    {
      ...recordColumns(),
      stratumId: text(),
      number: text(),
      plannedLat: realOrNull(),
      plannedLon: realOrNull(),
      wayIn: text(),
      hazardNote: text(),
    },
    tableOptions('plots'),
  );
}
