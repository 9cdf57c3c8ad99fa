import 'server-only';
import type { Sequelize, Transaction } from 'sequelize';

/** SQLite looks a named parameter up one by one, so that few statements with very many cost more than many with few. */
const MOST_PARAMETERS = 600;

/** What is needed of a model; Sequelize's own type asks for the whole class. */
type Stored = {
  readonly tableName: string;
  readonly sequelize?: Sequelize;
  getAttributes(): Readonly<Record<string, { readonly field?: string; readonly type: unknown }>>;
};

/**
 * Inserts records or replaces all their fields. Values are bound, not written into the SQL text: SQLite reads about one
 * decimal number in 2,500 back with another last bit, and a value must come out as the device sent it.
 */
export async function upsertRows(model: Stored, rows: readonly Readonly<Record<string, unknown>>[], transaction: Transaction): Promise<void> {
  const columns = Object.entries(model.getAttributes()).map(([name, { field, type }]) => ({ name, column: `"${field ?? name}"`, json: String(type) === 'JSON' }));
  const perStatement = Math.max(1, Math.floor(MOST_PARAMETERS / columns.length));
  const updates = columns.filter(({ name }) => name !== 'id').map(({ column }) => `${column} = excluded.${column}`).join(', ');
  const bound = (value: unknown, json: boolean) => (json ? JSON.stringify(value ?? null) : typeof value === 'boolean' ? Number(value) : value ?? null);
  for (let from = 0; from < rows.length; from += perStatement) {
    const piece = rows.slice(from, from + perStatement);
    const tuples = piece.map((_, row) => `(${columns.map((__, i) => `$${row * columns.length + i + 1}`).join(', ')})`);
    const sql = `INSERT INTO "${model.tableName}" (${columns.map(({ column }) => column).join(', ')}) VALUES ${tuples.join(', ')} ON CONFLICT (id) DO UPDATE SET ${updates}`;
    await model.sequelize!.query(sql, { bind: piece.flatMap((row) => columns.map(({ name, json }) => bound(row[name], json))), transaction });
  }
}
