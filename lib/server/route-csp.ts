import 'server-only';
import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import path from 'node:path';
import { z } from 'zod';

const fieldCspSchema = z.object({ scriptHashes: z.array(z.string().regex(/^sha256-[A-Za-z0-9+/]{43}=$/)) });
let known: readonly string[] | null = null;
let knownNotFound: readonly string[] | null = null;

function builtFile(...parts: string[]): string {
  return path.join(/* turbopackIgnore: true */ process.cwd(), process.env.LAMMAS_DIST ?? '.next', ...parts);
}

/**
 * Hashes of the inline scripts of the page for unknown addresses. It is made once, at the build, so it cannot carry a
 * nonce; it may be answered to any address, so every rendered page's policy names them.
 */
export async function notFoundScriptHashes(): Promise<readonly string[]> {
  if (process.env.NODE_ENV !== 'production') return [];
  if (knownNotFound) return knownNotFound;
  const html = await readFile(builtFile('server', 'app', '_not-found.html'), 'utf8').catch(() => '');
  knownNotFound = [...html.matchAll(/<script(?![^>]*\ssrc=)[^>]*>([\s\S]*?)<\/script>/g)]
    .map(([, script]) => `sha256-${createHash('sha256').update(script ?? '').digest('base64')}`);
  return knownNotFound;
}

/**
 * Hashes of the inline scripts of the field's shell, as the step after the build found them (field-csp.json in the build
 * folder). In development there are none. A missing file is logged; the shell then cannot start its scripts.
 */
export async function fieldScriptHashes(): Promise<readonly string[]> {
  if (process.env.NODE_ENV !== 'production') return [];
  if (known) return known;
  const file = builtFile('field-csp.json');
  try {
    known = fieldCspSchema.parse(JSON.parse(await readFile(file, 'utf8'))).scriptHashes;
    return known;
  } catch (error) {
    console.error(`[csp] ${file} cannot be read; the field shell cannot start. Build with: npm run build`, error);
    return [];
  }
}

/**
 * The policy of a page; `scripts` are quoted sources for inline scripts. In development the bundler needs eval, inline
 * styles and its socket; in production nothing inline runs that is not named.
 */
export function contentSecurityPolicy(scripts: readonly string[], production = process.env.NODE_ENV === 'production'): string {
  const script = production ? ["'self'", ...scripts] : ["'self'", "'unsafe-inline'", "'unsafe-eval'"];
  return [
    "default-src 'none'",
    `script-src ${script.join(' ')}`,
    `style-src 'self'${production ? '' : " 'unsafe-inline'"}`,
    "font-src 'self'",
    "img-src 'self' blob: data:",
    "media-src 'self' blob:",
    `connect-src 'self'${production ? '' : ' ws: wss:'}`,
    "worker-src 'self'",
    "manifest-src 'self'",
    "object-src 'none'",
    "base-uri 'none'",
    "frame-ancestors 'none'",
    "form-action 'self'",
  ].join('; ');
}
