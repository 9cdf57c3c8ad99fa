/**
 * One change of the database, as plain SQL. Only additions: a new table, column (nullable or with a default) or index.
 * A table is never rebuilt, because SQLite does that by DROP, and a DROP can empty what hangs on it.
 * Once released, a migration is never edited; the next change is the next number.
 */
export type Migration = {
  /** NNNN-name, as the file. */
  readonly name: string;
  readonly statements: readonly string[];
};
