import path from 'node:path';

/** Where everything is kept: LAMMAS_DATA, or .data below the working folder. */
export function dataFolder(): string {
  // The comment keeps the bundler from following the working folder as if it were source.
  return path.resolve(/* turbopackIgnore: true */ process.cwd(), process.env.LAMMAS_DATA || '.data');
}

/** The SQLite file. */
export function databaseFile(): string {
  return path.join(dataFolder(), 'lammas.sqlite');
}
