import path from 'node:path';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { killBrowser, launchProfile, startServer, stopServer } from '../support/browser';
import type { Profile, Server } from '../support/browser';
import { demoData, saved, setUpPhone, shot, signInAgain, tap, watchConsole } from '../support/journey';

const PORT = Number(process.env.LAMMAS_TEST_PORT ?? 3331) + 3;
const PROJECT = 'Velmarrow estate';

async function recordTree(page: Page, plot: string, dbh: string, height: string): Promise<void> {
  await page.getByRole('button', { name: new RegExp(`^Plot ${plot}`) }).click();
  await page.getByRole('button', { name: 'Start a visit' }).click();
  await page.getByRole('button', { name: 'Norway spruce' }).click();
  await tap(page, dbh);
  await page.getByRole('button', { name: 'Next: Height' }).click();
  await tap(page, height);
  await page.getByRole('button', { name: /^Next: Done/ }).click();
  await saved(page);
}

async function sync(page: Page, origin: string, key: 'crewA' | 'crewB', projectPath: string): Promise<void> {
  await page.goto(`${origin}${projectPath}/sync`);
  await page.getByRole('button', { name: 'Sync now' }).click();
  await signInAgain(page, key);
  await page.getByText('Everything on this phone has reached the server.').waitFor({ timeout: 30_000 });
}

describe('two phones on one project', () => {
  let data: Awaited<ReturnType<typeof demoData>>;
  let server: Server;
  const phones: Profile[] = [];

  beforeAll(async () => {
    data = await demoData();
    server = await startServer({ port: PORT, dataDir: data.folder });
  });
  afterAll(async () => {
    for (const phone of phones) await killBrowser(phone);
    await stopServer(server, 'SIGKILL');
    await data.close();
  });

  it('exchange their plots at camp, doubts included, after working apart without network', async () => {
    for (const [i, key] of (['crewA', 'crewB'] as const).entries()) {
      phones.push(await launchProfile(path.join(data.profiles, `phone-${i}`)));
      await setUpPhone(phones[i]!.page, server.origin, key, PROJECT);
    }
    const [a, b] = phones.map(({ page }) => page) as [Page, Page];
    const errors = [a, b].map(watchConsole);
    const projectPath = new URL(a.url()).pathname;
    await stopServer(server, 'SIGKILL');
    await recordTree(a, '104', '28.4', '23.1');
    await recordTree(b, '106', '30.5', '45');
    await b.getByRole('region', { name: 'Second look at the height' }).waitFor();

    server = await startServer({ port: PORT, dataDir: data.folder });
    await sync(a, server.origin, 'crewA', projectPath);
    await sync(b, server.origin, 'crewB', projectPath);
    await sync(a, server.origin, 'crewA', projectPath);

    for (const page of [a, b]) {
      await page.goto(`${server.origin}${projectPath}`);
      await page.getByRole('button', { name: /^Plot 104 Open, 1 tree/ }).waitFor();
      await page.getByRole('button', { name: /^Plot 106 Open, 1 tree/ }).waitFor();
      await page.getByText('1 open doubt').waitFor();
    }
    // The other crew's tree, as it was entered, with its doubt.
    await a.getByRole('button', { name: /^Plot 106/ }).click();
    await a.getByRole('button', { name: /^Continue the visit/ }).click();
    await a.getByRole('button', { name: /^List: 1 tree/ }).click();
    await expect.poll(() => a.getByRole('region', { name: 'Trees recorded' }).innerText()).toMatch(/30\.5 cm · 45 m/);
    await shot(a, 'phones-other-crew');
    expect(errors.flat()).toEqual([]);
  });
});
