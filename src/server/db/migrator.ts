/**
 * The schema's steps, in order, each applied once.
 *
 * MariaDB commits every DDL statement by itself, so a step can be cut in the middle: its statements are written
 * to be safe to run twice, and the step is recorded only after its last one. Runners wait for each other at a
 * lock row with a lease by the database's clock; a named lock of the server would not hold over several nodes.
 */
import { randomUUID } from 'node:crypto';
import { QueryTypes, type Sequelize, type Transaction } from 'sequelize';
import { Umzug } from 'umzug';
import { connect } from './connection.ts';
import type { Migration } from './migration.ts';
import { migration as people } from './migrations/0001-people.ts';
import { migration as audit } from './migrations/0002-audit.ts';
import { migration as borrowers } from './migrations/0003-borrowers.ts';
import { migration as statements } from './migrations/0004-statements.ts';
import { migration as results } from './migrations/0005-results.ts';
import { migration as covenants } from './migrations/0006-covenants.ts';
import { migration as policy } from './migrations/0007-policy.ts';
import { migration as movements } from './migrations/0008-movements.ts';
import { migration as bookPatterns } from './migrations/0009-book-patterns.ts';
import { select } from './sql.ts';

export const MIGRATIONS: readonly Migration[] = [
  people,
  audit,
  borrowers,
  statements,
  results,
  covenants,
  policy,
  movements,
  bookPatterns,
];

const LEASE_SECONDS = 30;
const WAIT_SECONDS = 180;

/** Brings the schema up to date; answers with the names of the steps that were applied. */
export const migrateUp = (url: string, steps = MIGRATIONS): Promise<string[]> =>
  underLock(url, async (database) => (await runner(database, steps).up()).map(({ name }) => name));

/** Undoes every step, the last first. Data is lost: for tests and development only. */
export const migrateDown = (url: string, steps = MIGRATIONS): Promise<string[]> =>
  underLock(url, async (database) => (await runner(database, steps).down({ to: 0 })).map(({ name }) => name));

/** Names of the steps that this program needs and the database does not have. */
export async function missingMigrations(tx: Transaction): Promise<string[]> {
  const rows = await select<{ name: string }>(tx, 'select name from schema_migrations');
  const applied = new Set(rows.map(({ name }) => name));
  return MIGRATIONS.map(({ name }) => name).filter((name) => !applied.has(name));
}

function runner(database: Sequelize, steps: readonly Migration[]): Umzug {
  const runAll = async (statements: readonly string[]) => {
    for (const statement of statements) await raw(database, statement);
  };
  return new Umzug({
    migrations: steps.map((step) => ({
      name: step.name,
      up: () => runAll(step.up),
      down: () => runAll(step.down),
    })),
    storage: {
      logMigration: ({ name }) =>
        raw(
          database,
          'insert into schema_migrations (name, applied_at) values ($1, utc_timestamp(3)) on duplicate key update name = name',
          [name],
        ),
      unlogMigration: ({ name }) => raw(database, 'delete from schema_migrations where name = $1', [name]),
      executed: () => appliedSteps(database),
    },
    logger: undefined,
  });
}

async function appliedSteps(database: Sequelize): Promise<string[]> {
  const rows = await database.query<{ name: string }>('select name from schema_migrations order by name', {
    type: QueryTypes.SELECT,
  });
  return rows.map(({ name }) => name);
}

const raw = async (database: Sequelize, text: string, bind?: unknown[]): Promise<void> => {
  await database.query(text, { type: QueryTypes.RAW, ...(bind && { bind }) });
};

async function underLock<T>(url: string, work: (database: Sequelize) => Promise<T>): Promise<T> {
  const database = connect(url, 2);
  const owner = randomUUID();
  try {
    await raw(
      database,
      `create table if not exists schema_migrations (
         name varchar(100) not null primary key,
         applied_at datetime(3) not null
       ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_bin`,
    );
    await raw(
      database,
      `create table if not exists schema_locks (
         id tinyint unsigned not null primary key,
         owner char(36) null,
         held_until datetime(6) null
       ) engine=InnoDB default charset=utf8mb4 collate=utf8mb4_bin`,
    );
    await raw(database, 'insert ignore into schema_locks (id) values (1)');
    await waitForLock(database, owner);
    const renewal = setInterval(() => void holdLock(database, owner).catch(() => false), LEASE_SECONDS * 300);
    try {
      return await work(database);
    } finally {
      clearInterval(renewal);
      await change(
        database,
        'update schema_locks set owner = null, held_until = null where id = 1 and owner = $1',
        [owner],
      );
    }
  } finally {
    await database.close();
  }
}

async function waitForLock(database: Sequelize, owner: string): Promise<void> {
  for (let waited = 0; waited < WAIT_SECONDS * 4; waited += 1) {
    if (await holdLock(database, owner)) return;
    await new Promise((resume) => setTimeout(resume, 250));
  }
  throw new Error(`another runner has held the schema's lock for ${WAIT_SECONDS} s; nothing was changed`);
}

/** Takes the lock where it is free or its lease has ended, or renews it. */
async function holdLock(database: Sequelize, owner: string): Promise<boolean> {
  const changed = await change(
    database,
    `update schema_locks set owner = $1, held_until = now(6) + interval ${LEASE_SECONDS} second
     where id = 1 and (owner is null or owner = $1 or held_until < now(6))`,
    [owner],
  );
  return changed === 1;
}

async function change(database: Sequelize, text: string, bind: unknown[]): Promise<number> {
  const [, affectedRows] = await database.query(text, { type: QueryTypes.UPDATE, bind });
  return affectedRows;
}
