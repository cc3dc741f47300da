/** The audit log: read by filters, and a chain that shows where somebody with the database's own rights touched it. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { QueryTypes, type Sequelize } from 'sequelize';
import { auditQuery } from '../../src/contracts/audit.ts';
import { closeDatabase, connect } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { checkAuditLog, readAuditLog } from '../../src/server/services/readAuditLog.ts';
import { audit } from '../../src/server/services/write.ts';
import { acting, done } from '../support/acting.ts';
import { buildBorrower, buildDesk, type BuiltBorrower, type BuiltDesk } from '../support/factories.ts';
import { rows } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

const FIRST = new Date('2026-12-01T23:59:59.999Z');
const SECOND = new Date('2026-12-02T00:00:00.000Z');

let owner: Sequelize;
let desk: BuiltDesk;
let borrower: BuiltBorrower;

beforeAll(async () => {
  const { ownerUrl } = await useOwnDatabase();
  owner = connect(ownerUrl, 1);
  await inTransaction(async (tx) => {
    desk = await buildDesk(tx, FIRST);
    borrower = await buildBorrower(tx, desk, { now: FIRST });
  });
});
afterAll(async () => {
  await owner.close();
  await closeDatabase();
});

/** Six entries by two people on two days, two of them about a borrower. */
beforeEach(async () => {
  await asOwner('delete from audit_entries');
  await asOwner(`update audit_heads set seq = 0, hash = repeat('0', 64)`);
  for (let number = 1; number <= 6; number += 1)
    await inTransaction((tx) =>
      audit(tx, acting(number <= 4 ? desk.analyst : desk.manager, number <= 3 ? FIRST : SECOND), {
        action: number % 2 === 0 ? 'accept-import' : 'stage-import',
        subjectKind: 'import',
        subjectId: String(number),
        borrowerId: number <= 2 ? borrower.id : null,
        deskId: desk.id,
        summary: `Entry ${number}: “Zürich” and a ship ⛴`,
        before: number === 1 ? null : { amount: '1.10', order: ['b', 'a'] },
        after: { number },
      }),
    );
});

const asOwner = (sql: string) => owner.query(sql, { type: QueryTypes.RAW });
const check = async () => done(await checkAuditLog());

test('an untouched chain is intact, with its last hash to note elsewhere', async () => {
  const [head] = await rows<{ hash: string }>('select hash from audit_entries order by seq desc limit 1');
  expect(await check()).toEqual({ entries: 6, intact: true, firstBroken: null, headHash: head?.hash });
});

test('an empty log is intact', async () => {
  await asOwner('delete from audit_entries');
  await asOwner(`update audit_heads set seq = 0, hash = repeat('0', 64)`);
  expect(await check()).toMatchObject({ entries: 0, intact: true });
});

