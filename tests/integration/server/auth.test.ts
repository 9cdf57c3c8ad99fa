import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { GET as getMe } from '@/app/api/v1/me/route';
import { GET as getHealth } from '@/app/api/health/route';
import { UserRefusedError, createUser } from '@/lib/server/create-user';
import { addMembership } from '@/lib/server/add-membership';
import { getUser, sessionCookie, signIn } from '@/lib/server/auth';
import { revokeAllSessions, revokeSession, startSession } from '@/lib/server/session';
import { write } from '@/lib/server/write-queue';
import { LATEST_MIGRATION } from '@/models/migrations';
import { TEST_ORIGIN, makeProject, makeUser, routeContext, signedInRequest, startTestServer } from '../../support/server';
import type { TestServer } from '../../support/server';

let server: TestServer;
beforeAll(async () => { server = await startTestServer(); });
afterAll(async () => server.close());

const PASSWORD = 'moss on the north side';
const withCookie = (cookie: string) => ({ headers: new Headers({ cookie }) });
let person: { id: string; email: string };
beforeAll(async () => { person = await createUser({ email: 'Ingrid@Lammas.Test', name: 'Ingrid Vale', password: PASSWORD }); });

describe('making a person', () => {
  it('keeps the address in lower case, and the password only as a bcrypt hash of cost 12', async () => {
    const row = await server.models.User.findByPk(person.id);
    expect(row).toMatchObject({ email: 'ingrid@lammas.test', admin: false, disabled: false });
    expect(row?.passwordHash).toMatch(/^\$2[ab]\$12\$/);
  });
  it('refuses an address that is taken, however it is written', async () => {
    await expect(createUser({ email: 'INGRID@lammas.test', name: 'Other', password: PASSWORD })).rejects.toBeInstanceOf(UserRefusedError);
  });
  it.each([['short one', 'short'], ['common', 'Password-1234'], ['73 bytes', 'é'.repeat(37)]])('refuses a password that is %s', async (_, password) => {
    await expect(createUser({ email: 'new@lammas.test', name: 'New', password })).rejects.toBeInstanceOf(UserRefusedError);
  });
});

describe('signing in', () => {
  it('the right password starts a session, whatever the case of the address', async () => {
    const claims = await signIn({ email: ' INGRID@lammas.test', password: PASSWORD }, 'a1');
    expect(claims).toMatchObject({ userId: person.id });
    expect(await getUser(withCookie(await sessionCookie(claims!)))).toMatchObject({ id: person.id, email: 'ingrid@lammas.test' });
  });
  it.each([
    ['a wrong password', { email: 'ingrid@lammas.test', password: 'moss on the south side' }],
    ['an unknown address', { email: 'nobody@lammas.test', password: PASSWORD }],
    ['no password', { email: 'ingrid@lammas.test', password: '' }],
    ['things that are not text', { email: { $ne: null }, password: ['x'] }],
    ['nothing', undefined],
  ])('%s gets the same answer', async (_, credentials) => {
    expect(await signIn(credentials, 'a2')).toBeNull();
  });
  it('a disabled person gets the same answer', async () => {
    const disabled = await makeUser({ disabled: true, password: PASSWORD });
    expect(await signIn({ email: disabled.email, password: PASSWORD }, 'a3')).toBeNull();
  });
  it('an unknown address takes as long as a known one', async () => {
    const timed = async (email: string) => {
      const start = performance.now();
      await signIn({ email, password: 'not the password' }, 'a4');
      return performance.now() - start;
    };
    await timed('warm-up@lammas.test');
    const [unknown, known] = [await timed('unknown@lammas.test'), await timed('ingrid@lammas.test')];
    // bcrypt at cost 12 takes tenths of a second; a look-up alone takes a few milliseconds.
    expect(unknown).toBeGreaterThan(known / 3);
  });
  it('the sixth attempt on an account within a minute fails even with the right password', async () => {
    const user = await makeUser({ password: PASSWORD });
    for (let i = 0; i < 5; i += 1) await signIn({ email: user.email, password: 'not the password' }, `b${i}`);
    expect(await signIn({ email: user.email, password: PASSWORD }, 'b6')).toBeNull();
  });
});

