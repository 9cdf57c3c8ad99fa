import 'server-only';
import { AsyncLocalStorage } from 'node:async_hooks';
import { BaseError, ForeignKeyConstraintError, Transaction, ValidationError } from 'sequelize';
import type { Sequelize } from 'sequelize';
import { openDatabase } from '@/models';
import type { Models } from '@/models';

/** What a write works with. Every query inside must carry `transaction`, or it runs outside and waits for itself. */
export type WriteContext = { readonly transaction: Transaction; readonly models: Models; readonly sequelize: Sequelize };

/** Nothing was written. `full`: the disk has no room (HTTP 507); `unavailable`: the store could not take it now (503). */
export class StoreError extends Error {
  override readonly name = 'StoreError';
  constructor(readonly kind: 'full' | 'unavailable', options: { cause: unknown }) {
    super(kind === 'full' ? 'The server has no room left to store this.' : 'The server could not store this now.', options);
  }
}

/** The driver's own connection under a transaction; Sequelize's typings leave it out. */
type RawTransaction = Transaction & {
  readonly connection: { exec(sql: string, done: (error: Error | null) => void): unknown };
  finished?: 'commit' | 'rollback';
  cleanup(): void;
};

type Queue = { tail: Promise<unknown>; exit: (code: number) => void };

// One queue in the process, however often the bundler copies this module.
const shared = globalThis as typeof globalThis & { lammasWriteQueue?: Queue };
const inWrite = new AsyncLocalStorage<true>();

function queue(): Queue {
  return (shared.lammasWriteQueue ??= { tail: Promise.resolve(), exit: (code) => process.exit(code) });
}

function sqliteCode(error: unknown): string {
  for (let current: unknown = error; current instanceof Error; current = 'parent' in current ? current.parent : current.cause) {
    if ('code' in current && typeof current.code === 'string' && current.code.startsWith('SQLITE_')) return current.code;
  }
  return '';
}

/** After these the file or the disk under it cannot be trusted; a fresh process checks it again. */
function isFatal(error: unknown): boolean {
  return /^SQLITE_(IOERR|CORRUPT|NOTADB)/.test(sqliteCode(error));
}

function stopForSupervisor(what: string, error: unknown): void {
  console.error(`[store] ${what}. Stopping, so that the supervisor starts the server anew.`, error);
  queue().exit(70);
}

function exec(transaction: RawTransaction, sql: 'COMMIT' | 'ROLLBACK'): Promise<void> {
  return new Promise((resolve, reject) => {
    transaction.connection.exec(sql, (error) => { if (error) reject(error); else resolve(); });
  });
}

async function rollBack(transaction: RawTransaction): Promise<void> {
  try {
    await exec(transaction, 'ROLLBACK');
  } catch (error) {
    // A full disk or an I/O error has SQLite roll back by itself; then there is nothing left to undo.
    if (!(error instanceof Error && /no transaction is active/.test(error.message))) stopForSupervisor('ROLLBACK failed', error);
  }
  transaction.finished = 'rollback';
  transaction.cleanup();
}

function asStoreError(error: unknown): StoreError {
  return new StoreError(/^SQLITE_FULL/.test(sqliteCode(error)) ? 'full' : 'unavailable', { cause: error });
}

/** Constraint errors and the work's own errors are answers for the caller; what the store itself says is a StoreError. */
function rethrown(error: unknown): unknown {
  if (error instanceof ValidationError || error instanceof ForeignKeyConstraintError) return error;
  return error instanceof BaseError || sqliteCode(error) !== '' ? asStoreError(error) : error;
}

async function run<T>(work: (context: WriteContext) => Promise<T>): Promise<T> {
  const { sequelize, models } = await openDatabase();
  let transaction: RawTransaction;
  try {
    transaction = (await sequelize.transaction({ type: Transaction.TYPES.IMMEDIATE })) as RawTransaction;
  } catch (error) {
    if (isFatal(error)) stopForSupervisor('The database cannot be read', error);
    throw asStoreError(error);
  }
  try {
    const result = await inWrite.run(true, () => work({ transaction, models, sequelize }));
    // Not transaction.commit(): when COMMIT fails, Sequelize forgets the connection without closing it, and its lock stays.
    await exec(transaction, 'COMMIT').catch((error: unknown) => { throw asStoreError(error); });
    transaction.finished = 'commit';
    transaction.cleanup();
    return result;
  } catch (error) {
    await rollBack(transaction);
    if (isFatal(error)) stopForSupervisor('The store failed while writing', error);
    throw rethrown(error);
  }
}

/**
 * Runs `work` in a transaction of its own (BEGIN IMMEDIATE), after all writes asked for earlier, and resolves with its
 * result once COMMIT has succeeded. If it throws, nothing is left: its own and constraint errors are thrown on, the
 * store's become StoreError. A ROLLBACK that fails, an I/O error or corruption ends the process.
 * Do not await anything slow inside, and do not call `write` inside.
 */
export function write<T>(work: (context: WriteContext) => Promise<T>): Promise<T> {
  if (inWrite.getStore()) return Promise.reject(new Error('write() was called inside a write: it would wait for itself. Pass the context on instead.'));
  const current = queue();
  const result = current.tail.then(() => run(work));
  current.tail = result.catch(() => undefined);
  return result;
}

/** Resolves when every write asked for so far has ended, however it ended. */
export async function writesSettled(): Promise<void> {
  await queue().tail;
}

/** Replaces what happens when the process must end; tests use it to watch. Returns the former. */
export function onFatalStoreError(exit: (code: number) => void): (code: number) => void {
  const former = queue().exit;
  queue().exit = exit;
  return former;
}
