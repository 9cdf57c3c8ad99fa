import { gzipSync } from 'node:zlib';
import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { idSchema } from '@/lib/schema/common';
import { Problem } from '@/lib/server/errors';
import { route } from '@/lib/server/route';
import { write } from '@/lib/server/write-queue';
import { TEST_ORIGIN, makeProject, makeUser, routeContext, signedInRequest, startTestServer } from '../../support/server';
import type { TestServer, TestUser } from '../../support/server';

let server: TestServer;
let project: { id: string };
let crew: TestUser;
let analyst: TestUser;
let admin: TestUser;
let stranger: TestUser;
beforeAll(async () => {
  server = await startTestServer();
  project = await makeProject();
  const other = await makeProject({ name: 'Saltmere' });
  crew = await makeUser({ roles: { [project.id]: 'crew' } });
  analyst = await makeUser({ roles: { [project.id]: 'analyst' } });
  stranger = await makeUser({ roles: { [other.id]: 'analyst' } });
  admin = await makeUser({ admin: true });
});
afterAll(async () => server.close());
afterEach(() => vi.restoreAllMocks());

const read = route(
  { access: { action: 'data.read', project: ({ params }) => params.projectId }, params: z.object({ projectId: idSchema }), query: z.object({ from: z.coerce.number().int().default(0) }) },
  ({ user, projectId, query }) => ({ reader: user.id, projectId, from: query.from }),
);
const readAs = async (user: TestUser, projectId = project.id, query = '') => read(await signedInRequest(user, `/api/x${query}`), routeContext({ projectId }));

const store = route(
  { access: 'signed-in', body: z.object({ name: z.string().min(2), size: z.number().max(9), inner: z.unknown() }), maxBodyBytes: 2000 },
  ({ body }) => body,
);
const storeAs = async (user: TestUser, body: string | Uint8Array<ArrayBuffer>, headers: Record<string, string> = {}) =>
  store(await signedInRequest(user, '/api/x', { method: 'POST', body, headers: { 'content-type': 'application/json', ...headers } }), routeContext());
const good = { name: 'oak', size: 3, inner: null };

async function problem(response: Response): Promise<Record<string, unknown>> {
  expect(response.headers.get('content-type')).toBe('application/problem+json');
  const body = (await response.json()) as Record<string, unknown>;
  expect(body.status).toBe(response.status);
  return body;
}

describe('who may call', () => {
  it('a member with the right gets the answer, which no cache keeps', async () => {
    const response = await readAs(analyst, project.id, '?from=4');
    expect(response.status).toBe(200);
    expect(await response.json()).toEqual({ reader: analyst.id, projectId: project.id, from: 4 });
    expect(response.headers.get('cache-control')).toBe('private, no-store');
    expect(response.headers.get('x-content-type-options')).toBe('nosniff');
  });
  it('a member without the right gets 403', async () => {
    expect(await problem(await readAs(crew))).toMatchObject({ status: 403, code: 'forbidden' });
  });
  it('a person of another project gets the same 404 as for no project at all', async () => {
    const theirs = await problem(await readAs(stranger));
    expect(theirs).toMatchObject({ status: 404, code: 'not-found' });
    expect(await problem(await readAs(stranger, '0196a000-0000-7000-8000-000000000000'))).toEqual(theirs);
    expect(await problem(await readAs(stranger, 'no-id'))).toEqual(theirs);
  });
  it('an administrator reads every project, but not one that does not exist', async () => {
    expect((await readAs(admin)).status).toBe(200);
    expect((await readAs(admin, '0196a000-0000-7000-8000-000000000000')).status).toBe(404);
  });
  it('nobody gets 401', async () => {
    const response = await read(new Request(`${TEST_ORIGIN}/api/x`), routeContext({ projectId: project.id }));
    expect(await problem(response)).toMatchObject({ status: 401, code: 'not-signed-in' });
  });
});

