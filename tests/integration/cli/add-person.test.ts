import { spawnSync } from 'node:child_process';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase, openDatabase } from '@/models';
import { verifyPassword } from '@/lib/server/password';
import { makeProject, startTestServer } from '../../support/server';
import type { TestServer } from '../../support/server';

describe('npm run add-person', () => {
  let server: TestServer;
  beforeAll(async () => {
    server = await startTestServer();
    await makeProject({ name: 'Harrowdene' });
  });
  afterAll(() => server.close());

  const run = async (args: readonly string[], password?: string) => {
    await closeDatabase();
    return spawnSync('npm', ['run', '--silent', 'add-person', '--', ...args], {
      encoding: 'utf8', env: { ...process.env, LAMMAS_DATA: server.folder, ...(password === undefined ? {} : { LAMMAS_PASSWORD: password }) },
    });
  };

  it('makes the first administrator, who can sign in with the password given', async () => {
    const { status, stdout } = await run(['--email', 'Ada@Lammas.test', '--name', 'Ada Brook', '--admin'], 'a long enough password');
    expect([status, stdout]).toEqual([0, 'Ada Brook may now sign in as administrator.\n']);
    const { models } = await openDatabase();
    const user = await models.User.findOne({ where: { email: 'ada@lammas.test' } });
    expect(user).toMatchObject({ name: 'Ada Brook', admin: true });
    expect(await verifyPassword('a long enough password', user!.passwordHash)).toBe(true);
  });

  it('adds a membership to somebody who is there, and changes nothing else', async () => {
    const { status, stdout } = await run(['--email', 'ada@lammas.test', '--project', 'Harrowdene', '--role', 'lead']);
    expect(status).toBe(0);
    expect(stdout).toMatch(/already[\s\S]*Member of "Harrowdene" as lead/);
    const { models } = await openDatabase();
    expect(await models.Membership.count()).toBe(1);
  });

  it.each([
    [['--name', 'Nobody'], 2, /Usage/], [['--email', 'x@lammas.test', '--name', 'X', '--project', 'Harrowdene'], 2, /Usage/],
    [['--email', 'x@lammas.test', '--name', 'X', '--project', 'Elsewhere', '--role', 'crew'], 1, /no project "Elsewhere".*Harrowdene/],
    [['--email', 'x@lammas.test', '--name', 'X', '--role', 'king', '--project', 'Harrowdene'], 2, /Usage/], [['--e', 'x'], 2, /Usage/],
  ] as const)('%j ends with %d and says what to do', async (args, wanted, words) => {
    const { status, stderr } = await run(args, 'a long enough password');
    expect(status).toBe(wanted);
    expect(stderr).toMatch(words);
  });

  it('refuses a password that is too short, making nobody', async () => {
    const { status, stderr } = await run(['--email', 'y@lammas.test', '--name', 'Y'], 'short');
    expect(status).toBe(1);
    expect(stderr).toMatch(/12/);
    const { models } = await openDatabase();
    expect(await models.User.count({ where: { email: 'y@lammas.test' } })).toBe(0);
  });
});
