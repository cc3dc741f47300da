/** The nightly run started by hand. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { Person, Role } from '../../src/server/auth/policy.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { findRunToDo } from '../../src/server/db/repositories/runs.ts';
import { execute } from '../../src/server/db/sql.ts';
import type { PersonActor } from '../../src/server/services/actor.ts';
import { listRuns, showRun } from '../../src/server/services/listRuns.ts';
import { runNight } from '../../src/server/services/runNight.ts';
import { startRun } from '../../src/server/services/startRun.ts';
import { buildPerson } from '../support/factories.ts';
import { ACCEPTED, buildNightBook, rows, type NightBook } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

let book: NightBook;
let administrator: Person;
/** In Paris it is 00:30 of 2 December. */
const now = new Date('2026-12-01T23:30:00Z');

const as = (person: Person, over: Partial<PersonActor> = {}): PersonActor => ({
  person,
  requestId: 'test',
  address: '127.0.0.1',
  idempotencyKey: null,
  now,
  ...over,
});

beforeAll(async () => {
  await useOwnDatabase();
  book = await buildNightBook();
  administrator = await inTransaction((tx) => buildPerson(tx, { roles: ['administrator'], now: ACCEPTED }));
});
afterAll(closeDatabase);
beforeEach(() =>
  inTransaction(async (tx) => {
    await execute(tx, 'delete from run_tasks');
    await execute(tx, 'delete from runs');
  }),
);

const states = () =>
  rows<{ businessDate: string; state: string; attempt: number }>(
    'select business_date as businessDate, state, attempt from runs order by id',
  );

test('is queued for the business date of the lender’s zone and found by the worker', async () => {
  const started = await startRun(as(administrator), {});
  expect(started).toMatchObject({ ok: true, value: { businessDate: '2026-12-02', attempt: 1 } });
  expect(await states()).toEqual([{ businessDate: '2026-12-02', state: 'queued', attempt: 1 }]);
  const waiting = await inTransaction((tx) => findRunToDo(tx));
  expect(waiting).toMatchObject({ businessDate: '2026-12-02', startedById: administrator.id });
  const done = await runNight({
    businessDate: '2026-12-02',
    kind: 'nightly',
    startedBy: administrator.id,
    now,
  });
  expect(done).toMatchObject({ outcome: 'done', attempt: 1, tested: 3 });
  expect(await inTransaction((tx) => findRunToDo(tx))).toBeNull();
});

test('of a date that is done is another attempt of the same run', async () => {
  await runNight({ businessDate: '2026-12-01', kind: 'nightly', startedBy: null, now });
  expect(await startRun(as(administrator), { businessDate: '2026-12-01' })).toMatchObject({
    ok: true,
    value: { attempt: 2 },
  });
  expect(await runNight({ businessDate: '2026-12-01', kind: 'nightly', startedBy: null, now })).toMatchObject(
    {
      outcome: 'done',
      attempt: 2,
    },
  );
  expect(await states()).toEqual([{ businessDate: '2026-12-01', state: 'done', attempt: 2 }]);
});

test('while it is queued or running is refused and starts nothing', async () => {
  await startRun(as(administrator), {});
  expect(await startRun(as(administrator), {})).toMatchObject({ ok: false, error: { kind: 'conflict' } });
  await inTransaction((tx) => execute(tx, `update runs set state = 'running'`));
  expect(await startRun(as(administrator), {})).toMatchObject({ ok: false, error: { kind: 'conflict' } });
  expect(await states()).toEqual([{ businessDate: '2026-12-02', state: 'running', attempt: 1 }]);
});

test('sent twice with one key is started once and answered the same', async () => {
  const actor = as(administrator, { idempotencyKey: 'one-start' });
  const first = await startRun(actor, {});
  expect(await startRun(actor, {})).toEqual(first);
  expect(await states()).toHaveLength(1);
});

test.each([
  ['2026-12-01', true],
  ['2026-12-02', true],
  ['2026-12-03', false],
] as const)(
  'for %s, with 2 December the business date, is accepted: %s',
  async (businessDate, isAccepted) => {
    expect((await startRun(as(administrator), { businessDate })).ok).toBe(isAccepted);
    expect(await states()).toHaveLength(isAccepted ? 1 : 0);
  },
);

test.each(['analyst', 'relationship manager', 'committee member', 'auditor'] satisfies Role[])(
  'is not for the %s, nor is reading of runs',
  async (role) => {
    const person = { ...book.desk.manager, roles: [role] };
    const refused = { ok: false, error: { kind: 'not-allowed' } };
    expect(await startRun(as(person), {})).toMatchObject(refused);
    expect(await listRuns(as(person), { page: 1, perPage: 10 })).toMatchObject(refused);
    expect(await showRun(as(person), 1)).toMatchObject(refused);
    expect(await states()).toEqual([]);
  },
);

test('leaves an audit entry of who started it', async () => {
  await startRun(as(administrator), {});
  expect(
    await rows(`select person_name as name, action from audit_entries order by seq desc limit 1`),
  ).toEqual([{ name: administrator.name, action: 'start-run' }]);
});

describe('reading runs', () => {
  test('shows the latest date first, with its counts, and pages', async () => {
    for (const day of ['2026-11-28', '2026-11-29', '2026-11-30'] as const)
      await runNight({
        businessDate: day,
        kind: 'nightly',
        startedBy: null,
        now: new Date(`${day}T01:30:00Z`),
      });
    const page = await listRuns(as(administrator), { page: 2, perPage: 2 });
    if (!page.ok) throw new Error(page.error.kind);
    expect(page.value).toMatchObject({ page: 2, perPage: 2, total: 3 });
    expect(page.value.rows.map(({ businessDate }) => businessDate)).toEqual(['2026-11-28']);
    const run = await showRun(as(administrator), page.value.rows[0]?.id ?? 0);
    expect(run).toMatchObject({
      ok: true,
      value: {
        state: 'done',
        borrowersDone: 3,
        steps: [
          { phase: 'scores', done: 3, failed: 0, total: 3 },
          { phase: 'tests', done: 3, failed: 0, total: 3 },
        ],
        failures: [],
      },
    });
  });

  test('of a run that is not there finds nothing', async () => {
    expect(await showRun(as(administrator), 999_999)).toMatchObject({
      ok: false,
      error: { kind: 'not-found' },
    });
  });
});
