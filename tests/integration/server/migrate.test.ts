import { mkdtemp, readdir, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { QueryTypes } from 'sequelize';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { closeDatabase, openDatabase } from '@/models';
import { migrate } from '@/models/migrate';
import { migrations } from '@/models/migrations';
import { openSequelize } from '@/models/open-sequelize';
import { requiredPragmas } from '@/models/pragmas';

let folder: string;
let file: string;
beforeEach(async () => {
  folder = await mkdtemp(path.join(os.tmpdir(), 'lammas-migrate-'));
  file = path.join(folder, 'lammas.sqlite');
  process.env.LAMMAS_DATA = folder;
});
afterEach(async () => {
  await closeDatabase();
  delete process.env.LAMMAS_DATA;
  await rm(folder, { recursive: true, force: true });
});

async function rows<T extends object>(sql: string, where = file): Promise<T[]> {
  const sequelize = await openSequelize(where);
  try {
    return await sequelize.query<T>(sql, { type: QueryTypes.SELECT });
  } finally {
    await sequelize.close();
  }
}

const addColumn = { name: '9001-add-column', statements: ['ALTER TABLE users ADD COLUMN phone TEXT'] };

describe('migrations', () => {
  it('are numbered without gaps, in the order of their names', () => {
    expect(migrations.map(({ name }) => Number(name.slice(0, 4)))).toEqual(migrations.map((_, i) => i + 1));
  });

  it('only add', () => {
    for (const { name, statements } of migrations) {
      for (const sql of statements) expect(sql, name).not.toMatch(/\b(DROP|RENAME|CASCADE)\b/i);
    }
  });

  it('make a new database without a copy, and do nothing the second time', async () => {
    expect(await migrate()).toEqual({ file, applied: migrations.map(({ name }) => name), backup: null });
    expect(await migrate()).toEqual({ file, applied: [], backup: null });
  });

  it('give the server an epoch and a device of its own that later runs keep', async () => {
    await migrate();
    const first = await rows('SELECT * FROM server_meta ORDER BY key');
    expect(first).toHaveLength(2);
    expect(await rows("SELECT d.id FROM devices d JOIN server_meta m ON m.value = d.id AND m.key = 'server-device-id'")).toHaveLength(1);
    await migrate(file, [...migrations, addColumn]);
    expect(await rows('SELECT * FROM server_meta ORDER BY key')).toEqual(first);
  });

  it('copy a database that holds tables before changing it', async () => {
    await migrate();
    const { backup } = await migrate(file, [...migrations, addColumn]);
    expect(await readdir(path.join(folder, 'backups'))).toEqual([path.basename(backup!)]);
    expect(await rows('SELECT name FROM schema_migrations', backup!)).toHaveLength(migrations.length);
    expect(await rows("SELECT name FROM pragma_table_info('users') WHERE name = 'phone'", backup!)).toEqual([]);
    expect(await rows("SELECT name FROM pragma_table_info('users') WHERE name = 'phone'")).toHaveLength(1);
  });

  it.each([
    ['loses rows', "DELETE FROM devices WHERE id NOT IN (SELECT value FROM server_meta)", /had 2 rows/],
    ['loses a table', 'DROP TABLE reference_trees', /it is gone/],
    ['leaves orphans', "PRAGMA defer_foreign_keys = ON; ", /missing rows of projects/],
    ['fails half-way', 'INSERT INTO no_such_table VALUES (1)', /no such table/],
  ])('that %s are undone whole', async (what, statement, message) => {
    await migrate();
    const sequelize = await openSequelize(file);
    await sequelize.query("INSERT INTO devices (id, first_seen_at, last_seen_at, last_seq, last_hash) VALUES ('d', '', '', 0, '')");
    await sequelize.close();
    const statements = what === 'leaves orphans'
      ? [statement, "INSERT INTO strata (id, project_id, revision, name, area_ha) VALUES ('s', 'none', 1, 'n', 1)"]
      : [statement];
    const bad = { name: '9002-bad', statements };
    await expect(migrate(file, [...migrations, addColumn, bad])).rejects.toThrow(message);
    expect(await rows('SELECT name FROM schema_migrations')).toHaveLength(migrations.length);
    expect(await rows("SELECT name FROM pragma_table_info('users') WHERE name = 'phone'")).toEqual([]);
    expect(await rows('SELECT id FROM devices')).toHaveLength(2);
  });
});

describe('opening', () => {
  it('refuses a database that lacks migrations, and says what to run', async () => {
    await migrate();
    const sequelize = await openSequelize(file);
    await sequelize.query('DELETE FROM schema_migrations WHERE name = ?', { replacements: [migrations.at(-1)!.name] });
    await sequelize.close();
    await expect(openDatabase()).rejects.toThrow(/npm run migrate/);
  });

  it('refuses a database of a newer version', async () => {
    await migrate(file, [...migrations, addColumn]);
    await expect(openDatabase()).rejects.toThrow(/newer version/);
  });

  it('works after a failed opening once the fault is mended', async () => {
    await expect(openDatabase()).rejects.toThrow(/lacks/);
    await migrate();
    expect((await openDatabase()).file).toBe(file);
  });

  it('sets every PRAGMA on the reading connection and on each transaction', async () => {
    await migrate();
    const { sequelize } = await openDatabase();
    for (const [name, expected] of Object.entries(requiredPragmas)) {
      const sql = `SELECT * FROM pragma_${name}`;
      const [outside] = await sequelize.query<Record<string, unknown>>(sql, { type: QueryTypes.SELECT });
      const [inside] = await sequelize.transaction((transaction) => sequelize.query<Record<string, unknown>>(sql, { type: QueryTypes.SELECT, transaction }));
      expect([name, Object.values(outside!)[0], Object.values(inside!)[0]]).toEqual([name, expected, expected]);
    }
  });

  it('refuses a store that cannot hold a PRAGMA: a database in memory has no WAL', async () => {
    await expect(openSequelize(':memory:')).rejects.toThrow(/PRAGMA journal_mode is memory and must be wal/);
  });
});
