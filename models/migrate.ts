import { mkdir } from 'node:fs/promises';
import path from 'node:path';
import { QueryTypes, Transaction } from 'sequelize';
import type { Sequelize } from 'sequelize';
import { Umzug } from 'umzug';
import { v7 } from 'uuid';
import { GENESIS_HASH } from '@/lib/schema/wire';
import { databaseFile } from './data-folder';
import { migrations as allMigrations } from './migrations';
import type { Migration } from './migrations/migration';
import { openSequelize } from './open-sequelize';

/** A migration that was undone because the database did not come out of it whole. */
export class MigrationRefusedError extends Error {
  override readonly name = 'MigrationRefusedError';
}

export type MigrationReport = { readonly file: string; readonly applied: readonly string[]; readonly backup: string | null };

type Context = { readonly sequelize: Sequelize; readonly transaction: Transaction };

const LEDGER = 'schema_migrations';

/** Names of the migrations that a database has had; empty for a new file. */
export async function appliedMigrations(sequelize: Sequelize, transaction?: Transaction): Promise<string[]> {
  const within = transaction ? { transaction } : {};
  const [ledger] = await sequelize.query(`SELECT name FROM sqlite_schema WHERE type = 'table' AND name = '${LEDGER}'`, { type: QueryTypes.SELECT, ...within });
  if (!ledger) return [];
  const rows = await sequelize.query<{ name: string }>(`SELECT name FROM ${LEDGER} ORDER BY name`, { type: QueryTypes.SELECT, ...within });
  return rows.map((row) => row.name);
}

async function rowCounts({ sequelize, transaction }: Context): Promise<Map<string, number>> {
  const tables = await sequelize.query<{ name: string }>(
    "SELECT name FROM sqlite_schema WHERE type = 'table' AND name NOT LIKE 'sqlite_%'", { type: QueryTypes.SELECT, transaction });
  const counts = new Map<string, number>();
  for (const { name } of tables) {
    const [row] = await sequelize.query<{ n: number }>(`SELECT count(*) AS n FROM "${name}"`, { type: QueryTypes.SELECT, transaction });
    counts.set(name, row?.n ?? 0);
  }
  return counts;
}

async function checkWhole(context: Context, before: ReadonlyMap<string, number>): Promise<void> {
  const after = await rowCounts(context);
  for (const [table, count] of before) {
    const now = after.get(table);
    if (now === undefined || now < count) {
      throw new MigrationRefusedError(`The migration was undone: table ${table} had ${count} rows and would have ${now ?? 'none, it is gone'}.`);
    }
  }
  const options = { type: QueryTypes.SELECT, transaction: context.transaction } as const;
  const orphans = await context.sequelize.query<{ table: string; parent: string }>('SELECT "table", "parent" FROM pragma_foreign_key_check', options);
  if (orphans[0]) throw new MigrationRefusedError(`The migration was undone: rows of ${orphans[0].table} name missing rows of ${orphans[0].parent}.`);
  const integrity = await context.sequelize.query<{ integrity_check: string }>('SELECT integrity_check FROM pragma_integrity_check', options);
  const verdict = integrity[0]?.integrity_check;
  if (verdict !== 'ok') throw new MigrationRefusedError(`The migration was undone: the integrity check says ${String(verdict)}.`);
}

/** `VACUUM INTO` writes a whole, checked copy while the database stays open. Existing files are never overwritten. */
async function backUp(sequelize: Sequelize, file: string): Promise<string> {
  const folder = path.join(path.dirname(file), 'backups');
  await mkdir(folder, { recursive: true });
  const copy = path.join(folder, `before-migration-${new Date().toISOString().replace(/[:.]/g, '-')}.sqlite`);
  await sequelize.query(`VACUUM INTO ${sequelize.escape(copy)}`);
  return copy;
}

function umzugFor(context: Context, migrations: readonly Migration[]): Umzug<Context> {
  return new Umzug<Context>({
    context,
    logger: undefined,
    migrations: migrations.map(({ name, statements }) => ({
      name,
      up: async ({ context: { sequelize, transaction } }) => {
        for (const statement of statements) await sequelize.query(statement, { transaction });
      },
    })),
    storage: {
      executed: () => appliedMigrations(context.sequelize, context.transaction),
      logMigration: async ({ name }) => {
        await context.sequelize.query(`INSERT INTO ${LEDGER} (name, applied_at) VALUES (?, ?)`, {
          replacements: [name, new Date().toISOString()], transaction: context.transaction,
        });
      },
      unlogMigration: async () => { throw new MigrationRefusedError('Migrations go forward only; go back by restoring the copy made before.'); },
    },
  });
}

/** A server has an epoch, and a device id of its own for the changes that it makes itself. */
async function ensureIdentity({ sequelize, transaction }: Context): Promise<void> {
  const known = await sequelize.query<{ key: string }>('SELECT key FROM server_meta', { type: QueryTypes.SELECT, transaction });
  const keys = new Set(known.map((row) => row.key));
  const insertMeta = (key: string, value: string) =>
    sequelize.query('INSERT INTO server_meta (key, value) VALUES (?, ?)', { replacements: [key, value], transaction });
  if (!keys.has('epoch')) await insertMeta('epoch', v7());
  if (!keys.has('server-device-id')) {
    const id = v7();
    const now = new Date().toISOString();
    await sequelize.query('INSERT INTO devices (id, user_id, first_seen_at, last_seen_at, last_seq, last_hash, lost) VALUES (?, NULL, ?, ?, 0, ?, 0)', {
      replacements: [id, now, now, GENESIS_HASH], transaction,
    });
    await insertMeta('server-device-id', id);
  }
}

/**
 * Brings the database up to date, all pending migrations in one transaction: a failure leaves it as it was.
 * A database that already holds tables is copied to backups/ first. Errors: MigrationRefusedError, or the SQL's own.
 */
export async function migrate(file: string = databaseFile(), migrations: readonly Migration[] = allMigrations): Promise<MigrationReport> {
  const sequelize = await openSequelize(file);
  try {
    const done = new Set(await appliedMigrations(sequelize));
    const pending = migrations.filter(({ name }) => !done.has(name));
    if (pending.length === 0) return { file, applied: [], backup: null };
    const [table] = await sequelize.query("SELECT name FROM sqlite_schema WHERE type = 'table' LIMIT 1", { type: QueryTypes.SELECT });
    const backup = table ? await backUp(sequelize, file) : null;
    const applied = await sequelize.transaction({ type: Transaction.TYPES.IMMEDIATE }, async (transaction) => {
      const context = { sequelize, transaction };
      const before = await rowCounts(context);
      await sequelize.query(`CREATE TABLE IF NOT EXISTS ${LEDGER} (name TEXT NOT NULL PRIMARY KEY, applied_at TEXT NOT NULL)`, { transaction });
      const ran = await umzugFor(context, migrations).up();
      await ensureIdentity(context);
      await checkWhole(context, before);
      return ran.map(({ name }) => name);
    });
    return { file, applied, backup };
  } finally {
    await sequelize.close();
  }
}
