import { spawn } from 'node:child_process';
import type { ChildProcess } from 'node:child_process';
import { existsSync } from 'node:fs';
import { mkdir, readFile, rm } from 'node:fs/promises';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { chromium } from 'playwright-core';
import type { Browser, BrowserContext, Page } from 'playwright-core';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
export const CHROMIUM = process.env.LAMMAS_CHROMIUM || '/usr/bin/chromium';
/** The phone of the field tests. */
export const PHONE = { width: 360, height: 740 } as const;

export type Server = { readonly origin: string; readonly port: number; readonly dataDir: string; readonly process: ChildProcess; readonly log: () => string };

const wait = (ms: number) => new Promise<void>((resolve) => setTimeout(resolve, ms));

function exited(child: ChildProcess): Promise<void> {
  return child.exitCode !== null || child.signalCode !== null ? Promise.resolve() : new Promise((resolve) => child.once('exit', () => resolve()));
}

/**
 * Starts the production server from the build at hand as one process and waits until it is healthy.
 *
 * @param port its port; `dataDir` the folder of its database (made and migrated when it is new)
 * @returns the running server; errors: no build, or not healthy within a minute (with what it printed)
 */
export async function startServer({ port, dataDir, buildDir = root, env = {} }: {
  port: number; dataDir: string; buildDir?: string; env?: Readonly<Record<string, string>>;
}): Promise<Server> {
  const dist = path.resolve(buildDir, process.env.LAMMAS_DIST || '.next');
  if (!existsSync(path.join(dist, 'BUILD_ID')) || !existsSync(path.join(buildDir, 'public/sw.js'))) throw new Error(`There is no whole production build in ${dist}: npm run build comes first.`);
  const origin = `http://localhost:${port}`;
  const child = spawn(process.execPath, ['--conditions=react-server', '--import', 'tsx', 'lib/cli/start.ts'], {
    cwd: buildDir, detached: true, stdio: ['ignore', 'pipe', 'pipe'],
    env: {
      ...process.env, NODE_ENV: 'production', PORT: String(port), NEXTAUTH_URL: origin, NEXTAUTH_SECRET: 'only-for-tests-and-longer-than-32-characters',
      LAMMAS_DATA: dataDir, UV_THREADPOOL_SIZE: '16', NEXT_TELEMETRY_DISABLED: '1', ...env,
    },
  });
  let printed = '';
  const keep = (chunk: Buffer) => { printed = (printed + chunk.toString()).slice(-20_000); };
  child.stdout.on('data', keep);
  child.stderr.on('data', keep);
  const server: Server = { origin, port, dataDir, process: child, log: () => printed };
  const until = Date.now() + 60_000;
  while (Date.now() < until) {
    if (child.exitCode !== null || child.signalCode !== null) throw new Error(`The server ended before it was healthy.\n${printed}`);
    const healthy = await fetch(`${origin}/api/health`).then(({ ok }) => ok, () => false);
    if (healthy) return server;
    await wait(150);
  }
  await stopServer(server, 'SIGKILL');
  throw new Error(`The server was not healthy within a minute.\n${printed}`);
}

/** Ends the server's process group and waits until its port is free. SIGKILL ends it as a power cut would. */
export async function stopServer(server: Server, signal: 'SIGTERM' | 'SIGKILL' = 'SIGTERM'): Promise<void> {
  const { pid } = server.process;
  if (pid !== undefined && server.process.exitCode === null && server.process.signalCode === null) {
    if (signal === 'SIGTERM') server.process.kill('SIGTERM');
    else process.kill(-pid, 'SIGKILL');
  }
  const gone = await Promise.race([exited(server.process).then(() => true), wait(15_000).then(() => false)]);
  if (!gone && pid !== undefined) process.kill(-pid, 'SIGKILL');
  await exited(server.process);
  if (await fetch(`${server.origin}/api/health`).then(() => true, () => false)) throw new Error(`Something still answers at ${server.origin}`);
}

export type Profile = {
  readonly dir: string;
  readonly process: ChildProcess;
  readonly browser: Browser;
  readonly context: BrowserContext;
  /** A page of our own, sized as the viewport. */
  readonly page: Page;
};

async function debuggingAddress(dir: string, child: ChildProcess): Promise<string> {
  const file = path.join(dir, 'DevToolsActivePort');
  const until = Date.now() + 30_000;
  while (Date.now() < until) {
    if (child.exitCode !== null || child.signalCode !== null) throw new Error('Chromium ended at its start');
    const [port] = (await readFile(file, 'utf8').catch(() => '')).split('\n');
    if (port) return `http://127.0.0.1:${port}`;
    await wait(25);
  }
  throw new Error('Chromium opened no debugging port');
}

/**
 * Starts Chromium on a profile folder that outlives it, as a process of its own that `killBrowser` can end with SIGKILL.
 * Storage, caches and service workers of the profile are those of the last start.
 */
export async function launchProfile(dir: string, { viewport = PHONE, args = [] }: { viewport?: { width: number; height: number }; args?: readonly string[] } = {}): Promise<Profile> {
  await mkdir(dir, { recursive: true });
  // Left by a killed browser; they would make the next one wait.
  await Promise.all(['DevToolsActivePort', 'SingletonLock', 'SingletonSocket', 'SingletonCookie'].map((name) => rm(path.join(dir, name), { force: true })));
  const child = spawn(CHROMIUM, [
    '--headless', '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update',
    '--disable-sync', '--no-default-browser-check', '--remote-debugging-port=0', `--user-data-dir=${dir}`, `--window-size=${viewport.width},${viewport.height}`,
    ...args, 'about:blank',
  ], { detached: true, stdio: 'ignore' });
  const browser = await chromium.connectOverCDP(await debuggingAddress(dir, child));
  const [context] = browser.contexts();
  if (!context) throw new Error('Chromium has no profile context');
  // Not the page that the browser opened for itself: at its start that one may still be taken away.
  const page = await context.newPage();
  await page.setViewportSize({ ...viewport });
  return { dir, process: child, browser, context, page };
}

/** Ends the browser and all its processes with SIGKILL, as a battery that gives out would. */
export async function killBrowser({ process: child, browser }: Profile): Promise<void> {
  if (child.pid !== undefined && child.exitCode === null && child.signalCode === null) process.kill(-child.pid, 'SIGKILL');
  await exited(child);
  // Only the driver's own end of the line; nothing of the browser is left to hear it.
  await browser.close().catch(() => undefined);
}
