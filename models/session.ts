import type { Model, ModelStatic, Sequelize } from 'sequelize';
import { integer, primaryId, tableOptions, text, textOrNull } from './columns';

/** One sign-in on one browser; asked for on every request. */
export type SessionRow = {
  id: string;
  userId: string;
  tokenVersion: number;
  createdAt: string;
  lastSeenAt: string;
  revokedAt: string | null;
};
export type SessionInstance = Model<SessionRow, SessionRow> & SessionRow;

export function defineSession(sequelize: Sequelize): ModelStatic<SessionInstance> {
  return sequelize.define<SessionInstance>(
    'Session',
    {
      id: primaryId(),
      userId: text(),
      tokenVersion: integer(),
      createdAt: text(),
      lastSeenAt: text(),
      revokedAt: textOrNull(),
    },
    tableOptions('sessions'),
  );
}
