import { mkdtemp, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import Papa from 'papaparse';
import { expect } from 'vitest';
import type { Page } from 'playwright-core';
import { closeDatabase } from '@/models';
import { demoPeople } from '@/seeders/demo-people';
import type { DemoPersonKey } from '@/seeders/demo-people';
import { seedDemo } from '@/seeders/seed-demo';
import { freshDatabase } from './server-database';

/** Where screenshots of the journeys are kept (not in the repository). */
const SHOTS = path.join('tests', 'e2e', 'shots');

/** A fresh database with the whole demo in it, closed, so that a server can open it; and a folder for browser profiles. */
export async function demoData() {
  const database = await freshDatabase();
  await seedDemo();
  await closeDatabase();
  const profiles = await mkdtemp(path.join(os.tmpdir(), 'lammas-profiles-'));
  return {
    folder: database.folder, profiles,
    close: async () => {
      await database.close();
      await rm(profiles, { recursive: true, force: true });
    },
  };
}

export function person(key: DemoPersonKey) {
  return demoPeople.find((one) => one.key === key)!;
}

/** Signs in on a phone, fetches one project's work pack and waits until the worker keeps the whole shell. */
export async function setUpPhone(page: Page, origin: string, key: DemoPersonKey, project: string): Promise<void> {
  const { email, password } = person(key);
  await page.goto(`${origin}/field`);
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByRole('button', { name: `Fetch work pack of ${project}` }).click();
  await page.getByRole('button', { name: `Open ${project}` }).click();
  await page.getByRole('heading', { name: project }).waitFor();
  await page.evaluate(() => navigator.serviceWorker.ready.then(() => undefined));
}

/**
 * Gives the password on the sync page where it is asked for: Chromium writes cookies to disk late, so a browser killed soon after
 * signing in has lost its session, as an expired one would be. Recording goes on without it.
 */
export async function signInAgain(page: Page, key: DemoPersonKey): Promise<void> {
  const asked = page.getByLabel('Password');
  await asked.or(page.getByText('has reached the server')).first().waitFor({ timeout: 30_000 });
  if (!(await asked.isVisible())) return;
  await asked.fill(person(key).password);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

/** Signs in at the desk and goes to a page of the office. */
export async function signInOffice(page: Page, origin: string, key: DemoPersonKey, to: string): Promise<void> {
  const { email, password } = person(key);
  await page.goto(`${origin}/signin?callbackUrl=${encodeURIComponent(to)}`);
  await page.getByLabel('E-mail address').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL(`${origin}${to}`);
}

/** Taps digits on the pad; '.' is the decimal key whatever sign it shows. */
export async function tap(page: Page, digits: string): Promise<void> {
  const pad = page.getByRole('group', { name: 'Digit pad' });
  for (const digit of digits) {
    await (digit === '.' || digit === ',' ? pad.getByRole('button', { name: /^Decimal/ }) : pad.getByRole('button', { name: digit, exact: true })).click();
  }
}

/** Waits until the screen says that what was entered is saved. */
export async function saved(page: Page): Promise<void> {
  await page.getByRole('region', { name: 'Last entry' }).getByText(/Saved/).waitFor();
}

export async function shot(page: Page, name: string): Promise<void> {
  await page.screenshot({ path: path.join(SHOTS, `${name}.png`) });
}

/** Errors that a page wrote to its console, except the network's own while the server is stopped. */
export function watchConsole(page: Page): string[] {
  const found: string[] = [];
  page.on('console', (message) => { if (message.type() === 'error' && !/ERR_|Failed to load resource/.test(message.text())) found.push(message.text()); });
  page.on('pageerror', (error) => { found.push(error.message); });
  return found;
}

/** Rows of a CSV text as objects. */
export function readCsv(text: string): Record<string, string>[] {
  const { data, errors } = Papa.parse<Record<string, string>>(text.trim(), { header: true });
  expect(errors).toEqual([]);
  return data;
}
