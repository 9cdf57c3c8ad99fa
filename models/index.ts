import 'server-only';
import type { Sequelize } from 'sequelize';
import { databaseFile } from './data-folder';
import { defineModels } from './define-models';
import type { Models } from './define-models';
import { appliedMigrations } from './migrate';
import { migrations } from './migrations';
import { openSequelize } from './open-sequelize';

export type { Models } from './define-models';
export { anyEntityModel, entityModel } from './entity-model';
export type { AnyRow, AnySyncedModel } from './entity-model';
export type { SyncedInstance, SyncedModel, SyncedRow } from './synced-model';

export type Database = { readonly sequelize: Sequelize; readonly models: Models; readonly file: string };

/** The database has not had all migrations, or has had some that this version does not know. */
export class SchemaVersionError extends Error {
  override readonly name = 'SchemaVersionError';
}

// One instance in the process, however often the bundler copies this module.
const shared = globalThis as typeof globalThis & { lammasDatabase?: Promise<Database> | undefined };

async function open(): Promise<Database> {
  const file = databaseFile();
  const sequelize = await openSequelize(file);
  try {
    const applied = await appliedMigrations(sequelize);
    const known = migrations.map(({ name }) => name);
    const missing = known.filter((name) => !applied.includes(name));
    if (missing.length > 0) throw new SchemaVersionError(`The database ${file} lacks ${missing.join(', ')}. Run: npm run migrate`);
    const unknown = applied.filter((name) => !known.includes(name));
    // Migrations only add, so an older program could read a newer file; it could not promise to write it right.
    if (unknown.length > 0) throw new SchemaVersionError(`The database ${file} was made by a newer version (${unknown.join(', ')}). Install that version or restore the copy made before.`);
    return { sequelize, models: defineModels(sequelize), file };
  } catch (error) {
    await sequelize.close();
    throw error;
  }
}

/**
 * The database, opened when first asked for. Errors: WrongPragmaError, SchemaVersionError, or SQLite's own;
 * a failed opening is tried again at the next call.
 */
export function openDatabase(): Promise<Database> {
  shared.lammasDatabase ??= open().catch((error: unknown) => {
    shared.lammasDatabase = undefined;
    throw error;
  });
  return shared.lammasDatabase;
}

/** Closes the database, if it is open; the next openDatabase opens it again. */
export async function closeDatabase(): Promise<void> {
  const opened = shared.lammasDatabase;
  shared.lammasDatabase = undefined;
  if (opened) await (await opened).sequelize.close();
}
