import type { Sequelize } from 'sequelize';
import { json, recordColumns, tableOptions, text } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `conflicts`; fields as in the `conflict` schema. */
export function defineConflict(sequelize: Sequelize): SyncedModel<'conflict'> {
  return sequelize.define<SyncedInstance<'conflict'>>(
    'Conflict',
    {
      ...recordColumns(),
      entity: text(),
      recordId: text(),
      group: { ...text(), field: 'group_name' },
      candidates: json(),
      state: text(),
    },
    tableOptions('conflicts'),
  );
}
