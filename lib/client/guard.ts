import 'client-only';
import type { FieldDatabase } from './db';

export const WATCHDOG_MS = 5000;

/** The device's own storage did not answer, twice. The screen then offers to hand the data over by file. */
export class StorageHungError extends Error {
  override readonly name = 'StorageHungError';
  constructor() {
    super('The storage of this device does not answer.');
  }
}

function inTime<T>(work: Promise<T>, ms: number): Promise<T> {
  return new Promise((resolve, reject) => {
    const timer = setTimeout(() => reject(new StorageHungError()), ms);
    work.then(resolve, reject).finally(() => clearTimeout(timer));
  });
}

/**
 * Runs a database call under a watchdog: when it does not end in time the database is closed, opened again, and the
 * call made once more. The call must be safe to make twice. Errors: its own, or StorageHungError.
 */
export async function guarded<T>(db: FieldDatabase, call: () => PromiseLike<T>, ms = WATCHDOG_MS): Promise<T> {
  try {
    return await inTime(Promise.resolve(call()), ms);
  } catch (error) {
    if (!(error instanceof StorageHungError)) throw error;
    db.close({ disableAutoOpen: false });
    await inTime(Promise.resolve(db.open()), ms);
    return inTime(Promise.resolve(call()), ms);
  }
}