describe('with the rights of the database’s owner', () => {
  test.each([
    ['summary', `'Nothing happened'`],
    ['person_id', '1 + person_id'],
    ['person_name', `'Somebody else'`],
    ['action', `'withdraw-import'`],
    ['subject_kind', `'alert'`],
    ['subject_id', `'77'`],
    ['borrower_id', '99'],
    ['desk_id', 'null'],
    ['before_json', 'null'],
    ['after_json', `'{"number":30}'`],
    ['at', `'2026-12-01 23:59:59.998'`],
    ['request_id', `'another'`],
    ['address', `'192.0.2.2'`],
  ])('a changed %s is found where it is', async (column, value) => {
    await asOwner(`update audit_entries set ${column} = ${value} where seq = 3`);
    expect(await check()).toMatchObject({ intact: false, firstBroken: 3, entries: 6 });
  });

  test.each([
    ['the first entry', 'seq = 1', 1],
    ['an entry in the middle', 'seq = 4', 4],
    ['the tail', 'seq >= 5', 5],
    ['all of it', 'true', 1],
  ])('%s that is cut out is found', async (_, where, firstBroken) => {
    await asOwner(`delete from audit_entries where ${where}`);
    expect(await check()).toMatchObject({ intact: false, firstBroken });
  });

  test('an entry cut out and the rest numbered and linked anew is found, for the hashes need the key', async () => {
    await asOwner('delete from audit_entries where seq = 3');
    await asOwner('update audit_entries set seq = seq - 1 where seq > 3 order by seq');
    await asOwner(
      `update audit_entries e join audit_entries p on p.seq = e.seq - 1 set e.previous_hash = p.hash where e.seq = 3`,
    );
    await asOwner('update audit_heads set seq = 5');
    expect(await check()).toMatchObject({ intact: false, firstBroken: 3 });
  });

  test('two entries that change places are found', async () => {
    await asOwner('update audit_entries set seq = 100 where seq = 2');
    await asOwner('update audit_entries set seq = 2 where seq = 3');
    await asOwner('update audit_entries set seq = 3 where seq = 100');
    expect(await check()).toMatchObject({ intact: false, firstBroken: 2 });
  });

  test('an entry put in with a hash of one’s own is found', async () => {
    await asOwner(
      `insert into audit_entries (seq, at, person_name, action, subject_kind, subject_id, summary, request_id, address, previous_hash, hash)
       select 7, at, person_name, action, subject_kind, subject_id, summary, request_id, address, hash, sha2(concat(hash, summary), 256)
       from audit_entries where seq = 6`,
    );
    await asOwner(`update audit_heads h join audit_entries e on e.seq = 7 set h.seq = 7, h.hash = e.hash`);
    expect(await check()).toMatchObject({ intact: false, firstBroken: 7 });
  });

  test('a tail cut together with its head is told only by the last hash that was noted elsewhere', async () => {
    const noted = await check();
    await asOwner('delete from audit_entries where seq >= 5');
    await asOwner('update audit_heads h join audit_entries e on e.seq = 4 set h.seq = 4, h.hash = e.hash');
    const after = await check();
    expect(after.intact).toBe(true);
    expect(after.entries).toBeLessThan(noted.entries);
    expect(after.headHash).not.toBe(noted.headHash);
  });
});

describe('reading', () => {
  const read = async (asked: Record<string, unknown> = {}) =>
    done(await readAuditLog(auditQuery.parse(asked)));
  const numbers = async (asked: Record<string, unknown>) => (await read(asked)).rows.map(({ seq }) => seq);

  test('goes newest first, with who, what, before and after, and the name of the borrower', async () => {
    expect(await numbers({})).toEqual([6, 5, 4, 3, 2, 1]);
    const [entry] = (await read({ borrowerId: borrower.id })).rows;
    expect(entry).toMatchObject({
      seq: 2,
      at: FIRST.toISOString(),
      who: desk.analyst.name,
      action: 'accept-import',
      subject: 'import 2',
      borrowerName: borrower.name,
      before: '{"amount":"1.10","order":["b","a"]}',
      after: '{"number":2}',
      requestId: 'request-1',
      address: '192.0.2.1',
    });
  });

  test('filters by action, person, borrower and day, each alone and together', async () => {
    expect(await numbers({ action: 'accept-import' })).toEqual([6, 4, 2]);
    expect(await numbers({ personId: desk.manager.id })).toEqual([6, 5]);
    expect(await numbers({ borrowerId: borrower.id })).toEqual([2, 1]);
    expect(await numbers({ from: '2026-12-02' })).toEqual([6, 5, 4]);
    expect(await numbers({ to: '2026-12-01' })).toEqual([3, 2, 1]);
    expect(await numbers({ from: '2026-12-02', action: 'stage-import' })).toEqual([5]);
    expect(auditQuery.safeParse({ from: 'yesterday' }).success).toBe(false);
  });

  test('pages without a gap', async () => {
    const pages = [await read({ perPage: 4, page: 1 }), await read({ perPage: 4, page: 2 })];
    expect(pages.flatMap(({ rows: listed }) => listed.map(({ seq }) => seq))).toEqual([6, 5, 4, 3, 2, 1]);
    expect(pages.map(({ total }) => total)).toEqual([6, 6]);
  });
});
