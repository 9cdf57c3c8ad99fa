import { appendFile, readFile, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { killBrowser, launchProfile, startServer, stopServer } from '../support/browser';
import type { Profile, Server } from '../support/browser';
import { demoData, saved, setUpPhone, shot, tap, watchConsole } from '../support/journey';

const PORT = Number(process.env.LAMMAS_TEST_PORT ?? 3331) + 4;
const PROJECT = 'Velmarrow estate';
const WORKER = path.join('public', 'sw.js');

describe('a new version of the worker', () => {
  let data: Awaited<ReturnType<typeof demoData>>;
  let server: Server;
  let phone: Profile | null = null;
  let built = '';

  beforeAll(async () => {
    data = await demoData();
    built = await readFile(WORKER, 'utf8');
    server = await startServer({ port: PORT, dataDir: data.folder });
  });
  afterAll(async () => {
    await writeFile(WORKER, built);
    if (phone) await killBrowser(phone);
    await stopServer(server, 'SIGKILL');
    await data.close();
  });

  it('waits while an entry is open, is offered afterwards, and comes in when the person says so, losing nothing', async () => {
    phone = await launchProfile(path.join(data.profiles, 'phone'));
    const { page } = phone;
    const errors = watchConsole(page);
    await setUpPhone(page, server.origin, 'crewA', PROJECT);
    const home = page.url();
    await page.getByRole('button', { name: /^Plot 108/ }).click();
    await page.getByRole('button', { name: 'Start a visit' }).click();
    await page.getByRole('button', { name: 'Norway spruce' }).click();
    await tap(page, '28.4');
    await page.getByRole('button', { name: 'Next: Height' }).click();
    await saved(page);
    await tap(page, '23.1');

    await appendFile(WORKER, '\n// a newer version\n');
    await page.evaluate(() => navigator.serviceWorker.getRegistration('/field').then((found) => found?.update()).then(() => undefined));
    const state = () => page.evaluate(async () => {
      const found = await navigator.serviceWorker.getRegistration('/field');
      return { waiting: found?.waiting !== null, active: found?.active?.state };
    });
    await expect.poll(state, { timeout: 20_000 }).toEqual({ waiting: true, active: 'activated' });
    // The entry goes on undisturbed under the old version.
    await page.waitForTimeout(1000);
    expect(await page.getByRole('button', { name: 'use it' }).count()).toBe(0);
    await page.getByRole('button', { name: /^Next: Done/ }).click();
    await saved(page);

    await page.getByRole('button', { name: 'Back to the plot' }).click();
    const offer = page.getByRole('button', { name: 'use it' });
    await offer.waitFor();
    await shot(page, 'update-offered');
    await Promise.all([page.waitForEvent('load'), offer.click()]);
    await expect.poll(state, { timeout: 20_000 }).toEqual({ waiting: false, active: 'activated' });
    await page.goto(home);
    await page.getByRole('button', { name: /^Plot 108 Open, 1 tree/ }).waitFor();
    expect(errors).toEqual([]);
  });
});
