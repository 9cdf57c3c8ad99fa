import 'server-only';
import { Transaction } from 'sequelize';
import type { Sequelize } from 'sequelize';
import { openDatabase } from '@/models';
import type { Models } from '@/models';

export type ReadContext = { readonly transaction: Transaction; readonly models: Models; readonly sequelize: Sequelize };

/**
 * Runs queries that must agree with each other: all see the database as of the first one, whatever is written meanwhile.
 * Every query inside must carry `transaction`. A single query needs none of this.
 */
export async function readSnapshot<T>(work: (context: ReadContext) => Promise<T>): Promise<T> {
  const { sequelize, models } = await openDatabase();
  return sequelize.transaction({ type: Transaction.TYPES.DEFERRED }, (transaction) => work({ transaction, models, sequelize }));
}

/** The epoch of this server: new after a restore from a backup. */
export async function serverEpoch(context?: ReadContext): Promise<string> {
  return meta('epoch', context);
}

/** The device id under which the server makes changes of its own. */
export async function serverDeviceId(context?: ReadContext): Promise<string> {
  return meta('server-device-id', context);
}

async function meta(key: string, context?: ReadContext): Promise<string> {
  const { ServerMeta } = (context ?? (await openDatabase())).models;
  const row = await ServerMeta.findByPk(key, context ? { transaction: context.transaction } : {});
  if (!row) throw new Error(`The database says nothing of "${key}". Run: npm run migrate`);
  return row.value;
}
