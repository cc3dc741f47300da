/** The review sheet in the database: whose it is, what is written down when it leaves, and what it rests on. */
import '../support/useDatabase.ts';
import ExcelJS from 'exceljs';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { Person } from '../../src/server/auth/policy.ts';
import { METHOD_VERSION } from '../../src/core/policy.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import type { PersonActor } from '../../src/server/services/actor.ts';
import { exportReviewSheet } from '../../src/server/services/exportReviewSheet.ts';
import { makeReviewSheet } from '../../src/server/services/makeReviewSheet.ts';
import { runNight } from '../../src/server/services/runNight.ts';
import { showBorrower } from '../../src/server/services/showBorrower.ts';
import { buildBorrower, buildDesk, buildPerson } from '../support/factories.ts';
import { ACCEPTED, buildNightBook, rows, type NightBook } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

const NIGHT = new Date('2026-11-30T01:30:00Z');
const MORNING = new Date('2026-12-01T08:00:00Z');

let book: NightBook;
let stranger: Person;
let committee: Person;

beforeAll(async () => {
  await useOwnDatabase();
  book = await buildNightBook();
  [stranger, committee] = await inTransaction(async (tx) => [
    (await buildDesk(tx, ACCEPTED)).analyst,
    await buildPerson(tx, { roles: ['committee member'], now: ACCEPTED }),
  ]);
  await runNight({ businessDate: '2026-11-30', kind: 'nightly', startedBy: null, now: NIGHT });
});
afterAll(closeDatabase);

const as = (person: Person, now = MORNING): PersonActor => ({
  person,
  requestId: 'request-1',
  address: '192.0.2.1',
  idempotencyKey: null,
  now,
});

const exports = () =>
  rows<{ personId: number; subjectId: string; borrowerId: number; deskId: number; summary: string }>(
    `select person_id as personId, subject_id as subjectId, borrower_id as borrowerId, desk_id as deskId, summary
     from audit_entries where action = 'export-review-sheet' order by seq`,
  );

test('another desk’s borrower and one that never was are not found, and nothing is written down', async () => {
  for (const id of [book.notMet.id, 999_999]) {
    const notFound = { ok: false, error: { kind: 'not-found', what: 'borrower' } };
    expect(await makeReviewSheet(as(stranger), id)).toEqual(notFound);
    expect(await exportReviewSheet(as(stranger), id)).toEqual(notFound);
  }
  expect(await exports()).toEqual([]);
});

test('an export is in the audit log with who, whose and what it rests on; a repeat is a line of its own', async () => {
  const actor = { ...as(committee), idempotencyKey: 'the-same-key' };
  for (const expected of [1, 2]) {
    expect((await exportReviewSheet(actor, book.notMet.id)).ok).toBe(true);
    expect(await exports()).toHaveLength(expected);
  }
  expect((await exports())[0]).toEqual({
    personId: committee.id,
    subjectId: String(book.notMet.id),
    borrowerId: book.notMet.id,
    deskId: book.desk.id,
    summary: `Exported the review sheet of ${book.notMet.name} as XLSX (DRAFT, data cut-off 30 Nov 2026, 01:30 UTC, method ${METHOD_VERSION}, policy 1, input version 1)`,
  });
});

test('looking at the page is not an export', async () => {
  const before = await exports();
  expect((await makeReviewSheet(as(book.desk.analyst), book.notMet.id)).ok).toBe(true);
  expect(await exports()).toEqual(before);
});

test('the workbook’s numbers are those of the borrower’s page', async () => {
  const view = await showBorrower(as(book.desk.analyst), book.notMet.id);
  const exported = await exportReviewSheet(as(book.desk.analyst), book.notMet.id);
  if (!view.ok || !exported.ok) throw new Error('not found');
  expect(exported.value.fileName).toBe(`Review sheet ${book.notMet.name} 2026-12-01 DRAFT.xlsx`);
  const workbook = new ExcelJS.Workbook();
  await workbook.xlsx.load(new Uint8Array(exported.value.bytes).buffer);
  const numbers: number[] = [];
  workbook.getWorksheet('Review')?.eachRow((row) =>
    row.eachCell(({ value }) => {
      if (typeof value === 'number') numbers.push(value);
    }),
  );
  const [covenant] = view.value.covenants;
  const latest = covenant?.tests.at(-1);
  expect(latest?.outcome).toBe('not met');
  for (const figure of [latest?.tested, latest?.level, latest?.mayFall, covenant?.headroom?.moneyLeft])
    expect(numbers).toContain(Number(figure));
});

test('signals come with the sheet, open ones first', async () => {
  const made = await makeReviewSheet(as(committee), book.notMet.id);
  if (!made.ok) throw new Error('not found');
  const [open] = made.value.sheet.sections[15]?.blocks ?? [];
  expect(open?.kind === 'table' && open.rows[0]?.map(({ text }) => text)).toEqual([
    'test not met',
    'urgent',
    expect.stringMatching(/^Total leverage 4\.00x, at most 3\.50x: not met on our figures/),
    '30 Nov 2026',
    'not taken yet',
    expect.any(String),
    expect.any(String),
  ]);
});

test('a borrower that was never assessed has its sheet, and the sheet says so', async () => {
  const fresh = await inTransaction((tx) => buildBorrower(tx, book.desk, { now: ACCEPTED }));
  const made = await makeReviewSheet(as(committee), fresh.id);
  if (!made.ok) throw new Error('not found');
  expect(made.value.sheet.basisLine).toBe('not assessed yet');
  expect(made.value.sheet.sections).toHaveLength(20);
  expect((await exportReviewSheet(as(committee), fresh.id)).ok).toBe(true);
});

test('thirty exports in a minute are taken, the next is told to wait and is not written down', async () => {
  const person = await inTransaction((tx) => buildPerson(tx, { roles: ['auditor'], now: ACCEPTED }));
  for (let taken = 0; taken < 30; taken += 1)
    expect((await exportReviewSheet(as(person), book.thin.id)).ok).toBe(true);
  const before = await exports();
  const refused = await exportReviewSheet(as(person), book.thin.id);
  expect(refused).toMatchObject({ ok: false, error: { kind: 'too-many', retryAfterSeconds: 60 } });
  expect(await exports()).toEqual(before);
  const later = new Date(MORNING.getTime() + 61_000);
  expect((await exportReviewSheet(as(person, later), book.thin.id)).ok).toBe(true);
});
