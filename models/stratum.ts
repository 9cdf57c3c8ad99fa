import type { Sequelize } from 'sequelize';
import { real, recordColumns, tableOptions, text } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `strata`; fields as in the `stratum` schema. */
export function defineStratum(sequelize: Sequelize): SyncedModel<'stratum'> {
  return sequelize.define<SyncedInstance<'stratum'>>(
    'Stratum',
    {
      ...recordColumns(),
      name: text(),
      areaHa: real(),
    },
    tableOptions('strata'),
  );
}
