import type { Model, ModelStatic, Sequelize } from 'sequelize';
import type { EntityName } from '@/lib/schema/entities';
import { integer, primaryId, tableOptions, text } from './columns';

/** The last applied change of each group of fields, which is what merging compares with. */
export type RecordGroupRow = {
  recordId: string;
  group: string;
  entity: EntityName;
  projectId: string;
  lastCursor: number;
  lastDeviceId: string;
  lastAuthorId: string;
  lastOpId: string;
  lastWallClock: string;
};
export type RecordGroupInstance = Model<RecordGroupRow, RecordGroupRow> & RecordGroupRow;

export function defineRecordGroup(sequelize: Sequelize): ModelStatic<RecordGroupInstance> {
  return sequelize.define<RecordGroupInstance>(
    'RecordGroup',
    {
      recordId: primaryId(),
      group: { ...primaryId(), field: 'group_name' },
      entity: text(),
      projectId: text(),
      lastCursor: integer(),
      lastDeviceId: text(),
      lastAuthorId: text(),
      lastOpId: text(),
      lastWallClock: text(),
    },
    tableOptions('record_groups'),
  );
}
