import type { Sequelize } from 'sequelize';
import { recordColumns, tableOptions, text, textOrNull } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `visits`; fields as in the `visit` schema. */
export function defineVisit(sequelize: Sequelize): SyncedModel<'visit'> {
  return sequelize.define<SyncedInstance<'visit'>>(
    'Visit',
    {
      ...recordColumns(),
      plotId: text(),
      kind: text(),
      startedAt: text(),
      measurerId: textOrNull(),
      recorderId: textOrNull(),
      state: text(),
      outcome: textOrNull(),
      outcomeNote: text(),
      finishedAt: textOrNull(),
    },
    tableOptions('visits'),
  );
}
