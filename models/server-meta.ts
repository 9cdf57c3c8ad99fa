import type { Model, ModelStatic, Sequelize } from 'sequelize';
import { primaryId, tableOptions, text } from './columns';

/** Facts about this server: `epoch` (new after a restore from a backup) and `server-device-id`. */
export type ServerMetaRow = {
  key: string;
  value: string;
};
export type ServerMetaInstance = Model<ServerMetaRow, ServerMetaRow> & ServerMetaRow;

export function defineServerMeta(sequelize: Sequelize): ModelStatic<ServerMetaInstance> {
  return sequelize.define<ServerMetaInstance>(
    'ServerMeta',
    {
      key: primaryId(),
      value: text(),
    },
    tableOptions('server_meta'),
  );
}
