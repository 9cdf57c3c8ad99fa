import type { Sequelize } from 'sequelize';
import { real, recordColumns, tableOptions, text, textOrNull } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `readings`; fields as in the `reading` schema. */
export function defineReading(sequelize: Sequelize): SyncedModel<'reading'> {
  return sequelize.define<SyncedInstance<'reading'>>(
    'Reading',
    {
      ...recordColumns(),
      measurementId: text(),
      quantity: text(),
      digits: text(),
      unit: text(),
      canonical: real(),
      origin: text(),
      instrument: textOrNull(),
      measurerId: textOrNull(),
      recorderId: textOrNull(),
      takenAt: text(),
    },
    tableOptions('readings'),
  );
}
