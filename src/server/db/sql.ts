/**
 * The one way to speak SQL: named, bound parameters and typed rows.
 *
 * `:name` in the text is bound from `values`; an array becomes a list for IN (and an empty list matches
 * nothing). Every call says which kind of statement it is, because the driver breaks on untyped reads.
 */
import { QueryTypes, type Transaction } from 'sequelize';
import { database } from './connection.ts';

export type SqlValue = string | number | boolean | Date | null | readonly (string | number)[];
export type SqlValues = Readonly<Record<string, SqlValue>>;

/** Turns `:name` into `$1, $2, …` with the values in order; text in quotes is left alone. */
function bound(text: string, values: SqlValues): { sql: string; bind: unknown[] } {
  const bind: unknown[] = [];
  const place = (value: unknown) => `$${bind.push(value)}`;
  const sql = text.replaceAll(/'(?:[^']|'')*'|:([a-zA-Z]\w*)/g, (whole, name: string | undefined) => {
    if (name === undefined) return whole;
    const value = values[name];
    if (value === undefined) throw new Error(`no value for :${name}`);
    if (Array.isArray(value)) return value.length === 0 ? 'null' : value.map(place).join(', ');
    return place(value);
  });
  return { sql, bind };
}

export async function select<Row extends object>(
  tx: Transaction,
  text: string,
  values: SqlValues = {},
): Promise<Row[]> {
  const { sql, bind } = bound(text, values);
  return database().query<Row>(sql, { bind, transaction: tx, type: QueryTypes.SELECT });
}

export async function selectOne<Row extends object>(
  tx: Transaction,
  text: string,
  values: SqlValues = {},
): Promise<Row | null> {
  return (await select<Row>(tx, text, values))[0] ?? null;
}

/** What a write did: rows changed and, for one inserted row, its id. */
export interface Written {
  readonly affectedRows: number;
  readonly insertId: number;
}

export async function execute(tx: Transaction, text: string, values: SqlValues = {}): Promise<Written> {
  const { sql, bind } = bound(text.trim(), values);
  if (/^insert/i.test(sql)) {
    const [insertId, affectedRows] = await database().query(sql, {
      bind,
      transaction: tx,
      type: QueryTypes.INSERT,
    });
    return { affectedRows, insertId };
  }
  const [, affectedRows] = await database().query(sql, { bind, transaction: tx, type: QueryTypes.UPDATE });
  return { affectedRows, insertId: 0 };
}
