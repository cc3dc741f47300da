/** The audit chain: appended to by many at once without a gap, and every way of changing it afterwards is found. */
import { createHmac } from 'node:crypto';
import { QueryTypes } from 'sequelize';
import { afterAll, beforeAll, beforeEach, expect, test } from 'vitest';
import { closeDatabase, connect } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { appendAudit, type AuditFacts } from '../../src/server/db/repositories/audit.ts';
import { checkAuditChain, listAudit } from '../../src/server/db/repositories/auditLists.ts';
import { execute, select } from '../../src/server/db/sql.ts';
import { AUDIT_KEY } from '../support/auditKey.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

let owner: ReturnType<typeof connect>;

beforeAll(async () => {
  process.env['AUDIT_KEY'] = AUDIT_KEY;
  owner = connect((await useOwnDatabase()).ownerUrl, 1);
});
afterAll(async () => {
  await owner.close();
  await closeDatabase();
});

const FACTS: AuditFacts = {
  at: new Date('2026-12-01T08:00:00.123Z'),
  personId: null,
  personName: 'Ada North',
  action: 'take-alert',
  subjectKind: 'alert',
  subjectId: '7',
  borrowerId: null,
  deskId: null,
  summary: 'Took an alert',
  before: { state: 'raised' },
  after: null,
  requestId: 'r',
  address: '192.0.2.1',
};

const append = (facts: Partial<AuditFacts> = {}) =>
  inTransaction((tx) => appendAudit(tx, { ...FACTS, ...facts }));
const firstBroken = async () => (await inTransaction(checkAuditChain)).firstBroken;

/** What only somebody with the owner's account can do. */
const asOwner = (text: string, bind: unknown[] = []) => owner.query(text, { type: QueryTypes.RAW, bind });

beforeEach(async () => {
  await asOwner('delete from audit_entries');
  await asOwner(`update audit_heads set seq = 0, hash = repeat('0', 64) where id = 1`);
  for (let n = 0; n < 12; n += 1) await append({ subjectId: String(n) });
  expect(await firstBroken()).toBeNull();
});

test('forty writers at once leave one chain without a gap, and none of them fails', async () => {
  await Promise.all(
    Array.from({ length: 40 }, (_, writer) =>
      inTransaction(async (tx) => {
        await appendAudit(tx, { ...FACTS, subjectId: `${writer} a` });
        await appendAudit(tx, { ...FACTS, subjectId: `${writer} b` });
      }),
    ),
  );
  expect(await inTransaction(checkAuditChain)).toMatchObject({ entries: 12 + 80, firstBroken: null });
});

test('an entry and what it tells of stand or fall together', async () => {
  await expect(
    inTransaction(async (tx) => {
      await appendAudit(tx, FACTS);
      throw new Error('the change failed');
    }),
  ).rejects.toThrow('the change failed');
  expect(await inTransaction(checkAuditChain)).toMatchObject({ entries: 12, firstBroken: null });
});

test.each([
  ['summary', `'Took nothing'`],
  ['person_name', `'Somebody else'`],
  ['before_json', 'null'],
  ['after_json', `'{}'`],
  ['at', `'2026-12-01 08:00:00.124'`],
  ['address', `'192.0.2.2'`],
  ['borrower_id', '1'],
])('a changed %s is found at its entry', async (column, value) => {
  await asOwner(`update audit_entries set ${column} = ${value} where seq = 5`);
  expect(await firstBroken()).toBe(5);
});

test('a removed entry is found, and so is a cut tail', async () => {
  await asOwner('delete from audit_entries where seq = 5');
  expect(await firstBroken()).toBe(5);
  await asOwner('delete from audit_entries where seq >= 5');
  expect(await firstBroken()).toBe(5);
});

test('a chain linked anew without the key is found where it begins', async () => {
  await asOwner(`update audit_entries set summary = 'Took nothing' where seq = 5`);
  const rows = (await inTransaction((tx) => listAudit(tx, NOTHING_ASKED, { page: 1, perPage: 50 }))).rows;
  let previous = rows.find(({ seq }) => seq === 4)?.hash ?? '';
  for (const row of rows.filter(({ seq }) => seq >= 5).sort((a, b) => a.seq - b.seq)) {
    const hash = createHmac('sha256', 'a guess at the key').update(JSON.stringify(row)).digest('hex');
    await asOwner('update audit_entries set previous_hash = $1, hash = $2 where seq = $3', [
      previous,
      hash,
      row.seq,
    ]);
    previous = hash;
  }
  await asOwner('update audit_heads set hash = $1 where id = 1', [previous]);
  expect(await firstBroken()).toBe(5);
});

test('the head moved by the application is found, and cannot be removed by it', async () => {
  await inTransaction((tx) => execute(tx, 'update audit_heads set seq = 4 where id = 1'));
  expect(await firstBroken()).toBe(13);
  await expect(inTransaction((tx) => execute(tx, 'delete from audit_heads'))).rejects.toMatchObject({
    parent: { errno: 1142 },
  });
});

test('signs that a column cannot keep do not break the chain', async () => {
  await append({ summary: `half of a pair \ud83d` });
  await append({ summary: `${'x'.repeat(499)}😀 cut in the middle of its last sign` });
  await append({ summary: 'line\r\nbreak, \u0000 and é', after: { text: '\ud83d' } });
  expect(await firstBroken()).toBeNull();
  const rows = await inTransaction((tx) =>
    select<{ length: number }>(tx, 'select char_length(summary) as length from audit_entries where seq = 14'),
  );
  expect(rows).toEqual([{ length: 500 }]);
});

const NOTHING_ASKED = { action: null, personId: null, borrowerId: null, from: null, to: null };
