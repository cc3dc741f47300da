import '../support/useDatabase.ts';
import { afterAll, beforeAll, expect, inject, test } from 'vitest';
import { QueryTypes, type Sequelize } from 'sequelize';
import { closeDatabase, connect } from '../../src/server/db/connection.ts';
import { inTransaction, isDuplicate } from '../../src/server/db/inTransaction.ts';
import { execute, select, selectOne } from '../../src/server/db/sql.ts';
import { systemActor } from '../../src/server/services/actor.ts';
import { audit } from '../../src/server/services/write.ts';

let owner: Sequelize;
beforeAll(async () => {
  owner = connect(inject('databaseOwnerUrl'), 2);
  await owner.query(
    'create table if not exists sql_samples (id bigint not null auto_increment primary key, amount decimal(20,4) null, at datetime(3) null, day date null, word varchar(40) null unique) engine=InnoDB',
    { type: QueryTypes.RAW },
  );
  const [row] = await owner.query<{ name: string }>('select database() as name', { type: QueryTypes.SELECT });
  const user = new URL(inject('databaseUrl')).username;
  await owner.query(
    `grant select, insert, update, delete on ${row?.name}.sql_samples to '${user}'@'127.0.0.1'`,
    {
      type: QueryTypes.RAW,
    },
  );
});
afterAll(async () => {
  await owner.query('drop table sql_samples', { type: QueryTypes.RAW });
  await owner.close();
  await closeDatabase();
});

const errorNumber = (error: unknown): unknown =>
  (error as { parent?: { errno?: number } }).parent?.errno ?? error;
const refusal = (text: string): Promise<unknown> =>
  inTransaction((tx) => execute(tx, text)).then(() => 'no error', errorNumber);

test('money comes back as the text that went in, also when summed; counts are numbers', async () => {
  await inTransaction(async (tx) => {
    await execute(tx, 'delete from sql_samples');
    for (const amount of ['1234567890123456.7891', '0.0001'])
      await execute(tx, 'insert into sql_samples (amount) values (:amount)', { amount });
    const rows = await select<{ amount: string }>(tx, 'select amount from sql_samples order by id');
    expect(rows.map(({ amount }) => amount)).toEqual(['1234567890123456.7891', '0.0001']);
    const sums = await selectOne<{ total: string; n: number }>(
      tx,
      'select sum(amount) as total, count(*) as n from sql_samples',
    );
    expect(sums).toEqual({ total: '1234567890123456.7892', n: 2 });
  });
});

test('an instant keeps its milliseconds, a day stays text, an empty amount stays empty', async () => {
  const at = new Date('2026-11-30T23:59:59.987Z');
  await inTransaction(async (tx) => {
    const { insertId } = await execute(tx, 'insert into sql_samples (at, day) values (:at, :day)', {
      at,
      day: '2026-11-30',
    });
    expect(
      await selectOne(tx, 'select at, day, amount from sql_samples where id = :id', { id: insertId }),
    ).toEqual({ at, day: '2026-11-30', amount: null });
  });
});

test('values are bound, whatever they hold; a list fills IN and an empty list matches nothing', async () => {
  const word = `x' or 1=1 -- :word $1 ?`;
  await inTransaction(async (tx) => {
    await execute(tx, 'delete from sql_samples');
    await execute(tx, 'insert into sql_samples (word) values (:word), (:other)', { word, other: ':word' });
    const byWord = (words: string[]) =>
      select<{ word: string }>(tx, 'select word from sql_samples where word in (:words)', { words });
    expect(await byWord([word])).toEqual([{ word }]);
    expect(await byWord([word, ':word'])).toHaveLength(2);
    expect(await byWord([])).toEqual([]);
    expect(await select(tx, `select ':word' as literal`)).toEqual([{ literal: ':word' }]);
  });
});

test('an amount that does not fit is an error, not a rounded figure', async () => {
  await expect(
    inTransaction((tx) => execute(tx, `insert into sql_samples (amount) values ('12345678901234567')`)),
  ).rejects.toMatchObject({ parent: { errno: 1264 } });
});

test('a failed transaction leaves nothing, and a duplicate is told apart', async () => {
  const twice = inTransaction(async (tx) => {
    await execute(tx, `insert into sql_samples (word) values ('once')`);
    await execute(tx, `insert into sql_samples (word) values ('once')`);
  });
  await expect(twice.catch((error: unknown) => isDuplicate(error))).resolves.toBe(true);
  expect(await inTransaction((tx) => select(tx, `select id from sql_samples where word = 'once'`))).toEqual(
    [],
  );
});

test('audit entries can be added and read by the application, not changed, removed or dropped', async () => {
  const at = new Date('2026-12-01T08:00:00Z');
  const seq = await inTransaction((tx) =>
    audit(tx, systemActor('test', at), {
      action: 'test',
      subjectKind: 'test',
      subjectId: '1',
      borrowerId: null,
      deskId: null,
      summary: 'written by a test',
      before: null,
      after: { amount: '1.0000' },
    }),
  );
  const read = () =>
    inTransaction((tx) =>
      selectOne(tx, 'select person_name, summary, at from audit_entries where seq = :seq', { seq }),
    );
  expect(await read()).toEqual({ person_name: 'Underkeel', summary: 'written by a test', at });
  expect(await refusal(`update audit_entries set summary = 'other'`)).toBe(1142);
  expect(await refusal('delete from audit_entries')).toBe(1142);
  expect(await refusal('truncate table audit_entries')).toBe(1142);
  expect(await read()).toMatchObject({ summary: 'written by a test' });
});

test('the application changes no table and records no schema step', async () => {
  expect(await refusal('create table mine (id int primary key)')).toBe(1142);
  expect(await refusal('alter table borrowers add column mine int')).toBe(1142);
  expect(await refusal('drop table borrowers')).toBe(1142);
  expect(await refusal(`insert into schema_migrations (name, applied_at) values ('x', now())`)).toBe(1142);
});

test('a connection that the server closed is replaced by the next query', async () => {
  const id = await inTransaction((tx) => selectOne<{ id: number }>(tx, 'select connection_id() as id'));
  const other = connect(inject('databaseUrl'), 1);
  await other.query(`kill ${id?.id}`, { type: QueryTypes.RAW });
  await other.close();
  expect(await inTransaction((tx) => selectOne(tx, 'select 1 as one'))).toEqual({ one: 1 });
});
