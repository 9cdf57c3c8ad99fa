import { describe, expect, it } from 'vitest';
import { actions, can, mayKnow } from '@/lib/server/policies';
import type { Action } from '@/lib/server/policies';
import type { Role } from '@/lib/schema/common';

const P = 'project';
const member = (role: Role) => ({ admin: false, roles: new Map([[P, role]]) });
const admin = { admin: true, roles: new Map<string, Role>() };

/** The whole table, written out: who may do what. */
const table: Record<Action, readonly [crew: boolean, lead: boolean, analyst: boolean]> = {
  'project.read': [true, true, true],
  sync: [true, true, true],
  'data.read': [false, true, true],
  'data.import': [false, false, true],
  'curve.publish': [false, false, true],
  'project.manage': [false, false, true],
  'people.manage': [false, false, false],
};

describe('the policy', () => {
  it.each(actions)('%s is for the roles of the table, and for an administrator', (action) => {
    expect((['crew', 'lead', 'analyst'] as const).map((role) => can(member(role), action, P))).toEqual(table[action]);
    expect(can(admin, action, P)).toBe(true);
  });
  it.each(actions)('%s in another project is for an administrator only', (action) => {
    expect(can(member('analyst'), action, 'another')).toBe(false);
    expect(can(admin, action, 'another')).toBe(true);
  });
  it.each(actions)('%s on the server as a whole is for an administrator only', (action) => {
    expect(can(member('analyst'), action, null)).toBe(false);
    expect(can(admin, action, null)).toBe(true);
  });
  it('only members and administrators know that a project exists', () => {
    expect([mayKnow(member('crew'), P), mayKnow(member('crew'), 'another'), mayKnow(admin, 'another')]).toEqual([true, false, true]);
  });
});
