import { spawnSync } from 'node:child_process';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { killBrowser, launchProfile, startServer, stopServer } from '../support/browser';
import type { Profile, Server } from '../support/browser';
import { demoData, saved, setUpPhone, shot, tap, watchConsole } from '../support/journey';

const PORT = Number(process.env.LAMMAS_TEST_PORT ?? 3331) + 2;
const PROJECT = 'Dunmorrow tract';

// 31 black cherry trees: Ryan, Joiner and Ryan 1976 (tests/reference/black-cherry).
describe('a project in inches and feet, its band from 31 black cherry trees', () => {
  let data: Awaited<ReturnType<typeof demoData>>;
  let server: Server | null = null;
  let phone: Profile | null = null;

  beforeAll(async () => {
    data = await demoData();
  });

  afterAll(async () => {
    if (phone) await killBrowser(phone);
    if (server) await stopServer(server, 'SIGKILL');
    await data.close();
  });

  it('is fed by the import command, and warns at 24 ft (metres) on a 14 in tree while 80 ft passes without a word', async () => {
    const imported = spawnSync('npm', [
      'run', '--silent', 'import', '--', '--project', PROJECT, 'tests/reference/black-cherry/trees.csv', '--dbh', 'Girth', '--height', 'Height',
      '--species-name', 'black cherry', '--dbh-unit', 'in', '--height-unit', 'ft', '--publish', '--note', 'Ryan, Joiner and Ryan 1976',
    ], { encoding: 'utf8', env: { ...process.env, LAMMAS_DATA: data.folder } });
    expect(imported.stderr).toBe('');
    expect(imported.stdout).toMatch(/Took 31 trees/);
    expect(imported.stdout).toMatch(/Published curtis curve of black cherry, version 2/);

    server = await startServer({ port: PORT, dataDir: data.folder });
    phone = await launchProfile(path.join(data.profiles, 'phone'));
    const { page } = phone;
    const errors = watchConsole(page);
    await setUpPhone(page, server.origin, 'neighbour', PROJECT);
    await stopServer(server, 'SIGKILL');
    await page.getByRole('button', { name: /^Plot R01/ }).click();
    await page.getByRole('button', { name: 'Start a visit' }).click();

    await page.getByRole('button', { name: 'Black cherry' }).click();
    await tap(page, '14');
    await page.getByRole('button', { name: 'Next: Height' }).click();
    await tap(page, '80');
    await saved(page);
    await page.getByRole('button', { name: 'Next tree' }).click();
    await page.getByRole('region', { name: 'Tree 2' }).waitFor();
    expect(await page.getByRole('region', { name: /^Second look/ }).count()).toBe(0);
    await shot(page, 'tract-01-eighty-feet');

    await page.getByRole('button', { name: 'Black cherry' }).click();
    await tap(page, '14');
    await page.getByRole('button', { name: 'Next: Height' }).click();
    await tap(page, '24');
    await page.getByRole('button', { name: 'Next tree' }).click();
    const doubt = page.getByRole('region', { name: 'Second look at the height' });
    await doubt.waitFor();
    await shot(page, 'tract-02-metres');
    expect(await doubt.innerText()).toContain('Height 24 looks like metres, not feet.');
    await doubt.getByRole('button', { name: /^Take 79 ft/ }).click();
    await saved(page);
    await expect.poll(() => page.getByRole('region', { name: /^Second look/ }).count()).toBe(0);
    await page.getByRole('button', { name: /^List: 2 trees/ }).click();
    const list = page.getByRole('region', { name: 'Trees recorded' });
    await expect.poll(() => list.innerText()).toMatch(/79/);
    await shot(page, 'tract-03-list');
    expect(errors).toEqual([]);
  });
});
