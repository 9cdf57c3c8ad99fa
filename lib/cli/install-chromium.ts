import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';

/** Where the browser tests look for Chromium. */
export const CHROMIUM = process.env.LAMMAS_CHROMIUM || '/usr/bin/chromium';

function apt(...args: string[]): boolean {
  const result = spawnSync('apt-get', args, { stdio: 'inherit', env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' } });
  return result.status === 0;
}

/**
 * Sees to it that there is a Chromium for the browser tests: installs Debian's where this may be done (root, apt-get).
 * Result: null when it is there, else one line that says what to install.
 */
export function installChromium(): string | null {
  if (existsSync(CHROMIUM)) return null;
  const advice = `Chromium is missing at ${CHROMIUM}: install it (on Debian: apt-get install -y chromium), or name one with LAMMAS_CHROMIUM.`;
  const mayInstall = process.getuid?.() === 0 && existsSync('/usr/bin/apt-get') && !process.env.LAMMAS_CHROMIUM;
  if (!mayInstall) return advice;
  console.log('Installing Debian’s Chromium for the browser tests …');
  const packages = ['--no-install-recommends', 'chromium', 'fonts-liberation'] as const;
  // The lists may be old or absent on a fresh machine; they are fetched only when the packages cannot be had without.
  const done = apt('install', '-y', '-q', ...packages) || (apt('update', '-q') && apt('install', '-y', '-q', ...packages));
  return done && existsSync(CHROMIUM) ? null : advice;
}
