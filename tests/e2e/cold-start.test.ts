import { mkdtemp, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase } from '@/models';
import { killBrowser, launchProfile, startServer, stopServer } from '../support/browser';
import type { Profile, Server } from '../support/browser';
import { seedFieldProject } from '../support/seed-field-project';
import { freshDatabase } from '../support/server-database';

const PORT = Number(process.env.LAMMAS_TEST_PORT ?? 3331);
const STARTS = 30;
const PATIENCE_MS = 15_000;

const median = (values: readonly number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)]!;

describe('cold start of the shell offline', () => {
  let database: Awaited<ReturnType<typeof freshDatabase>>;
  let server: Server | null = null;
  let profile: Profile | null = null;
  let folder = '';
  let projectId = '';

  beforeAll(async () => {
    database = await freshDatabase();
    const seeded = await seedFieldProject();
    projectId = seeded.projectId;
    await closeDatabase();
    folder = await mkdtemp(path.join(os.tmpdir(), 'lammas-profile-'));
    server = await startServer({ port: PORT, dataDir: database.folder });
    profile = await launchProfile(folder);
    const { page } = profile;
    const { email, password } = seeded.signIn('crewA');
    await page.goto(`${server.origin}/field`);
    await page.getByLabel('E-mail').fill(email);
    await page.getByLabel('Password').fill(password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByRole('button', { name: /^Fetch work pack of Velmarrow/ }).click();
    await page.getByRole('button', { name: /^Open Velmarrow/ }).click();
    await page.getByText('60 plots, 60 to go').waitFor();
    // The production worker, whole: active only after every file of its manifest is in the cache.
    await page.evaluate(() => navigator.serviceWorker.ready.then(() => undefined));
    expect(await page.evaluate(() => navigator.serviceWorker.getRegistration('/field').then((found) => found?.active?.scriptURL))).toBe(`${server.origin}/sw.js`);
  });

  afterAll(async () => {
    if (profile) await killBrowser(profile);
    if (server) await stopServer(server, 'SIGKILL');
    await database.close();
    await rm(folder, { recursive: true, force: true });
  });

  it(`shows the stored plot and the stored plot list ${STARTS} times out of ${STARTS}: browser killed, server stopped, same profile`, async () => {
    const { origin } = server!;
    const { page } = profile!;
    await page.getByRole('button', { name: /^Plot 107/ }).click();
    await page.getByRole('heading', { name: 'Plot 107' }).waitFor();
    const wayIn = await page.getByText(/^Park at /).innerText();
    const plotLink = page.url();
    const listLink = `${origin}/field/p/${projectId}`;
    await stopServer(server!, 'SIGKILL');

    const times: number[] = [];
    for (let start = 1; start <= STARTS; start++) {
      await killBrowser(profile!);
      profile = await launchProfile(folder);
      const shown = profile.page;
      const asked: string[] = [];
      shown.on('requestfailed', (request) => asked.push(request.url()));
      const since = performance.now();
      // Even starts open the list, odd ones the plot: both are deep links that no server can answer now.
      if (start % 2 === 0) {
        await shown.goto(listLink, { timeout: PATIENCE_MS, waitUntil: 'commit' });
        await shown.getByText('60 plots, 60 to go').waitFor({ timeout: PATIENCE_MS });
        await shown.getByRole('button', { name: /^Plot 107/ }).waitFor({ timeout: PATIENCE_MS });
      } else {
        await shown.goto(plotLink, { timeout: PATIENCE_MS, waitUntil: 'commit' });
        await shown.getByRole('heading', { name: 'Plot 107' }).waitFor({ timeout: PATIENCE_MS });
        await shown.getByText(wayIn, { exact: true }).waitFor({ timeout: PATIENCE_MS });
      }
      times.push(performance.now() - since);
      expect(asked.filter((url) => url.includes('/_next/') || url.includes('_rsc')), `start ${start} asked for what is not on the device`).toEqual([]);
    }
    console.log(`Cold starts offline: ${times.length} of ${STARTS}, median ${Math.round(median(times))} ms, slowest ${Math.round(Math.max(...times))} ms`);
    expect(times).toHaveLength(STARTS);
  });
});
