import { v7 } from 'uuid';
import { vi } from 'vitest';
import type { Role } from '@/lib/schema/common';
import type { Project } from '@/lib/schema/project';
import { addMembership } from '@/lib/server/add-membership';
import { sessionCookie } from '@/lib/server/auth';
import { hashPassword } from '@/lib/server/password';
import { startSession } from '@/lib/server/session';
import { write } from '@/lib/server/write-queue';
import { freshDatabase } from './server-database';

export const TEST_ORIGIN = 'http://localhost:3310';

export type TestUser = { readonly id: string; readonly email: string; readonly name: string };
export type TestServer = Awaited<ReturnType<typeof startTestServer>>;

/** A fresh, migrated database and the environment of a development server; `close` puts everything back. */
export async function startTestServer() {
  const database = await freshDatabase();
  vi.stubEnv('NEXTAUTH_URL', TEST_ORIGIN);
  vi.stubEnv('NEXTAUTH_SECRET', 'a secret for tests that is long enough');
  return {
    ...database,
    close: async () => {
      vi.unstubAllEnvs();
      await database.close();
    },
  };
}

/** A project row, metric unless told otherwise. */
export async function makeProject(values: Partial<Project> = {}): Promise<Project> {
  const id = values.id ?? v7();
  const project: Project = {
    id, projectId: id, deleted: false, name: 'Harrowdene', state: 'active', dbhUnit: 'cm', lengthUnit: 'm', areaUnit: 'ha', breastHeightM: 1.3,
    dbhDecimals: 1, heightDecimals: 1, rounding: 'nearest', crs: 'EPSG:32632', plotDesign: { kind: 'circle', areaM2: 400, radiusM: 11.28 },
    alarmRatePer100: 1, tauSquared: 0.5, curveForm: 'curtis', expectationShown: 'on-request', emergencyNote: '', ...values,
  };
  await write(({ models, transaction }) => models.Project.create({ ...project, revision: 1 }, { transaction }));
  return project;
}

/** A person with roles. Without a password nobody can sign in as them with one, and no time goes into hashing. */
export async function makeUser(
  { name = 'Ingrid Vale', admin = false, disabled = false, password, roles = {} }:
  { name?: string; admin?: boolean; disabled?: boolean; password?: string; roles?: Readonly<Record<string, Role>> } = {},
): Promise<TestUser> {
  const id = v7();
  const user = { id, email: `${id}@lammas.test`, name };
  const passwordHash = password === undefined ? 'no password' : await hashPassword(password);
  await write(({ models, transaction }) => models.User.create(
    { ...user, passwordHash, admin, disabled, tokenVersion: 0, createdAt: new Date().toISOString() }, { transaction }));
  for (const [projectId, role] of Object.entries(roles)) await addMembership({ userId: id, projectId, role });
  return user;
}

/** A request with a real, signed session of a person, coming from our own pages. `url` is a path or an address. */
export async function signedInRequest(user: Pick<TestUser, 'id'>, url: string, init: RequestInit = {}): Promise<Request> {
  const headers = new Headers(init.headers);
  headers.set('cookie', await sessionCookie(await startSession(user.id)));
  if (!headers.has('origin')) headers.set('origin', TEST_ORIGIN);
  return new Request(new URL(url, TEST_ORIGIN), { ...init, headers });
}

/** What Next hands to a handler beside the request; without dynamic parts in the address there are no params at all. */
export const routeContext = (params?: Readonly<Record<string, string | string[]>>) => ({ params: Promise.resolve(params && { ...params }) });