describe('a session', () => {
  const session = async () => {
    const user = await makeUser();
    const claims = await startSession(user.id);
    return { user, claims, request: withCookie(await sessionCookie(claims)) };
  };

  it('ends by itself, leaving the others', async () => {
    const { user, claims, request } = await session();
    const second = withCookie(await sessionCookie(await startSession(user.id)));
    await revokeSession(claims.sessionId);
    expect(await getUser(request)).toBeNull();
    expect(await getUser(second)).toMatchObject({ id: user.id });
  });
  it('ends with all others of the person', async () => {
    const { user, request } = await session();
    await revokeAllSessions(user.id);
    expect(await getUser(request)).toBeNull();
    expect(await getUser(withCookie(await sessionCookie(await startSession(user.id))))).toMatchObject({ id: user.id });
  });
  it('ends when the person is disabled', async () => {
    const { user, request } = await session();
    await write(({ models, transaction }) => models.User.update({ disabled: true }, { where: { id: user.id }, transaction }));
    expect(await getUser(request)).toBeNull();
  });
  it('ends after 30 days', async () => {
    const { claims, request } = await session();
    const old = new Date(Date.now() - 31 * 86_400_000).toISOString();
    await write(({ models, transaction }) => models.Session.update({ createdAt: old }, { where: { id: claims.sessionId }, transaction }));
    expect(await getUser(request)).toBeNull();
  });
  it('cannot be taken for another person, another secret, or another token', async () => {
    const { claims, request } = await session();
    const other = await makeUser();
    expect(await getUser(withCookie(await sessionCookie({ ...claims, userId: other.id })))).toBeNull();
    expect(await getUser(withCookie('lammas-session=nonsense'))).toBeNull();
    vi.stubEnv('NEXTAUTH_SECRET', 'another secret of enough characters');
    const foreign = await getUser(request);
    vi.stubEnv('NEXTAUTH_SECRET', 'a secret for tests that is long enough');
    expect(foreign).toBeNull();
  });
  it('over https travels only in a __Host- cookie', async () => {
    const { claims } = await session();
    vi.stubEnv('NEXTAUTH_URL', 'https://lammas.test');
    const cookie = await sessionCookie(claims);
    const plain = await getUser(withCookie(cookie.replace('__Host-', '')));
    const host = await getUser(withCookie(cookie));
    vi.stubEnv('NEXTAUTH_URL', TEST_ORIGIN);
    expect(cookie).toMatch(/^__Host-lammas-session=/);
    expect([plain, host?.id]).toEqual([null, claims.userId]);
  });
});

describe('GET /api/v1/me', () => {
  const me = async (user: { id: string }) => (await getMe(await signedInRequest(user, '/api/v1/me'), routeContext())).json();

  it('tells a person their own projects and roles, and no others', async () => {
    const mine = await makeProject({ name: 'Aldermoor' });
    await makeProject({ name: 'Zennor Wood' });
    const user = await makeUser({ roles: { [mine.id]: 'crew' } });
    const expected = (role: string) => ({ user: { ...user, admin: false }, projects: [{ id: mine.id, name: 'Aldermoor', role }] });
    expect(await me(user)).toEqual(expected('crew'));
    await addMembership({ userId: user.id, projectId: mine.id, role: 'lead' });
    expect(await me(user)).toEqual(expected('lead'));
  });
  it('tells an administrator all projects', async () => {
    const admin = await makeUser({ admin: true });
    const { projects } = (await me(admin)) as { projects: { role: string }[] };
    expect(projects.length).toBe(await server.models.Project.count());
    expect(new Set(projects.map(({ role }) => role))).toEqual(new Set(['admin']));
  });
});

describe('GET /api/health', () => {
  it('says that the database answers, its schema and its epoch', async () => {
    const epoch = (await server.models.ServerMeta.findByPk('epoch'))?.value;
    const response = await getHealth(new Request(`${TEST_ORIGIN}/api/health`), routeContext());
    expect(await response.json()).toEqual({ ok: true, database: 'ok', schema: LATEST_MIGRATION, epoch });
  });
});
