import type { Model, ModelStatic, Sequelize } from 'sequelize';
import { flag, integer, primaryId, tableOptions, text, textOrNull } from './columns';

/** A phone or browser that records, with the head of its chain. The server has one of its own (no person). */
export type DeviceRow = {
  id: string;
  /** Who used it last; null for the server itself. */
  userId: string | null;
  firstSeenAt: string;
  lastSeenAt: string;
  lastSeq: number;
  lastHash: string;
  lost: boolean;
};
export type DeviceInstance = Model<DeviceRow, DeviceRow> & DeviceRow;

export function defineDevice(sequelize: Sequelize): ModelStatic<DeviceInstance> {
  return sequelize.define<DeviceInstance>(
    'Device',
    {
      id: primaryId(),
      userId: textOrNull(),
      firstSeenAt: text(),
      lastSeenAt: text(),
      lastSeq: integer(),
      lastHash: text(),
      lost: flag(),
    },
    tableOptions('devices'),
  );
}
