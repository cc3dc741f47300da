import type { Transaction } from 'sequelize';
import { execute, type SqlValue } from './sql.ts';

/** Rows to a statement; the server takes 65,535 parameters at most. */
const ROWS_AT_ONCE = 500;

/**
 * Inserts rows that share their columns, in few statements. Table and column names come from the repository's own
 * text, never from a request; `ending` is what follows the values ('on duplicate key update …').
 */
export async function insertRows(
  tx: Transaction,
  table: string,
  rows: readonly Readonly<Record<string, SqlValue>>[],
  ending = '',
): Promise<void> {
  const [first] = rows;
  if (!first) return;
  const columns = Object.keys(first);
  for (let from = 0; from < rows.length; from += ROWS_AT_ONCE) {
    const slice = rows.slice(from, from + ROWS_AT_ONCE);
    const values: Record<string, SqlValue> = {};
    const tuples = slice.map((row, index) => {
      const names = columns.map((column) => {
        const name = `${column}_${index}`;
        values[name] = row[column] ?? null;
        return `:${name}`;
      });
      return `(${names.join(', ')})`;
    });
    await execute(
      tx,
      `insert into ${table} (${columns.join(', ')}) values ${tuples.join(', ')} ${ending}`,
      values,
    );
  }
}
