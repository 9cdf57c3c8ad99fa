import type { Model, ModelStatic, Sequelize } from 'sequelize';
import type { Role } from '@/lib/schema/common';
import { primaryId, tableOptions, text } from './columns';

/** Who works in which project, as what. */
export type MembershipRow = {
  userId: string;
  projectId: string;
  role: Role;
  createdAt: string;
};
export type MembershipInstance = Model<MembershipRow, MembershipRow> & MembershipRow;

export function defineMembership(sequelize: Sequelize): ModelStatic<MembershipInstance> {
  return sequelize.define<MembershipInstance>(
    'Membership',
    {
      userId: primaryId(),
      projectId: primaryId(),
      role: text(),
      createdAt: text(),
    },
    tableOptions('memberships'),
  );
}
