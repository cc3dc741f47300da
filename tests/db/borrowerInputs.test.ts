/** What an assessment rests on, as known at one moment. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { BorrowerInputs } from '../../src/core/borrowerInputs.ts';
import { decimal } from '../../src/core/money/decimal.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import {
  loadBorrowerInputs,
  loadManyBorrowerInputs,
} from '../../src/server/db/repositories/borrowerInputs.ts';
import { insertAddBacks, insertWaiver } from '../../src/server/db/repositories/covenants.ts';
import { insertUndertaking } from '../../src/server/db/repositories/undertakings.ts';
import { execute } from '../../src/server/db/sql.ts';
import { runNight } from '../../src/server/services/runNight.ts';
import { buildStatements } from '../support/factories.ts';
import { ACCEPTED, buildNightBook, LAST_QUARTER, rows, type NightBook } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

let book: NightBook;
const LATER = new Date('2026-11-25T10:00:00Z');
const justBefore = (instant: Date) => new Date(instant.getTime() - 1);

beforeAll(async () => {
  await useOwnDatabase();
  book = await buildNightBook();
});
afterAll(closeDatabase);

const load = async (knownAt: Date): Promise<BorrowerInputs> => {
  const inputs = await inTransaction((tx) => loadBorrowerInputs(tx, book.thin.id, knownAt));
  if (!inputs) throw new Error('no borrower');
  return inputs;
};

test('figures, covenants and undertakings are there from the instant they are known, not a millisecond before', async () => {
  const before = await load(justBefore(ACCEPTED));
  expect([before.statements, before.covenants, before.undertakings]).toEqual([[], [], []]);
  const { statements, covenants } = await load(ACCEPTED);
  expect(statements).toHaveLength(16);
  expect(covenants.map(({ levels }) => levels.length)).toEqual([1]);
});

test('an amount is the decimal that was stored; a line that was not given is not there', async () => {
  const { statements } = await load(ACCEPTED);
  const latest = statements.find(({ periodEnd, months }) => periodEnd === LAST_QUARTER && months === 3);
  expect(latest?.amounts.revenue?.toFixed()).toBe('10000000');
  expect(latest?.amounts).not.toHaveProperty('goodwill');
});

test('the version of the inputs is a whole number', async () => {
  expect((await load(ACCEPTED)).inputVersion).toBe(1);
});

test('a later version stands beside the earlier one; what was taken back is gone from that instant', async () => {
  await inTransaction((tx) =>
    buildStatements(tx, book.thin, {
      last: LAST_QUARTER,
      quarters: [{ ebitda: 900_000, debt: 13_800_000 }],
      knownFrom: LATER,
    }),
  );
  const versions = async (knownAt: Date) =>
    (await load(knownAt)).statements
      .filter(({ periodEnd, months }) => periodEnd === LAST_QUARTER && months === 3)
      .map(({ version }) => version);
  expect(await versions(justBefore(LATER))).toEqual([1]);
  expect(await versions(LATER)).toEqual([1, 2]);

  const takenBack = new Date('2026-11-26T10:00:00Z');
  await inTransaction((tx) =>
    execute(
      tx,
      'update statements set known_to = :takenBack where borrower_id = :id and statement_version = 2',
      {
        takenBack,
        id: book.thin.id,
      },
    ),
  );
  expect(await versions(justBefore(takenBack))).toEqual([1, 2]);
  expect(await versions(takenBack)).toEqual([1]);
});

test('add-backs, waivers and undertakings come with their covenant or borrower from when they are known', async () => {
  const [covenant] = (await load(ACCEPTED)).covenants;
  if (!covenant) throw new Error('no covenant');
  await inTransaction(async (tx) => {
    await insertAddBacks(tx, covenant.id, [
      {
        periodEnd: LAST_QUARTER,
        months: 3,
        label: 'Restructuring',
        amount: decimal('120000.5'),
        capped: true,
        reason: 'plant closure',
        evidence: 'board minutes',
        recordedBy: book.desk.analyst.id,
        checkedBy: null,
        knownFrom: LATER,
      },
    ]);
    await insertWaiver(tx, {
      covenantId: covenant.id,
      testDate: LAST_QUARTER,
      grantedOn: '2026-11-25',
      until: null,
      conditions: 'none',
      grantedBy: book.desk.head.id,
      knownFrom: LATER,
    });
    await insertUndertaking(tx, {
      borrowerId: book.thin.id,
      kind: 'quarterly accounts',
      everyMonths: 3,
      dueDays: 45,
      dayCount: 'calendar',
      graceDays: 10,
      firstPeriodEnd: '2026-03-31',
      knownFrom: LATER,
    });
  });
  const before = await load(justBefore(LATER));
  expect(before.covenants[0]).toMatchObject({ addBacks: [], waivers: [] });
  expect(before.undertakings).toEqual([]);
  const after = await load(LATER);
  expect(after.covenants[0]?.addBacks[0]).toMatchObject({ label: 'Restructuring', capped: true, months: 3 });
  expect(after.covenants[0]?.addBacks[0]?.amount.toFixed()).toBe('120000.5');
  expect(after.covenants[0]?.waivers).toEqual([
    { testDate: LAST_QUARTER, grantedOn: '2026-11-25', until: null, conditions: 'none' },
  ]);
  expect(after.undertakings).toMatchObject([
    { kind: 'quarterly accounts', dueDays: 45, dayCount: 'calendar' },
  ]);
});

test('many borrowers at once are the same as one by one', async () => {
  const ids = [book.roomy.id, book.thin.id, book.notMet.id];
  const many = await inTransaction((tx) => loadManyBorrowerInputs(tx, ids, LATER));
  const one = await Promise.all(ids.map((id) => inTransaction((tx) => loadBorrowerInputs(tx, id, LATER))));
  expect(many).toEqual(one);
});

test('the assessment before is the last one made of earlier inputs, however often it was repeated since', async () => {
  const night = (day: '2026-12-01' | '2026-12-02' | '2026-12-03') =>
    runNight({ businessDate: day, kind: 'nightly', startedBy: null, now: new Date(`${day}T01:30:00Z`) });
  const previous = async (knownAt: string) => (await load(new Date(knownAt))).previous;
  await night('2026-12-01');
  await night('2026-12-02');
  expect(await previous('2026-12-02T12:00:00Z')).toBeNull();

  await inTransaction((tx) =>
    buildStatements(tx, book.thin, {
      last: LAST_QUARTER,
      quarters: [{ ebitda: 500_000, debt: 13_800_000 }],
      knownFrom: new Date('2026-12-02T13:00:00Z'),
    }),
  );
  // Too few borrowers for a score: one is written in, to tell the second night from the others.
  await inTransaction((tx) =>
    execute(
      tx,
      `update assessments set quality_headline = 61 where borrower_id = :id and as_of = '2026-12-02'`,
      { id: book.thin.id },
    ),
  );
  const first = await previous('2026-12-02T13:00:00Z');
  expect(first?.quality).toMatchObject({ quarterEnd: LAST_QUARTER, headline: 61 });
  await night('2026-12-03');
  expect(await previous('2026-12-03T12:00:00Z')).toEqual(first);
});

test('accounts that are one day later are the same alert with today’s words', async () => {
  await inTransaction((tx) =>
    insertUndertaking(tx, {
      borrowerId: book.roomy.id,
      kind: 'annual accounts',
      everyMonths: 12,
      dueDays: 120,
      dayCount: 'calendar',
      graceDays: 10,
      firstPeriodEnd: '2025-12-31',
      knownFrom: ACCEPTED,
    }),
  );
  const nightOf = async (day: '2026-12-04' | '2026-12-05') => {
    await runNight({
      businessDate: day,
      kind: 'nightly',
      startedBy: null,
      now: new Date(`${day}T01:30:00Z`),
    });
    return rows<{ sentence: string; counter: number; version: number }>(
      `select sentence, counter, version from alerts where borrower_id = :id and kind = 'statement late'`,
      { id: book.roomy.id },
    );
  };
  const [first] = await nightOf('2026-12-04');
  const [second] = await nightOf('2026-12-05');
  expect(first?.sentence).toContain('218 days late');
  expect(second?.sentence).toContain('219 days late');
  expect(second).toMatchObject({ counter: 1, version: first?.version });
});
