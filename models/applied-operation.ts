import type { Model, ModelStatic, Sequelize } from 'sequelize';
import type { OperationResult } from '@/lib/schema/wire';
import { integer, primaryId, tableOptions, text, textOrNull } from './columns';

/** What a device was answered first for each of its operations, so that a replay gets the same answer. After a fork the same opId comes again from the new device: one row each. */
export type AppliedOperationRow = {
  deviceId: string;
  seq: number;
  opId: string;
  hash: string;
  cursor: number;
  state: OperationResult['state'];
  reason: string | null;
};
export type AppliedOperationInstance = Model<AppliedOperationRow, AppliedOperationRow> & AppliedOperationRow;

export function defineAppliedOperation(sequelize: Sequelize): ModelStatic<AppliedOperationInstance> {
  return sequelize.define<AppliedOperationInstance>(
    'AppliedOperation',
    {
      deviceId: primaryId(),
      seq: { ...integer(), primaryKey: true },
      opId: text(),
      hash: text(),
      cursor: integer(),
      state: text(),
      reason: textOrNull(),
    },
    tableOptions('applied_operations'),
  );
}
