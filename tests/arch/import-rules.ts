import type { ImportEdge } from './module-imports';

/** Parts of the program, by the folder that holds them. The first that fits counts. */
const parts = [
  ['stats', 'lib/stats/'], ['shared', 'lib/shared/'], ['trees', 'lib/trees/'], ['position', 'lib/position/'], ['schema', 'lib/schema/'],
  ['checks', 'lib/checks/'], ['sync', 'lib/sync/'], ['client', 'lib/client/'], ['server', 'lib/server/'], ['cli', 'lib/cli/'],
  ['models', 'models/'], ['components', 'components/'], ['app', 'app/'], ['seeders', 'seeders/'], ['tests', 'tests/'],
] as const;
type Part = (typeof parts)[number][0];

const core = ['stats', 'shared'] as const;
const upToSchema = [...core, 'trees', 'position', 'schema'] as const;
const upToSync = [...upToSchema, 'checks', 'sync'] as const;

/**
 * What each part may import besides itself:
 * stats, shared ← trees, position ← schema ← checks ← sync ← client | server ← app; schema ← models ← server.
 */
const allowed: Readonly<Record<Part, readonly Part[]>> = {
  stats: [],
  shared: [],
  trees: core,
  position: core,
  schema: [...core, 'trees', 'position'],
  checks: upToSchema,
  sync: [...upToSchema, 'checks'],
  client: upToSync,
  models: upToSchema,
  server: [...upToSync, 'models'],
  components: upToSync,
  app: [...upToSync, 'client', 'server', 'models', 'components'],
  seeders: [...upToSync, 'models', 'server'],
  cli: [...upToSync, 'models', 'server', 'seeders'],
  tests: [...upToSync, 'models', 'server', 'client', 'components', 'app', 'seeders', 'cli'],
};

/** Packages that pure parts may import; every other one brings I/O, a clock or a framework. */
const packagesOf: Partial<Readonly<Record<Part, RegExp>>> = {
  stats: /^(simple-statistics|@stdlib\/.+)$/,
  shared: /^(?!node:)(?!next|react|sequelize|dexie|sqlite3)/,
  trees: /^(simple-statistics|@stdlib\/.+)$/,
  position: /^(proj4|geographiclib-geodesic)$/,
  schema: /^(zod|uuid)$/,
  checks: /^(simple-statistics|@stdlib\/.+)$/,
  sync: /^(@noble\/hashes|canonicalize|uuid|zod)$/,
};

function partOf(file: string): Part | null {
  return parts.find(([, folder]) => file.startsWith(folder))?.[0] ?? null;
}

/** What is wrong with an import, in words; null when nothing is. */
export function importFault(edge: ImportEdge): string | null {
  const from = partOf(edge.from);
  if (from === null || from === 'tests') return null;
  if (edge.isPackage) {
    const may = packagesOf[from];
    return may && !may.test(edge.to) ? `${from} does not import the package ${edge.to}` : null;
  }
  const to = partOf(edge.to);
  if (to === null || to === from) return null;
  return allowed[from].includes(to) ? null : `${from} does not import ${to}`;
}

/** An edge as it is printed. */
export function describeEdge({ from, line, specifier }: ImportEdge): string {
  return `${from}:${line} imports ${specifier}`;
}
