import { syncedRecords } from './0001-synced-records';
import { peopleAndLog } from './0002-people-and-log';
import type { Migration } from './migration';

/** All migrations, in the order in which they run. */
export const migrations: readonly Migration[] = [syncedRecords, peopleAndLog];

/** The schema that this version of the program works with: the number of its last migration. */
export const LATEST_MIGRATION = migrations.length;
