import 'server-only';
import type { Role } from '@/lib/schema/common';

export const actions = ['project.read', 'sync', 'data.read', 'data.import', 'curve.publish', 'project.manage', 'people.manage'] as const;
export type Action = (typeof actions)[number];

/** A person as a request knows them. */
export type SignedIn = {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  /** Server-wide administrator: everything, in every project. */
  readonly admin: boolean;
  readonly sessionId: string;
  readonly roles: ReadonlyMap<string, Role>;
};

const crew: readonly Action[] = ['project.read', 'sync'];
const lead: readonly Action[] = [...crew, 'data.read'];
const analyst: readonly Action[] = [...lead, 'data.import', 'curve.publish', 'project.manage'];
const allowed: Readonly<Record<Role, readonly Action[]>> = { crew, lead, analyst };

/**
 * The one place that decides who may do what. `projectId` null asks about the server as a whole, which only an
 * administrator runs. An administrator may do everything in any project; whether it exists is the caller's question.
 */
export function can(user: Pick<SignedIn, 'admin' | 'roles'>, action: Action, projectId: string | null): boolean {
  if (user.admin) return true;
  const role = projectId === null ? undefined : user.roles.get(projectId);
  return role !== undefined && allowed[role].includes(action);
}

/** Whether a person may know that a project exists. */
export function mayKnow(user: Pick<SignedIn, 'admin' | 'roles'>, projectId: string): boolean {
  return user.admin || user.roles.has(projectId);
}
