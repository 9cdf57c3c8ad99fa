import { execFile } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { createServer } from 'node:net';
import type { AddressInfo } from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '../../..');
let folder: string;
beforeAll(async () => { folder = await mkdtemp(path.join(os.tmpdir(), 'lammas-start-')); });
afterAll(async () => rm(folder, { recursive: true, force: true }));

function start(environment: Record<string, string>, script = 'start.ts'): Promise<{ code: number; errors: string; output: string }> {
  const env = { PATH: process.env.PATH ?? '', HOME: process.env.HOME ?? '', NODE_ENV: 'production' as const, UV_THREADPOOL_SIZE: '16', LAMMAS_DATA: path.join(folder, 'data'), ...environment };
  return new Promise((resolve) => {
    execFile(process.execPath, ['--import', 'tsx', '--conditions=react-server', path.join('lib', 'cli', script)], { cwd: root, env, timeout: 50_000 },
      (error, output, errors) => resolve({ code: typeof error?.code === 'number' ? error.code : error ? -1 : 0, errors, output }));
  });
}
const good = { NEXTAUTH_SECRET: 's'.repeat(40), NEXTAUTH_URL: 'http://localhost:3312', PORT: '3312' };

describe('npm start', () => {
  it('without a secret says how to make one, and does not start', async () => {
    const { code, errors } = await start({ ...good, NEXTAUTH_SECRET: '' });
    expect(code).toBe(1);
    expect(errors.trim().split('\n')).toEqual(['The environment is not right:', expect.stringContaining('NEXTAUTH_SECRET is not set')]);
  });

  it('without a build says how to make one', async () => {
    const { code, errors } = await start({ ...good, LAMMAS_DIST: 'no-such-build' });
    expect(code).toBe(1);
    expect(errors).toMatch(/There is no build in no-such-build. Make one with: npm run build/);
  });

  it('on a port that is taken says so', async () => {
    await writeFile(path.join(folder, 'BUILD_ID'), 'x');
    const other = createServer();
    await new Promise<void>((resolve) => { other.listen(0, resolve); });
    const { port } = other.address() as AddressInfo;
    const { code, errors } = await start({ ...good, PORT: String(port), LAMMAS_DIST: path.relative(root, folder) });
    await new Promise((resolve) => { other.close(resolve); });
    expect(code).toBe(1);
    expect(errors).toMatch(new RegExp(`Port ${port} is taken`));
  });
});

describe('npm run migrate', () => {
  it('makes the database, and the second time has nothing to do', async () => {
    const LAMMAS_DATA = path.join(folder, 'migrated');
    expect(await start({ LAMMAS_DATA }, 'migrate.ts')).toMatchObject({ code: 0, output: expect.stringMatching(/ran 0001-/) as string });
    expect(await start({ LAMMAS_DATA }, 'migrate.ts')).toMatchObject({ code: 0, output: expect.stringMatching(/nothing to migrate/) as string });
  });
});
