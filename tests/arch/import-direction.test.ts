import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { describeEdge, importFault } from './import-rules';
import { moduleImports } from './module-imports';
import type { ImportEdge } from './module-imports';
import { root, sourceFiles } from './source-files';

const edges = sourceFiles(/\.(ts|tsx|mjs)$/).flatMap((file) => moduleImports(file, readFileSync(path.join(root, file), 'utf8')));
const within = (folder: string) => edges.filter(({ from }) => from.startsWith(folder));
const told = (edge: ImportEdge) => `${describeEdge(edge)}: ${importFault(edge) ?? ''}`;

describe('import direction', () => {
  it('stats, shared ← trees, position ← schema ← checks ← sync ← client | server ← app; schema ← models ← server', () => {
    expect(edges.length).toBeGreaterThan(100);
    expect(edges.filter((edge) => importFault(edge) !== null).map(told)).toEqual([]);
  });

  it.each([
    ['lib/client/db.ts', '@/lib/server/env', 'client does not import server'],
    ['lib/server/sync/push.ts', '@/lib/client/db', 'server does not import client'],
    ['components/charts/curve.tsx', '@/lib/client/db', 'components does not import client'],
    ['components/ui/button.tsx', '../../lib/server/env', 'components does not import server'],
    ['models/plot.ts', '@/lib/client/db', 'models does not import client'],
    ['lib/stats/student-t.ts', '@/lib/schema/common', 'stats does not import schema'],
    ['lib/schema/plot.ts', '@/lib/checks/types', 'schema does not import checks'],
    ['lib/stats/student-t.ts', 'node:fs', 'stats does not import the package node:fs'],
    ['lib/sync/engine.ts', 'dexie', 'sync does not import the package dexie'],
  ])('an import against it is found: %s from %s', (from, specifier, fault) => {
    const found = moduleImports(from, `import { x } from '${specifier}';`);
    expect(found.map(importFault)).toEqual([fault]);
  });

  it.each([
    ['export from', "export { x } from '@/lib/server/env';"],
    ['import()', "const x = await import('@/lib/server/env');"],
    ['import type', "import type { X } from '@/lib/server/env';"],
    ['an inline type', "type X = import('@/lib/server/env').Environment;"],
    ['a worker', "new Worker(new URL('../server/env.ts', import.meta.url));"],
  ])('%s counts as an import', (_, text) => {
    expect(moduleImports('lib/client/db.ts', text).map(importFault)).toEqual(['client does not import server']);
  });

  it('the browser never reaches the server or the database through what it imports, types apart', () => {
    const next = new Map<string, ImportEdge[]>();
    for (const edge of edges) if (!edge.typeOnly && !edge.isPackage) next.set(edge.from, [...(next.get(edge.from) ?? []), edge]);
    const clientFiles = sourceFiles(/^(app|components|lib\/client)\/.*\.(ts|tsx)$/)
      .filter((file) => file.startsWith('lib/client/') || /^\s*['"]use client['"]/.test(readFileSync(path.join(root, file), 'utf8')));
    const reached: string[] = [];
    for (const start of clientFiles) {
      const seen = new Set([start]);
      const ways: ImportEdge[][] = [[...(next.get(start) ?? [])]].filter((way) => way.length > 0);
      while (ways.length > 0) {
        for (const edge of ways.pop()!) {
          if (/^(lib\/server|models)\//.test(edge.to)) reached.push(`${start} … ${describeEdge(edge)}`);
          if (seen.has(edge.to)) continue;
          seen.add(edge.to);
          ways.push(next.get(edge.to) ?? []);
        }
      }
    }
    expect(reached).toEqual([]);
  });

  it('no next/link in the field shell, whose moves must not fetch', () => {
    expect(within('app/(field)/').filter(({ specifier }) => specifier === 'next/link').map(describeEdge)).toEqual([]);
  });

  it('commands and seeders do not import the sign-in module, which needs the framework', () => {
    const signIn = [...within('lib/cli/'), ...within('seeders/')].filter(({ to }) => to === 'next-auth' || to === 'lib/server/auth.ts');
    expect(signIn.map(describeEdge)).toEqual([]);
  });

  it('every import of our own leads to a file', () => {
    const known = new Set(sourceFiles(/./));
    const lost = edges.filter(({ isPackage, to, from }) => !isPackage && !from.startsWith('tests/arch/') && !known.has(to));
    expect(lost.map(describeEdge)).toEqual([]);
  });
});
