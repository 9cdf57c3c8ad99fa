import type { Sequelize } from 'sequelize';
import { recordColumns, tableOptions, text } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `stems`; fields as in the `stem` schema. */
export function defineStem(sequelize: Sequelize): SyncedModel<'stem'> {
  return sequelize.define<SyncedInstance<'stem'>>(
    'Stem',
    {
      ...recordColumns(),
      treeId: text(),
      label: text(),
    },
    tableOptions('stems'),
  );
}
