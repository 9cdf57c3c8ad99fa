import { DataTypes } from 'sequelize';
import type { Model, ModelStatic, Sequelize } from 'sequelize';
import type { Operation, OperationResult } from '@/lib/schema/wire';
import { integer, json, tableOptions, text, textOrNull } from './columns';

/** One operation as received, in commit order. Appended to, never changed: `raw` is the operation verbatim, the other columns are read from it. */
export type ChangeLogEntryRow = {
  /** Assigned by the database, in commit order. */
  cursor: number;
  opId: string;
  deviceId: string;
  seq: number;
  /** As the operation says; not checked, a quarantined one may name anything. */
  projectId: string;
  authorId: string;
  entity: string;
  recordId: string;
  kind: string;
  group: string;
  fields: Operation['fields'];
  reason: string | null;
  baseCursor: number;
  schemaV: number;
  appV: string;
  wallClock: string;
  receivedAt: string;
  prevHash: string;
  hash: string;
  state: OperationResult['state'];
  stateReason: string | null;
  raw: string;
};
export type ChangeLogEntryInstance = Model<ChangeLogEntryRow, Omit<ChangeLogEntryRow, 'cursor'>> & ChangeLogEntryRow;

export function defineChangeLogEntry(sequelize: Sequelize): ModelStatic<ChangeLogEntryInstance> {
  return sequelize.define<ChangeLogEntryInstance>(
    'ChangeLogEntry',
    {
      cursor: { type: DataTypes.INTEGER, primaryKey: true, autoIncrement: true },
      opId: text(),
      deviceId: text(),
      seq: integer(),
      projectId: text(),
      authorId: text(),
      entity: text(),
      recordId: text(),
      kind: text(),
      group: { ...text(), field: 'group_name' },
      fields: json(),
      reason: textOrNull(),
      baseCursor: integer(),
      schemaV: integer(),
      appV: text(),
      wallClock: text(),
      receivedAt: text(),
      prevHash: text(),
      hash: text(),
      state: text(),
      stateReason: textOrNull(),
      raw: text(),
    },
    tableOptions('change_log'),
  );
}
