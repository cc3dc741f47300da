/** One change, once: under conflicts, repeats, lost answers of COMMIT, and a database that goes silent. */
import { QueryTypes, type Transaction } from 'sequelize';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { ok } from '../../src/core/result.ts';
import { closeDatabase, connect } from '../../src/server/db/connection.ts';
import { inTransaction, isOutage } from '../../src/server/db/inTransaction.ts';
import { insertPerson } from '../../src/server/db/repositories/people.ts';
import { execute, select, selectOne } from '../../src/server/db/sql.ts';
import type { PersonActor } from '../../src/server/services/actor.ts';
import { audit, write } from '../../src/server/services/write.ts';
import { AUDIT_KEY } from '../support/auditKey.ts';
import { openLossyWay, type LossyWay } from '../support/lossyWay.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

let way: LossyWay;
let url: string;
let person: PersonActor['person'];
let other: PersonActor['person'];

beforeAll(async () => {
  process.env['AUDIT_KEY'] = AUDIT_KEY;
  ({ url } = await useOwnDatabase());
  way = await openLossyWay(url);
  process.env['DATABASE_URL'] = way.url;
  const add = (name: string, email: string) =>
    inTransaction(async (tx) => ({
      id: await insertPerson(tx, { name, email, passwordHash: null, roles: [], now: new Date() }),
      name,
      email,
      roles: [],
      deskIds: [],
    }));
  person = await add('Ada North', 'ada@lender.example');
  other = await add('Ben South', 'ben@lender.example');
});

afterAll(async () => {
  await closeDatabase();
  await way.close();
});

const actor = (idempotencyKey: string | null, who = person): PersonActor => ({
  person: who,
  requestId: 'r',
  address: '192.0.2.1',
  idempotencyKey,
  now: new Date(),
});

/** Reads first, as services do, then adds one to a person's version and tells so. */
const raise = (who: PersonActor, command: unknown = { raise: 1 }) =>
  write(who, 'raise', command, async (tx) => {
    await versionOf(tx, who.person.id);
    await execute(tx, 'update people set version = version + 1 where id = :id', { id: who.person.id });
    const seq = await audit(tx, who, {
      action: 'raise',
      subjectKind: 'person',
      subjectId: String(who.person.id),
      borrowerId: null,
      deskId: null,
      summary: 'Raised',
      before: null,
      after: null,
    });
    return ok({ seq });
  });

async function versionOf(tx: Transaction, id: number): Promise<number> {
  const row = await selectOne<{ version: number }>(tx, 'select version from people where id = :id', { id });
  return row?.version ?? 0;
}
const versionNow = (who = person) => inTransaction((tx) => versionOf(tx, who.id));
const entries = () =>
  inTransaction(
    async (tx) => (await select(tx, `select seq from audit_entries where action = 'raise'`)).length,
  );

test('forty writers at once, who all have looked before, all get through', async () => {
  const before = await versionNow();
  const done = await Promise.all(Array.from({ length: 40 }, () => raise(actor(null))));
  expect(done.every((outcome) => outcome.ok)).toBe(true);
  expect(await versionNow()).toBe(before + 40);
});

test('what two read and then write is not lost: the second starts anew from what the first left', async () => {
  const before = await versionNow();
  const addTo = (points: number) =>
    inTransaction(async (tx) => {
      const version = await versionOf(tx, person.id);
      await new Promise((resume) => setTimeout(resume, 100));
      await execute(tx, 'update people set version = :version where id = :id', {
        id: person.id,
        version: version + points,
      });
    });
  await Promise.all([addTo(10), addTo(5)]);
  expect(await versionNow()).toBe(before + 15);
});

test('two that wait for each other are sorted out by the database and both done', async () => {
  const before = [await versionNow(person), await versionNow(other)];
  const raiseBoth = (first: number, second: number) =>
    inTransaction(async (tx) => {
      for (const id of [first, second]) {
        await execute(tx, 'update people set version = version + 1 where id = :id', { id });
        await new Promise((resume) => setTimeout(resume, 100));
      }
    });
  await Promise.all([raiseBoth(person.id, other.id), raiseBoth(other.id, person.id)]);
  expect([await versionNow(person), await versionNow(other)]).toEqual(before.map((version) => version + 2));
});

test('thirty times the same key at once is one change and thirty equal answers', async () => {
  const [version, told] = [await versionNow(), await entries()];
  const answers = await Promise.all(Array.from({ length: 30 }, () => raise(actor('at-once'))));
  expect(new Set(answers.map((answer) => JSON.stringify(answer))).size).toBe(1);
  expect(answers[0]?.ok).toBe(true);
  expect([await versionNow(), await entries()]).toEqual([version + 1, told + 1]);
});

test('a key that was used for something else is refused, and somebody else’s same key is their own', async () => {
  const first = await raise(actor('mine'));
  const told = await entries();
  expect(await raise(actor('mine'), { raise: 2 })).toMatchObject({ ok: false, error: { kind: 'conflict' } });
  expect(await entries()).toBe(told);
  expect(await raise(actor('mine', other))).not.toEqual(first);
  expect(await entries()).toBe(told + 1);
});

test('a COMMIT whose answer is lost is an outage, and the repeat with its key finds it done', async () => {
  const [version, told] = [await versionNow(), await entries()];
  way.loseNextCommit();
  const lost = await raise(actor('lost')).catch((error: unknown) => error);
  expect(way.isArmed(), 'still to be lost').toBe(false);
  expect(isOutage(lost)).toBe(true);
  expect([await versionNow(), await entries()], 'it was done all the same').toEqual([version + 1, told + 1]);
  expect(await raise(actor('lost'))).toMatchObject({ ok: true });
  expect([await versionNow(), await entries()], 'and not again').toEqual([version + 1, told + 1]);
});

test('a database that says nothing for too long is one that is gone', async () => {
  const impatient = connect(url, 1, 500);
  const from = performance.now();
  const error: unknown = await impatient
    .query('select sleep(5)', { type: QueryTypes.SELECT })
    .catch((thrown: unknown) => thrown);
  expect(isOutage(error)).toBe(true);
  expect(performance.now() - from).toBeLessThan(3_000);
  await impatient.close();
});
