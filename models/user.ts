import type { Model, ModelStatic, Sequelize } from 'sequelize';
import { flag, integer, primaryId, tableOptions, text } from './columns';

/** A person who can sign in. The log holds only the id; erasing a person rewrites this row and leaves the log whole. */
export type UserRow = {
  id: string;
  /** Lower case. */
  email: string;
  name: string;
  passwordHash: string;
  /** Server-wide administrator. */
  admin: boolean;
  disabled: boolean;
  /** Raised to end every session of the person. */
  tokenVersion: number;
  createdAt: string;
};
export type UserInstance = Model<UserRow, UserRow> & UserRow;

export function defineUser(sequelize: Sequelize): ModelStatic<UserInstance> {
  return sequelize.define<UserInstance>(
    'User',
    {
      id: primaryId(),
      email: text(),
      name: text(),
      passwordHash: text(),
      admin: flag(),
      disabled: flag(),
      tokenVersion: integer(),
      createdAt: text(),
    },
    tableOptions('users'),
  );
}
