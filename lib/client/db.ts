import 'client-only';
import Dexie from 'dexie';
import type { DexieOptions, Table } from 'dexie';
import type { Json } from '@/lib/schema/common';
import type { Operation, WorkPack } from '@/lib/schema/wire';
import type { Row } from '@/lib/sync/merge';
import type { Draft, Identity } from './field-store-types';

/** The head of this device's chain, and how much of it a server has. */
export type DeviceMeta = {
  readonly key: 'device';
  readonly deviceId: string;
  readonly lastSeq: number;
  readonly lastHash: string;
  readonly ackSeq: number;
  readonly epoch: string | null;
  readonly lastSyncAt: string | null;
};
export type CurrentIdentityMeta = { readonly key: 'identity'; readonly userId: string | null };
export type MetaRow = DeviceMeta | CurrentIdentityMeta;

export type PackRow = {
  readonly projectId: string;
  readonly name: string;
  readonly fetchedAt: string;
  readonly cursor: number;
  readonly people: WorkPack['people'];
  /** The digest that was last found to agree. */
  readonly digest: string | null;
  /** The server was restored or this copy is wrong: only a fresh pack helps. */
  readonly stale: boolean;
};

/** `base` is what the server has, null where it has nothing yet; `view` is that with the own operations it lacks. */
export type RecordRow = {
  readonly entity: string;
  readonly id: string;
  readonly projectId: string;
  readonly base: Row | null;
  readonly view: Row | null;
  /** Cursor of the last applied change; 0 without a base. */
  readonly revision: number;
};

/** An own operation. It is unsent while its seq is above the device's `ackSeq`; no index says so. */
export type OutboxRow = {
  readonly seq: number;
  readonly opId: string;
  readonly recordId: string;
  readonly op: Operation;
  /** Where the server has it in its log; null until it said so. */
  readonly cursor: number | null;
  /** Whether the base has what became of it. */
  readonly absorbed: boolean;
  readonly ackedAt: string | null;
};
export type QuarantinedRow = { readonly opId: string; readonly projectId: string; readonly reason: string; readonly entity: string; readonly recordId: string };
export type SettingRow = { readonly key: string; readonly value: Json };

export const DATABASE_NAME = 'lammas-field';

/** The device's database. Saves reach the disk before their promise resolves (strict durability). */
export class FieldDatabase extends Dexie {
  declare readonly meta: Table<MetaRow, string>;
  declare readonly identities: Table<Identity, string>;
  declare readonly packs: Table<PackRow, string>;
  declare readonly records: Table<RecordRow, [string, string]>;
  declare readonly outbox: Table<OutboxRow, number>;
  declare readonly drafts: Table<Draft, string>;
  declare readonly settings: Table<SettingRow, string>;
  declare readonly quarantined: Table<QuarantinedRow, string>;

  constructor(name = DATABASE_NAME, options: DexieOptions = {}) {
    super(name, { chromeTransactionDurability: 'strict', ...options });
    this.version(1).stores({
      meta: 'key', identities: 'userId', packs: 'projectId', records: '[entity+id], [projectId+entity]', outbox: 'seq, opId, recordId', drafts: 'id',
      settings: 'key', quarantined: 'opId',
    });
  }
}

/** What is known of this device. Errors: the database was not set up by openFieldStore. */
export async function readDevice(db: FieldDatabase): Promise<DeviceMeta> {
  const row = await db.meta.get('device');
  if (row?.key !== 'device') throw new Error('The device store has lost its device id.');
  return row;
}
