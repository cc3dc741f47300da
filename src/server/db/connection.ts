/** The connection pool. One process, one pool. */
import { Sequelize } from 'sequelize';
import { env } from '../config/env.ts';

/** Money comes back as text, counts as numbers, an unsafe BIGINT as an error. */
const DIALECT_OPTIONS = {
  supportBigNumbers: false,
  bigNumberStrings: false,
  decimalAsNumber: false,
  bigIntAsNumber: true,
  insertIdAsNumber: true,
  checkNumberRange: true,
  connectTimeout: 5_000,
} as const;

/** Longer than any query of the product takes: a server that says nothing for so long is one that is gone. */
const SILENT_MS_MOST = 60_000;

/** `silentMsMost` 0 waits for ever, as a change of the schema may have to. */
export function connect(url: string, poolSize = 10, silentMsMost = 0): Sequelize {
  return new Sequelize(url, {
    dialect: 'mariadb',
    timezone: '+00:00',
    logging: false,
    pool: { max: poolSize, min: 0, acquire: 15_000, idle: 10_000 },
    dialectOptions: { ...DIALECT_OPTIONS, socketTimeout: silentMsMost },
  });
}

let pool: Sequelize | null = null;

export function database(): Sequelize {
  pool ??= connect(env().DATABASE_URL, 10, SILENT_MS_MOST);
  return pool;
}

export async function closeDatabase(): Promise<void> {
  const open = pool;
  pool = null;
  await open?.close();
}
