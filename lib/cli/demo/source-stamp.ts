import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync, statSync } from 'node:fs';
import path from 'node:path';

/** What a build is made of. */
const SOURCES = [
  'app', 'components', 'fonts', 'lib', 'models', 'public', 'instrumentation.ts', 'next.config.mjs', 'package-lock.json', 'postcss.config.mjs', 'proxy.ts',
  'tailwind.config.ts', 'tsconfig.json',
] as const;
/** Made by the build itself. */
const MADE = /^public\/(sw\.js|.*\.map)$/;

function filesBelow(root: string, name: string): string[] {
  const full = path.join(root, name);
  if (!existsSync(full)) return [];
  if (!statSync(full).isDirectory()) return [name];
  return readdirSync(full).flatMap((entry) => filesBelow(root, `${name}/${entry}`));
}

/** SHA-256 over the names and contents of all source files of a build: the same sources give the same stamp. */
export function sourceStamp(root: string): string {
  const hash = createHash('sha256');
  const files = SOURCES.flatMap((name) => filesBelow(root, name)).filter((file) => !MADE.test(file)).sort((a, b) => (a < b ? -1 : 1));
  for (const file of files) hash.update(file).update('\0').update(createHash('sha256').update(readFileSync(path.join(root, file))).digest());
  return hash.digest('hex');
}
