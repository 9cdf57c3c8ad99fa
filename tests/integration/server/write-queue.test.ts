import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { QueryTypes, UniqueConstraintError } from 'sequelize';
import { StoreError, onFatalStoreError, write } from '@/lib/server/write-queue';
import { freshDatabase } from '../../support/server-database';

let database: Awaited<ReturnType<typeof freshDatabase>>;
beforeAll(async () => { database = await freshDatabase(); });
afterAll(async () => database.close());

const put = (key: string) => write(async ({ models, transaction }) => models.ServerMeta.create({ key, value: 'x' }, { transaction }));
const has = async (key: string) => (await database.models.ServerMeta.findByPk(key)) !== null;

describe('the write queue', () => {
  it('100 writes asked for at once all succeed, in the order asked', async () => {
    const order: number[] = [];
    await Promise.all(Array.from({ length: 100 }, async (_, i) => { await put(`many-${i}`); order.push(i); }));
    const [row] = await database.sequelize.query<{ n: number }>("SELECT count(*) AS n FROM server_meta WHERE key LIKE 'many-%'", { type: QueryTypes.SELECT });
    expect(row?.n).toBe(100);
    expect(order).toEqual(Array.from({ length: 100 }, (_, i) => i));
  });

  it('a throw inside leaves nothing and reaches the caller unchanged; the next write goes through', async () => {
    const fault = new Error('changed my mind');
    const failing = write(async ({ models, transaction }) => {
      await models.ServerMeta.create({ key: 'gone', value: 'x' }, { transaction });
      throw fault;
    });
    await expect(failing).rejects.toBe(fault);
    expect(await has('gone')).toBe(false);
    await put('after');
    expect(await has('after')).toBe(true);
  });

  it('a broken constraint reaches the caller as such', async () => {
    await put('twice');
    await expect(put('twice')).rejects.toBeInstanceOf(UniqueConstraintError);
  });

  it('a full store is told apart, leaves nothing, and holds no lock', async () => {
    const failing = write(async ({ models, transaction, sequelize }) => {
      await models.ServerMeta.create({ key: 'too-big-first', value: 'x' }, { transaction });
      // A page limit makes SQLite answer SQLITE_FULL, as a full disk does.
      await sequelize.query('PRAGMA max_page_count = 1', { transaction });
      await models.ServerMeta.create({ key: 'too-big', value: 'x'.repeat(1_000_000) }, { transaction });
    });
    await expect(failing).rejects.toMatchObject({ name: 'StoreError', kind: 'full' });
    expect(await has('too-big-first')).toBe(false);
    await put('room-again');
    expect(await has('room-again')).toBe(true);
  });

  it('a COMMIT that fails acknowledges nothing, leaves nothing, and holds no lock', async () => {
    const failing = write(async ({ models, transaction, sequelize }) => {
      await models.ServerMeta.create({ key: 'uncommitted', value: 'x' }, { transaction });
      // Put off to COMMIT, the missing parent makes COMMIT itself fail.
      await sequelize.query('PRAGMA defer_foreign_keys = ON', { transaction });
      await sequelize.query("INSERT INTO strata (id, project_id, revision, name, area_ha) VALUES ('s', 'none', 1, 'n', 1)", { transaction });
    });
    await expect(failing).rejects.toBeInstanceOf(StoreError);
    expect(await has('uncommitted')).toBe(false);
    await put('committed-later');
    expect(await has('committed-later')).toBe(true);
  });

  it('an I/O error ends the process for the supervisor', async () => {
    const codes: number[] = [];
    const former = onFatalStoreError((code) => codes.push(code));
    const ioError = Object.assign(new Error('SQLITE_IOERR: disk I/O error'), { code: 'SQLITE_IOERR' });
    await expect(write(async () => { throw ioError; })).rejects.toMatchObject({ kind: 'unavailable' });
    onFatalStoreError(former);
    expect(codes).toEqual([70]);
  });

  it('a write inside a write is refused instead of waiting for itself', async () => {
    await expect(write(async () => put('inner'))).rejects.toThrow(/inside a write/);
  });

  it('a snapshot does not see what is written after its first query', async () => {
    const { readSnapshot } = await import('@/lib/server/database');
    const seen = await readSnapshot(async ({ models, transaction }) => {
      const before = await models.ServerMeta.count({ transaction });
      await put('meanwhile');
      return { before, after: await models.ServerMeta.count({ transaction }) };
    });
    expect(seen.after).toBe(seen.before);
  });
});
