import { createHash } from 'node:crypto';
import { mkdir, readFile, stat, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { getManifest } from '@serwist/build';
import type { ManifestEntry } from '@serwist/build';
import { build } from 'esbuild';

/** Inline scripts of a page, as their text stands between the tags (which is what a browser hashes). */
export function inlineScripts(html: string): string[] {
  return [...html.matchAll(/<script\b([^>]*)>([\s\S]*?)<\/script>/gi)]
    .filter(([, attributes = '', text = '']) => !/\ssrc\s*=/i.test(attributes) && text.length > 0)
    .map(([, , text = '']) => text);
}

/** `sha256-…` of each inline script, as a content security policy names them; each once, in order. */
export function scriptHashes(html: string): string[] {
  const hashes = inlineScripts(html).map((text) => `sha256-${createHash('sha256').update(text, 'utf8').digest('base64')}`);
  return [...new Set(hashes)];
}

/**
 * The static files that a page can come to need: those it names, those that these name (parts loaded later, fonts of a
 * style sheet), and so on. `read` gives the text of a file, by its name relative to `static/`.
 */
export async function reachedFiles(html: string, names: readonly string[], read: (name: string) => Promise<string>): Promise<Set<string>> {
  const reached = new Set<string>();
  const texts = [html];
  for (let text = texts.pop(); text !== undefined; text = texts.pop()) {
    for (const name of names) {
      // A built file's own name is unique by its hash, and style sheets name fonts by a relative path.
      if (reached.has(name) || !text.includes(path.posix.basename(name))) continue;
      reached.add(name);
      if (/\.(js|css)$/.test(name)) texts.push(await read(name));
    }
  }
  return reached;
}

/** What the worker keeps: the shell, what the shell reaches, the icons. */
async function precacheManifest(dist: string, root: string, html: string): Promise<ManifestEntry[]> {
  const staticFolder = path.join(dist, 'static');
  const built = await getManifest({
    globDirectory: staticFolder, globPatterns: ['**/*.{js,css,woff2}'], dontCacheBustURLsMatching: /./, maximumFileSizeToCacheInBytes: 8 * 1024 * 1024,
  });
  const icons = await getManifest({ globDirectory: path.join(root, 'public'), globPatterns: ['icons/*.{png,svg}'] });
  const warnings = [...(built.warnings ?? []), ...(icons.warnings ?? [])];
  if (warnings.length > 0) throw new Error(`The precache manifest is not whole: ${warnings.join(' ')}`);
  const names = (built.manifestEntries ?? []).map(({ url }) => url);
  const reached = await reachedFiles(html, names, (name) => readFile(path.join(staticFolder, name), 'utf8'));
  return [
    { url: '/field', revision: createHash('sha256').update(html, 'utf8').digest('hex') },
    // Names of built files hold a hash of what is in them, so they need no revision.
    ...(built.manifestEntries ?? []).filter(({ url }) => reached.has(url)).map((entry) => ({ ...entry, url: `/_next/static/${entry.url}`, revision: null })),
    ...(icons.manifestEntries ?? []).map((entry) => ({ ...entry, url: `/${entry.url}` })),
  ];
}

/** The worker as one classic script, with its manifest. */
async function bundleWorker(root: string, manifest: readonly ManifestEntry[], outfile: string): Promise<void> {
  await build({
    entryPoints: [path.join(root, 'app/sw.ts')],
    outfile,
    bundle: true,
    format: 'iife',
    platform: 'browser',
    target: 'es2022',
    minify: true,
    legalComments: 'none',
    define: { LAMMAS_PRECACHE: JSON.stringify(manifest), 'process.env.NODE_ENV': '"production"' },
  });
}

/**
 * What a build still needs: hashes of the shell's inline scripts (`<dist>/field-csp.json`) and the worker (`public/sw.js`).
 * Errors: no static page at /field, a file that cannot be read, a warning of the manifest.
 */
export async function afterBuild(root: string = process.cwd()): Promise<{ readonly hashes: number; readonly files: number; readonly bytes: number }> {
  const dist = path.resolve(root, process.env.LAMMAS_DIST || '.next');
  const page = path.join(dist, 'server/app/field.html');
  const html = await readFile(page, 'utf8').catch((cause: unknown) => {
    throw new Error(`There is no static page of the field at ${page}: app/(field)/field/page.tsx must stay static, and the build comes first.`, { cause });
  });
  const hashes = scriptHashes(html);
  await writeFile(path.join(dist, 'field-csp.json'), `${JSON.stringify({ scriptHashes: hashes }, null, 2)}\n`);
  const manifest = await precacheManifest(dist, root, html);
  await mkdir(path.join(root, 'public'), { recursive: true });
  await bundleWorker(root, manifest, path.join(root, 'public/sw.js'));
  const files = manifest.filter(({ url }) => url.startsWith('/_next/')).map(({ url }) => path.join(dist, url.slice('/_next/'.length)));
  const sizes = await Promise.all(files.map(async (file) => (await stat(file)).size));
  return { hashes: hashes.length, files: manifest.length, bytes: sizes.reduce((sum, size) => sum + size, Buffer.byteLength(html)) };
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
  const { hashes, files, bytes } = await afterBuild(root);
  console.log(`Field shell: ${files} files kept for offline use (${Math.round(bytes / 1024)} KiB), ${hashes} inline scripts hashed.`);
}
