import { readdir } from 'node:fs/promises';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { v7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { authorisationMatrix } from '@/lib/server/authorisation-matrix';
import type { AccessRow, Method, SampleCall } from '@/lib/server/authorisation-matrix';
import { actions } from '@/lib/server/policies';
import type { Action } from '@/lib/server/policies';
import type { RouteHandler } from '@/lib/server/route';
import { makeProject, makeUser, signedInRequest, startTestServer } from '../../support/server';
import type { TestServer } from '../../support/server';

const METHODS: readonly Method[] = ['GET', 'HEAD', 'POST', 'PUT', 'PATCH', 'DELETE', 'OPTIONS'];
const api = path.resolve(import.meta.dirname, '../../../app/api');

const found = (await readdir(api, { recursive: true })).filter((file) => /(^|\/)route\.(ts|tsx|js|mjs)$/.test(file)).sort((a, b) => a.localeCompare(b));
const rows = Object.entries(authorisationMatrix).flatMap(([file, methods]) =>
  Object.entries(methods).map(([method, row]) => ({ file, method: method as Method, row })));
const isAction = (access: AccessRow['access']): access is Action => (actions as readonly string[]).includes(access);
const projectRows = rows.filter(({ row }) => isAction(row.access));

async function handlersOf(file: string): Promise<Partial<Record<Method, RouteHandler>>> {
  return import(pathToFileURL(path.join(api, file)).href) as Promise<Partial<Record<Method, RouteHandler>>>;
}

async function call(user: { id: string }, file: string, method: Method, row: AccessRow, projectId: string): Promise<Response> {
  const params: Record<string, string> = {};
  const address = path.dirname(file).replace(/\[([^\]]+)\]/g, (_, name: string) => (params[name] = name === 'projectId' ? projectId : v7()));
  const { query, body, form }: SampleCall = 'sample' in row ? row.sample?.(projectId) ?? {} : {};
  const init: RequestInit = { method };
  if (form) init.body = form;
  else if (body !== undefined) Object.assign(init, { body: JSON.stringify(body), headers: { 'content-type': 'application/json' } });
  const request = await signedInRequest(user, `/api/${address}?${new URLSearchParams(query).toString()}`, init);
  return (await handlersOf(file))[method]!(request, { params: Promise.resolve(params) });
}

describe('the authorisation matrix', () => {
  it('has a row for every route file on disk, and no row without a file', () => {
    expect(Object.keys(authorisationMatrix).sort((a, b) => a.localeCompare(b))).toEqual(found);
  });

  it.each(found)('%s: every exported method has a row that says what the handler says', async (file) => {
    const handlers = await handlersOf(file);
    const declared = authorisationMatrix[file] ?? {};
    expect(METHODS.filter((method) => method in handlers)).toEqual(METHODS.filter((method) => method in declared));
    for (const method of METHODS) {
      const row = declared[method];
      if (row && row.access !== 'sign-in') expect(handlers[method]?.access, method).toBe(row.access);
    }
  });
});

describe('a person of another project', () => {
  let server: TestServer;
  beforeAll(async () => { server = await startTestServer(); });
  afterAll(async () => server.close());

  it.each(projectRows)('$method $file: 404, as for a project that does not exist', async ({ file, method, row }) => {
    const theirs = await makeProject();
    const other = await makeProject({ name: 'Saltmere' });
    const stranger = await makeUser({ roles: { [other.id]: 'analyst' } });
    for (const projectId of [theirs.id, v7()]) {
      const response = await call(stranger, file, method, row, projectId);
      expect(response.headers.get('content-type')).toBe('application/problem+json');
      expect(await response.json()).toMatchObject({ status: 404, code: 'not-found' });
    }
  });

  it.each(projectRows)('$method $file: no 404 or 403 for want of access when it is an analyst of the project itself', async ({ file, method, row }) => {
    const theirs = await makeProject();
    const member = await makeUser({ roles: { [theirs.id]: 'analyst' } });
    const response = await call(member, file, method, row, theirs.id);
    // What is asked for inside the project may be missing; the body then names something else than the project.
    // A file that the handler itself refuses says so in `detail`; the wrapper's own 422 has none.
    const byHandler = response.status === 422 && typeof (await response.clone().json()).detail === 'string';
    expect(byHandler ? [] : [401, 403, 415, 422]).not.toContain(response.status);
  });

  it.each(rows.filter(({ row }) => row.access !== 'public' && row.access !== 'sign-in'))('$method $file: 401 for nobody', async ({ file, method }) => {
    const handler = (await handlersOf(file))[method]!;
    const response = await handler(new Request(`http://localhost:3310/api/${path.dirname(file)}`, { method, headers: { origin: 'http://localhost:3310' } }), { params: Promise.resolve({}) });
    expect(response.status).toBe(401);
  });
});
