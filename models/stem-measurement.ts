import type { Sequelize } from 'sequelize';
import { integer, json, realOrNull, recordColumns, tableOptions, text, textOrNull } from './columns';
import type { SyncedInstance, SyncedModel } from './synced-model';

/** The table `stem_measurements`; fields as in the `stemMeasurement` schema. */
export function defineStemMeasurement(sequelize: Sequelize): SyncedModel<'stemMeasurement'> {
  return sequelize.define<SyncedInstance<'stemMeasurement'>>(
    'StemMeasurement',
    {
      ...recordColumns(),
      visitId: text(),
      stemId: text(),
      order: { ...integer(), field: 'entry_order' },
      status: text(),
      form: text(),
      speciesId: textOrNull(),
      dbhDigits: textOrNull(),
      dbhUnit: textOrNull(),
      dbhCm: realOrNull(),
      dbhReadingIds: json(),
      heightDigits: textOrNull(),
      heightUnit: textOrNull(),
      heightM: realOrNull(),
      heightReadingIds: json(),
      heightMethod: textOrNull(),
      remarks: text(),
    },
    tableOptions('stem_measurements'),
  );
}
