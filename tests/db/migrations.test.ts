import { QueryTypes } from 'sequelize';
import { expect, inject, test } from 'vitest';
import { connect } from '../../src/server/db/connection.ts';
import { MIGRATIONS, migrateDown, migrateUp } from '../../src/server/db/migrator.ts';
import { freshDatabase } from '../support/localServer.ts';

const names = MIGRATIONS.map(({ name }) => name);
const fresh = async () => (await freshDatabase(inject('databaseServer'))).ownerUrl;

async function tables(url: string): Promise<{ name: string; definition: string }[]> {
  const database = connect(url, 1);
  try {
    const rows = await database.query<{ name: string }>(
      'select table_name as name from information_schema.tables where table_schema = database() order by 1',
      { type: QueryTypes.SELECT },
    );
    const found = [];
    for (const { name } of rows) {
      const [row] = await database.query<Record<string, string>>(`show create table \`${name}\``, {
        type: QueryTypes.SELECT,
      });
      found.push({ name, definition: row?.['Create Table'] ?? '' });
    }
    return found;
  } finally {
    await database.close();
  }
}

test('the first run applies every step, the second none', async () => {
  const url = await fresh();
  expect(await migrateUp(url)).toEqual(names);
  expect(await migrateUp(url)).toEqual([]);
});

test('up, down and up again leaves the same schema, and down leaves no table of the product', async () => {
  const url = await fresh();
  await migrateUp(url);
  const before = await tables(url);
  expect(await migrateDown(url)).toEqual([...names].reverse());
  expect((await tables(url)).map(({ name }) => name)).toEqual(['schema_locks', 'schema_migrations']);
  await migrateUp(url);
  expect(await tables(url)).toEqual(before);
});

test('two runners at once apply each step once', async () => {
  const url = await fresh();
  const [first, second] = await Promise.all([migrateUp(url), migrateUp(url)]);
  expect([...first, ...second].sort()).toEqual(names);
  expect(Math.min(first.length, second.length)).toBe(0);
});

test.each(MIGRATIONS.map((step, index) => ({ name: step.name, index })))(
  'a run that was cut before $name was recorded is taken up again',
  async ({ index }) => {
    const url = await fresh();
    await migrateUp(url, MIGRATIONS.slice(0, index));
    const database = connect(url, 1);
    try {
      for (const statement of MIGRATIONS[index]!.up)
        await database.query(statement, { type: QueryTypes.RAW });
    } finally {
      await database.close();
    }
    expect(await migrateUp(url)).toEqual(names.slice(index));
  },
);

test('a lock whose holder died is taken over after its lease', async () => {
  const url = await fresh();
  await migrateUp(url);
  const database = connect(url, 1);
  await database.query(
    `update schema_locks set owner = 'a runner that was killed', held_until = now(6) + interval 1 second`,
    { type: QueryTypes.UPDATE },
  );
  const before = performance.now();
  expect(await migrateUp(url)).toEqual([]);
  expect(performance.now() - before).toBeGreaterThan(700);
  await database.close();
});

test('a step that fails is not recorded, says why, and leaves the lock free', async () => {
  const url = await fresh();
  const broken = { name: '0002-broken', up: ['create table wrong ('], down: [] };
  await expect(migrateUp(url, [MIGRATIONS[0]!, broken])).rejects.toThrow(/0002-broken/);
  const before = performance.now();
  expect(await migrateUp(url, [MIGRATIONS[0]!])).toEqual([]);
  expect(performance.now() - before).toBeLessThan(5_000);
});

test('every table has a primary key, is InnoDB and has an index on each foreign key', async () => {
  const url = await fresh();
  await migrateUp(url);
  for (const { name, definition } of await tables(url)) {
    expect(definition, name).toContain('PRIMARY KEY');
    expect(definition, name).toContain('ENGINE=InnoDB');
    for (const [, column] of definition.matchAll(/FOREIGN KEY \(`(\w+)`/g))
      expect(definition, `${name}.${column}`).toMatch(new RegExp(`KEY (\`\\w+\` )?\\(\`${column}\``));
  }
});
