import { QueryTypes, Sequelize } from 'sequelize';
import type { Transaction } from 'sequelize';
import { configuredSqlite3, requiredPragmas } from './pragmas';

/** A connection whose PRAGMAs are not what the store's promises rest on. */
export class WrongPragmaError extends Error {
  override readonly name = 'WrongPragmaError';
}

async function verify(sequelize: Sequelize, transaction?: Transaction): Promise<void> {
  for (const [name, expected] of Object.entries(requiredPragmas)) {
    const [row] = await sequelize.query<Record<string, unknown>>(`SELECT * FROM pragma_${name}`, {
      type: QueryTypes.SELECT, ...(transaction ? { transaction } : {}),
    });
    const found = row ? Object.values(row)[0] : undefined;
    if (found !== expected) throw new WrongPragmaError(`The database does not start: PRAGMA ${name} is ${String(found)} and must be ${String(expected)}.`);
  }
}

/**
 * Opens a SQLite file with the PRAGMAs set, and verifies them on the reading connection and on one of a transaction.
 * Throws WrongPragmaError when one differs (a file system without shared memory cannot do WAL, for instance).
 */
export async function openSequelize(file: string): Promise<Sequelize> {
  const sequelize = new Sequelize({ dialect: 'sqlite', storage: file, dialectModule: configuredSqlite3, logging: false });
  try {
    await verify(sequelize);
    await sequelize.transaction(async (transaction) => verify(sequelize, transaction));
  } catch (error) {
    await sequelize.close();
    throw error;
  }
  return sequelize;
}
