import 'server-only';
import { QueryTypes } from 'sequelize';
import type { Json } from '@/lib/schema/common';
import { entityNames } from '@/lib/schema/entities';
import type { EntityName } from '@/lib/schema/entities';
import { GENESIS_HASH } from '@/lib/schema/wire';
import type { Row } from '@/lib/sync/merge';
import { anyEntityModel } from '@/models';
import type { AnyRow } from '@/models';
import type { AppliedOperationRow } from '@/models/applied-operation';
import type { ChangeLogEntryRow } from '@/models/change-log-entry';
import type { DeviceRow } from '@/models/device';
import type { RecordGroupRow } from '@/models/record-group';
import type { WriteContext } from '../write-queue';
import { upsertRows } from '../upsert-rows';

/** Rows to one INSERT, ids to one question. */
const BULK = 500;

function piecesOf<T>(all: readonly T[]): T[][] {
  return Array.from({ length: Math.ceil(all.length / BULK) }, (_, i) => all.slice(i * BULK, (i + 1) * BULK));
}

/**
 * The part of the database that a run of operations touches, held in memory inside one write, so that five thousand
 * changes cost a few dozen statements: `load` what they name, work on it, `flush` once. The write queue lets nobody
 * else write meanwhile; that is also why the next cursor can be known before the rows are inserted.
 */
export class LogBatch {
  readonly #rows = new Map<EntityName, Map<string, AnyRow | null>>();
  readonly #groups = new Map<string, Map<string, RecordGroupRow>>();
  /** Conflicts by the record that they are about. */
  readonly #conflicts = new Map<string, Set<string>>();
  readonly #devices = new Map<string, DeviceRow>();
  readonly #changedRows = new Map<EntityName, Set<string>>();
  readonly #changedGroups = new Set<RecordGroupRow>();
  readonly #entries: ChangeLogEntryRow[] = [];
  readonly #answers: AppliedOperationRow[] = [];
  #cursor: number;

  private constructor(readonly context: WriteContext, readonly serverDeviceId: string, readonly now: string, cursor: number) {
    this.#cursor = cursor;
  }

  static async open(context: WriteContext): Promise<LogBatch> {
    const { models, transaction, sequelize } = context;
    const meta = await models.ServerMeta.findByPk('server-device-id', { transaction, rejectOnEmpty: true });
    const [last] = await sequelize.query<{ seq: number }>("SELECT seq FROM sqlite_sequence WHERE name = 'change_log'", { type: QueryTypes.SELECT, transaction });
    return new LogBatch(context, meta.value, new Date().toISOString(), last?.seq ?? 0);
  }

  /** The cursor of the last entry, of this batch too. */
  get cursor(): number {
    return this.#cursor;
  }

  /** Reads records, with the last changes of their groups and their conflicts where `whole` is asked for. */
  async load(entity: EntityName, ids: Iterable<string>, whole: boolean): Promise<void> {
    const { models, transaction } = this.context;
    const table = this.#table(entity);
    const unknown = [...new Set(ids)].filter((id) => !table.has(id));
    for (const piece of piecesOf(unknown)) {
      for (const id of piece) table.set(id, null);
      const found = await anyEntityModel(models, entity).findAll({ where: { id: piece }, transaction });
      for (const row of found) table.set(row.get('id') as string, row.get({ plain: true }) as AnyRow);
    }
    if (!whole) return;
    for (const piece of piecesOf([...new Set(ids)].filter((id) => !this.#groups.has(id)))) {
      for (const id of piece) this.#groups.set(id, new Map());
      for (const head of await models.RecordGroup.findAll({ where: { recordId: piece }, transaction })) {
        this.#groups.get(head.recordId)?.set(head.group, head.get({ plain: true }));
      }
      for (const row of await models.Conflict.findAll({ where: { recordId: piece }, transaction })) this.#keepConflict(row.get({ plain: true }) as unknown as AnyRow);
    }
  }

  #table(entity: EntityName): Map<string, AnyRow | null> {
    const table = this.#rows.get(entity) ?? new Map<string, AnyRow | null>();
    this.#rows.set(entity, table);
    return table;
  }

  #keepConflict(row: AnyRow): void {
    this.#table('conflict').set(row.id, row);
    const about = row['recordId'] as string;
    this.#conflicts.set(about, (this.#conflicts.get(about) ?? new Set()).add(row.id));
  }