describe('what may be sent', () => {
  it('a right body is handed on, plain or gzip', async () => {
    expect(await (await storeAs(crew, JSON.stringify(good))).json()).toEqual(good);
    const zipped = Uint8Array.from(gzipSync(JSON.stringify(good)));
    expect(await (await storeAs(crew, zipped, { 'content-encoding': 'gzip' })).json()).toEqual(good);
    expect(await (await storeAs(crew, zipped, { 'content-type': 'application/gzip' })).json()).toEqual(good);
  });
  it('every fault is listed, not the first, and what nobody asked for is one', async () => {
    const body = await problem(await storeAs(crew, JSON.stringify({ name: 'o', size: 99, inner: null, admin: true })));
    expect(body).toMatchObject({ status: 422, code: 'invalid-fields' });
    expect((body.issues as { field: string }[]).map(({ field }) => field).sort((a, b) => a.localeCompare(b))).toEqual(['body', 'body.name', 'body.size']);
  });
  it('a query given twice, or not known, is refused', async () => {
    expect((await readAs(analyst, project.id, '?from=1&from=2')).status).toBe(422);
    expect((await readAs(analyst, project.id, '?to=1')).status).toBe(422);
  });
  it.each(['{"name":"oak","size":1,"inner":{"__proto__":{"admin":true}}}', '{"name":"oak","size":1,"inner":[{"constructor":1}]}', '{"name":"oak","size":1,"inner":{"prototype":1}}'])(
    'a name that reaches into the language is refused: %s', async (body) => {
      expect(await problem(await storeAs(crew, body))).toMatchObject({ status: 422, issues: [{ message: 'this name is not allowed' }] });
    });
  it('eight levels are read, nine are refused', async () => {
    const nested = (levels: number): unknown => (levels === 0 ? 1 : [nested(levels - 1)]);
    expect((await storeAs(crew, JSON.stringify({ ...good, inner: nested(7) }))).status).toBe(200);
    expect((await storeAs(crew, JSON.stringify({ ...good, inner: nested(8) }))).status).toBe(422);
  });
  it('too much is refused: as sent, as sent without a stated length, and inflated', async () => {
    const long = JSON.stringify({ ...good, inner: 'x'.repeat(3000) });
    expect((await storeAs(crew, long)).status).toBe(413);
    const bomb = Uint8Array.from(gzipSync(long));
    expect(bomb.byteLength).toBeLessThan(200);
    expect((await storeAs(crew, bomb, { 'content-encoding': 'gzip' })).status).toBe(413);
    const stream = new Blob([long]).stream();
    const request = await signedInRequest(crew, '/api/x', { method: 'POST', body: stream, duplex: 'half', headers: { 'content-type': 'application/json' } } as RequestInit);
    expect((await store(request, routeContext())).status).toBe(413);
  });
  it.each([['text/plain', '{}', 415], ['application/x-www-form-urlencoded', 'a=1', 415], ['application/json', '{', 400], ['application/json', '', 400]])(
    '%s with %j is answered %i', async (type, body, status) => {
      expect((await storeAs(crew, body, { 'content-type': type })).status).toBe(status);
    });
  it('a form hands on text and files by the schema', async () => {
    const upload = route({ access: 'signed-in', bodyKind: 'form', body: z.object({ unit: z.enum(['cm', 'in']), file: z.instanceof(File) }) },
      async ({ body }) => ({ unit: body.unit, text: await body.file.text() }));
    const form = new FormData();
    form.set('unit', 'in');
    form.set('file', new File(['a,b'], 'trees.csv'));
    const response = await upload(await signedInRequest(crew, '/api/x', { method: 'POST', body: form }), routeContext());
    expect(await response.json()).toEqual({ unit: 'in', text: 'a,b' });
  });
});

describe('where a change may come from', () => {
  it.each([
    ['our own origin', { origin: TEST_ORIGIN }, 200],
    ['another origin', { origin: 'http://evil.example' }, 403],
    ['our host on another port', { origin: 'http://localhost:3999' }, 403],
    ['a page of ours, as the browser says', { 'sec-fetch-site': 'same-origin' }, 200],
    ['a sibling site, as the browser says', { 'sec-fetch-site': 'same-site', origin: TEST_ORIGIN }, 403],
    ['a page that hides its origin', { origin: 'null' }, 403],
    ['the address asked for in the camp network', { origin: 'http://192.168.4.1:3310', host: '192.168.4.1:3310' }, 200],
  ])('%s', async (_, headers, status) => {
    expect((await storeAs(crew, JSON.stringify(good), headers)).status).toBe(status);
  });
  it('over https only the exact origin counts, whatever host was asked', async () => {
    vi.stubEnv('NEXTAUTH_URL', 'https://lammas.test');
    const from = (origin: string) => storeAs(crew, JSON.stringify(good), { origin, host: 'other.test' });
    const statuses = [(await from('http://other.test')).status, (await from('https://other.test')).status, (await from('https://lammas.test')).status];
    vi.stubEnv('NEXTAUTH_URL', TEST_ORIGIN);
    expect(statuses).toEqual([403, 403, 200]);
  });
});

describe('what goes wrong inside', () => {
  const failing = (error: unknown) => route({ access: 'public' }, () => { throw error; });
  const call = async (error: unknown) => problem(await failing(error)(new Request(`${TEST_ORIGIN}/api/x`), routeContext()));

  it('a problem is answered with its own members', async () => {
    expect(await call(new Problem('gap', { members: { ackSeq: 7 } }))).toMatchObject({ status: 409, code: 'gap', ackSeq: 7 });
  });
  it('anything unforeseen is 500 and tells nothing of itself', async () => {
    const log = vi.spyOn(console, 'error').mockImplementation(() => undefined);
    expect(JSON.stringify(await call(new Error('secret detail')))).not.toContain('secret');
    expect(log).toHaveBeenCalledOnce();
  });
  it('a store without room is 507', async () => {
    vi.spyOn(console, 'error').mockImplementation(() => undefined);
    const full = route({ access: 'public' }, () => write(async () => { throw Object.assign(new Error('database or disk is full'), { code: 'SQLITE_FULL' }); }));
    expect((await full(new Request(`${TEST_ORIGIN}/api/x`), routeContext())).status).toBe(507);
  });
  it('an answer that is not what the route promises does not leave', async () => {
    vi.spyOn(console, 'error').mockImplementation(() => undefined);
    const leaking = route({ access: 'public', reply: z.strictObject({ name: z.string() }) }, () => ({ name: 'a', passwordHash: 'b' }));
    expect((await leaking(new Request(`${TEST_ORIGIN}/api/x`), routeContext())).status).toBe(500);
  });
});
