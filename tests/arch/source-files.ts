import { readdirSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

export const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');

const OURS = ['app', 'components', 'fonts', 'lib', 'models', 'seeders', 'tests'];
const SKIPPED = new Set(['node_modules', '.next', '.data', '.test-data', 'shots']);

function below(folder: string): string[] {
  return readdirSync(path.join(root, folder), { withFileTypes: true }).flatMap((entry) => {
    const name = `${folder}/${entry.name}`;
    if (entry.isDirectory()) return SKIPPED.has(entry.name) ? [] : below(name);
    return [name];
  });
}

/** Our own files, relative to the root with forward slashes, that match. */
export function sourceFiles(pattern: RegExp): string[] {
  // next-env.d.ts is made by the framework and leads into a build.
  const atRoot = readdirSync(root, { withFileTypes: true }).filter((entry) => entry.isFile() && entry.name !== 'next-env.d.ts').map((entry) => entry.name);
  return [...atRoot, ...OURS.flatMap(below)].filter((name) => pattern.test(name)).sort((a, b) => (a < b ? -1 : 1));
}
