import { mkdtemp, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { closeDatabase, openDatabase } from '@/models';
import type { Database } from '@/models';
import { migrate } from '@/models/migrate';

/** A freshly migrated database in a folder of its own, which LAMMAS_DATA names until `close`. */
export async function freshDatabase(): Promise<Database & { folder: string; close(): Promise<void> }> {
  const folder = await mkdtemp(path.join(os.tmpdir(), 'lammas-test-'));
  const former = process.env.LAMMAS_DATA;
  await closeDatabase();
  process.env.LAMMAS_DATA = folder;
  await migrate();
  const database = await openDatabase();
  return {
    ...database,
    folder,
    close: async () => {
      await closeDatabase();
      if (former === undefined) delete process.env.LAMMAS_DATA;
      else process.env.LAMMAS_DATA = former;
      await rm(folder, { recursive: true, force: true });
    },
  };
}