  /** A record that was loaded, as it stands after all before; null where there is none. */
  row(entity: EntityName, id: string): AnyRow | null {
    const row = this.#rows.get(entity)?.get(id);
    if (row === undefined) throw new Error(`The record ${entity} ${id} was not loaded.`);
    return row;
  }

  /** The last change of each group of a loaded record; '*' is its creation. */
  heads(recordId: string): ReadonlyMap<string, RecordGroupRow> {
    return this.#groups.get(recordId) ?? new Map();
  }

  /** The conflict about a group of a loaded record, open or settled. */
  conflictOf(recordId: string, group: string): AnyRow | null {
    const ids = [...(this.#conflicts.get(recordId) ?? [])];
    return ids.map((id) => this.row('conflict', id)).find((row) => row !== null && row['group'] === group && !row.deleted) ?? null;
  }

  /** Stores a record as changed by an entry of this batch. */
  setRow(entity: EntityName, row: Row & { readonly id: Json }, revision: number): void {
    const kept = { ...row, revision } as unknown as AnyRow;
    this.#table(entity).set(kept.id, kept);
    this.#changedRows.set(entity, (this.#changedRows.get(entity) ?? new Set()).add(kept.id));
    if (entity === 'conflict') this.#keepConflict(kept);
  }

  setHead(head: RecordGroupRow): void {
    const heads = this.#groups.get(head.recordId) ?? new Map<string, RecordGroupRow>();
    const former = heads.get(head.group);
    if (former) this.#changedGroups.delete(former);
    this.#groups.set(head.recordId, heads.set(head.group, head));
    this.#changedGroups.add(head);
  }

  /** A device with the head of its chain; made when it is heard of first. */
  async device(id: string): Promise<DeviceRow> {
    const { models, transaction } = this.context;
    const known = this.#devices.get(id) ?? (await models.Device.findByPk(id, { transaction }))?.get({ plain: true })
      ?? { id, userId: null, firstSeenAt: this.now, lastSeenAt: this.now, lastSeq: 0, lastHash: GENESIS_HASH, lost: false };
    this.#devices.set(id, known);
    return known;
  }

  /** Appends to the log; the result is the entry's cursor. */
  append(entry: Omit<ChangeLogEntryRow, 'cursor'>): number {
    this.#cursor += 1;
    this.#entries.push({ ...entry, cursor: this.#cursor });
    return this.#cursor;
  }

  /** Keeps what a device is answered for one of its operations. */
  answer(row: AppliedOperationRow): void {
    this.#answers.push(row);
  }

  /** Writes all of it; the batch is then used up. A parent goes before its children. */
  async flush(): Promise<void> {
    const { models, transaction } = this.context;
    const heads = [...this.#devices.values()].filter(({ lastSeq }) => lastSeq > 0);
    for (const head of heads) await models.Device.upsert(head, { transaction });
    for (const piece of piecesOf(this.#entries)) await models.ChangeLogEntry.bulkCreate(piece, { transaction });
    for (const piece of piecesOf(this.#answers)) await models.AppliedOperation.bulkCreate(piece, { transaction });
    for (const entity of entityNames) {
      const changed = [...(this.#changedRows.get(entity) ?? [])].map((id) => this.row(entity, id)).filter((row) => row !== null);
      await upsertRows(anyEntityModel(models, entity), changed, transaction);
    }
    for (const piece of piecesOf([...this.#changedGroups])) {
      await models.RecordGroup.bulkCreate(piece, {
        transaction, updateOnDuplicate: ['entity', 'projectId', 'lastCursor', 'lastDeviceId', 'lastAuthorId', 'lastOpId', 'lastWallClock'],
      });
    }
  }
}
