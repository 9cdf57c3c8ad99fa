import type { Sequelize } from 'sequelize';
import { recordColumns, tableOptions, text } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `trees`; fields as in the `tree` schema. */
export function defineTree(sequelize: Sequelize): SyncedModel<'tree'> {
  return sequelize.define<SyncedInstance<'tree'>>(
    'Tree',
    {
      ...recordColumns(),
      plotId: text(),
      firstVisitId: text(),
      tag: text(),
    },
    tableOptions('trees'),
  );
}
