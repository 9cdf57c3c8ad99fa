import { z } from 'zod';
import type { Identity } from '@/lib/client/field-store-types';
import { roleSchema } from '@/lib/schema/common';
import { workPackSchema } from '@/lib/schema/wire';
import type { WorkPack } from '@/lib/schema/wire';

const csrfSchema = z.object({ csrfToken: z.string() });
const meSchema = z.object({
  user: z.object({ id: z.string(), name: z.string(), email: z.string(), admin: z.boolean() }),
  projects: z.array(z.object({ id: z.string(), name: z.string(), role: z.union([roleSchema, z.literal('admin')]) })),
});

/** What the server could not do for the field, in words for a person. */
export class ServerError extends Error {
  override readonly name = 'ServerError';
}

async function ask(path: string, init?: RequestInit): Promise<Response> {
  try {
    return await fetch(path, { cache: 'no-store', credentials: 'same-origin', ...init });
  } catch (cause) {
    throw new ServerError('No network here, or the server does not answer. Signing in and fetching a work pack need it once.', { cause });
  }
}

async function read<T>(response: Response, schema: z.ZodType<T>): Promise<T> {
  const body: unknown = await response.json().catch(() => null);
  const parsed = schema.safeParse(body);
  // A log-in page of the network itself also answers 200.
  if (!response.ok || !parsed.success) throw new ServerError('Something else than the Lammas server answered. Is this network asking for a log-in of its own?');
  return parsed.data;
}

async function whoIsSignedIn(): Promise<Identity> {
  const response = await ask('/api/v1/me');
  if (response.status === 401) throw new ServerError('That address and password do not go together.');
  const { user, projects } = await read(response, meSchema);
  return { userId: user.id, name: user.name, email: user.email, signedInAt: new Date().toISOString(), projects };
}

/** Signs in with an address and a password. Errors: ServerError with words for the screen. */
export async function signIn(email: string, password: string): Promise<Identity> {
  const { csrfToken } = await read(await ask('/api/auth/csrf'), csrfSchema);
  const body = new URLSearchParams({ csrfToken, email, password, json: 'true' });
  const response = await ask('/api/auth/callback/credentials', {
    method: 'POST', body, headers: { 'Content-Type': 'application/x-www-form-urlencoded' }, redirect: 'manual',
  });
  if (response.status === 401) throw new ServerError('That address and password do not go together, or there were too many tries. Wait a quarter of an hour if you are sure.');
  return whoIsSignedIn();
}

/** Ends the session at the server, when it can be reached. */
export async function endSession(): Promise<void> {
  const { csrfToken } = await read(await ask('/api/auth/csrf'), csrfSchema);
  await ask('/api/auth/signout', { method: 'POST', body: new URLSearchParams({ csrfToken, json: 'true' }), redirect: 'manual' });
}

/** The work pack of a project. Errors: ServerError. */
export async function fetchPack(projectId: string): Promise<WorkPack> {
  const response = await ask(`/api/sync/pack?project=${encodeURIComponent(projectId)}`);
  if (response.status === 401) throw new ServerError('The server wants you to sign in again before it gives the work pack.');
  if (response.status === 404) throw new ServerError('You are not a member of this project any more. Ask its analyst.');
  return read(response, workPackSchema);
}
