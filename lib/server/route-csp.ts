import 'server-only';
import { readFile } from 'node:fs/promises';
import path from 'node:path';
import { z } from 'zod';

const fieldCspSchema = z.object({ scriptHashes: z.array(z.string().regex(/^sha256-[A-Za-z0-9+/]{43}=$/)) });
let known: readonly string[] | null = null;

/**
 * Hashes of the inline scripts of the field's shell, as the step after the build found them (field-csp.json in the build
 * folder). In development there are none. A missing file is logged; the shell then cannot start its scripts.
 */
export async function fieldScriptHashes(): Promise<readonly string[]> {
  if (process.env.NODE_ENV !== 'production') return [];
  if (known) return known;
  const file = path.join(/* turbopackIgnore: true */ process.cwd(), process.env.LAMMAS_DIST ?? '.next', 'field-csp.json');
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
