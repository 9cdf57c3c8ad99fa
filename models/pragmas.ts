import sqlite3 from 'sqlite3';

/** The settings that the store's promises rest on. SYNCHRONOUS 2 is FULL: a commit survives a power cut. */
export const requiredPragmas = {
  journal_mode: 'wal',
  synchronous: 2,
  foreign_keys: 1,
  busy_timeout: 10_000,
  trusted_schema: 0,
  cell_size_check: 1,
} as const;

const SET = `
  PRAGMA busy_timeout = 10000;
  PRAGMA journal_mode = WAL;
  PRAGMA synchronous = FULL;
  PRAGMA foreign_keys = ON;
  PRAGMA trusted_schema = OFF;
  PRAGMA cell_size_check = ON;`;

/**
 * A connection that sets the PRAGMAs before anything else can run on it: `exec` is exclusive and is queued here,
 * in the constructor. Sequelize opens one connection for each transaction and offers no hook for this dialect.
 */
class ConfiguredDatabase extends sqlite3.Database {
  constructor(filename: string, mode: number, opened: (error: Error | null) => void) {
    let openError: Error | null = null;
    super(filename, mode, (error) => {
      openError = error;
      if (error) opened(error);
    });
    this.exec(SET, (error) => {
      if (!openError) opened(error);
    });
  }
}

/** What Sequelize takes for the sqlite3 package: the package itself with the configured connection. */
export const configuredSqlite3 = Object.assign(Object.create(sqlite3) as typeof sqlite3, { Database: ConfiguredDatabase });
