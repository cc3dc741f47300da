/** Alerts in the database: one open per borrower, covenant and kind, and every change an event, a number and an audit entry. */
import '../support/useDatabase.ts';
import type { Transaction } from 'sequelize';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { AlertFinding } from '../../src/core/alerts/alert.ts';
import type { AlertView } from '../../src/core/alerts/alertChanges.ts';
import type { PlainDate } from '../../src/core/calendar/plainDate.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction, isDuplicate } from '../../src/server/db/inTransaction.ts';
import { insertAlert } from '../../src/server/db/repositories/alerts.ts';
import { execute, select, selectOne } from '../../src/server/db/sql.ts';
import { systemActor } from '../../src/server/services/actor.ts';
import { raiseAlerts } from '../../src/server/services/raiseAlerts.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';
import {
  buildBorrower,
  buildCovenant,
  buildDesk,
  type BuiltBorrower,
  type BuiltDesk,
} from '../support/factories.ts';

const morning = new Date('2026-12-01T02:30:00Z');
const nextMorning = new Date('2026-12-02T02:30:00Z');

let desk: BuiltDesk;
let borrower: BuiltBorrower;
let covenantId: number;

beforeAll(async () => {
  await useOwnDatabase();
  desk = await inTransaction((tx) => buildDesk(tx, morning));
});
afterAll(closeDatabase);

beforeEach(async () => {
  await inTransaction(async (tx) => {
    borrower = await buildBorrower(tx, desk, { now: morning });
    covenantId = await buildCovenant(tx, borrower, { knownFrom: morning });
  });
});

const finding = (facts: Partial<AlertFinding> = {}): AlertFinding => ({
  kind: 'thin headroom',
  covenantId,
  severity: 'soon',
  factDate: '2026-09-30',
  sentence: 'Total leverage 3.38x, at most 3.50x.',
  wouldChange: 'EBITDA 0.4m higher',
  evidence: [{ label: 'Total leverage', value: '3.38x' }],
  ...facts,
});

const view: AlertView = { inputVersion: 1, figuresChangedAt: null, isUnknown: () => false };

const raise = (findings: AlertFinding[], now = morning, over: Partial<AlertView> = {}) =>
  inTransaction((tx) =>
    raiseAlerts(
      tx,
      systemActor('test', now),
      {
        borrower: {
          id: borrower.id,
          name: borrower.name,
          deskId: desk.id,
          relationshipManagerId: desk.manager.id,
        },
        asOf: now.toISOString().slice(0, 10) as PlainDate,
        runId: null,
        view: { ...view, ...over },
      },
      findings,
    ),
  );

interface StoredAlert {
  readonly id: number;
  readonly state: string;
  readonly severity: string;
  readonly counter: number;
  readonly version: number;
  readonly dueOn: string;
  readonly ownerId: number;
  readonly openSlot: string | null;
  readonly changedHow: string;
  readonly changeNumber: number;
  readonly lastSeenAt: Date;
  readonly conditionGoneAt: Date | null;
  readonly putOffUntil: string | null;
}

const stored = (): Promise<StoredAlert[]> =>
  inTransaction((tx) =>
    select<StoredAlert>(
      tx,
      `select id, state, severity, counter, version, due_on as dueOn, owner_id as ownerId, open_slot as openSlot,
         changed_how as changedHow, change_number as changeNumber, last_seen_at as lastSeenAt,
         condition_gone_at as conditionGoneAt, put_off_until as putOffUntil
       from alerts where borrower_id = :id order by id`,
      { id: borrower.id },
    ),
  );
const only = async (): Promise<StoredAlert> => {
  const [first, second] = await stored();
  if (!first || second) throw new Error('expected one alert');
  return first;
};
const deskChange = (tx: Transaction) =>
  selectOne<{ number: number }>(tx, 'select change_number as number from desk_changes where desk_id = :id', {
    id: desk.id,
  });
const events = (alertId: number) =>
  inTransaction((tx) =>
    select<{ what: string }>(tx, 'select what from alert_events where alert_id = :alertId order by id', {
      alertId,
    }),
  ).then((rows) => rows.map((row) => row.what));
const audited = (alertId: number) =>
  inTransaction((tx) =>
    select<{ personName: string }>(
      tx,
      `select person_name as personName from audit_entries where subject_kind = 'alert' and subject_id = :id order by seq`,
      { id: String(alertId) },
    ),
  );

describe('a finding', () => {
  test('raises an alert of the relationship manager, due by the clock, with an event and an audit entry', async () => {
    await raise([finding()]);
    const alert = await only();
    expect(alert).toMatchObject({
      state: 'raised',
      ownerId: desk.manager.id,
      dueOn: '2026-12-29',
      counter: 1,
      changedHow: 'raised',
    });
    expect(await events(alert.id)).toEqual(['Raised']);
    expect(await audited(alert.id)).toEqual([{ personName: 'Underkeel' }]);
    expect((await inTransaction(deskChange))?.number).toBe(alert.changeNumber);
  });

  test('that fires again on unchanged facts changes nothing but when it was last seen', async () => {
    await raise([finding()]);
    const before = await only();
    const changeBefore = await inTransaction(deskChange);
    await raise([finding()], nextMorning);
    expect(await only()).toEqual({ ...before, lastSeenAt: nextMorning });
    expect(await inTransaction(deskChange)).toEqual(changeBefore);
    expect(await events(before.id)).toEqual(['Raised']);
  });

  test('that is only worded for another day is the same alert with today’s words', async () => {
    await raise([finding()]);
    const before = await only();
    await raise([finding({ sentence: 'Accounts 12 days late.' })], nextMorning);
    expect(await only()).toEqual({ ...before, lastSeenAt: nextMorning });
    const [row] = await inTransaction((tx) =>
      select<{ sentence: string }>(tx, 'select sentence from alerts where id = :id', { id: before.id }),
    );
    expect(row?.sentence).toBe('Accounts 12 days late.');
  });

  test('with new facts updates the alert, raises its counter and gives the desk a new change number', async () => {
    await raise([finding()]);
    const before = await only();
    await raise([finding({ factDate: '2026-12-31' })], nextMorning);
    const after = await only();
    expect(after).toMatchObject({
      id: before.id,
      counter: 2,
      version: before.version + 1,
      dueOn: before.dueOn,
    });
    expect(after.changeNumber).toBeGreaterThan(before.changeNumber);
    expect(await events(before.id)).toEqual(['Raised', 'New facts']);
  });

  test('of a higher severity marks it worsened and brings its day nearer, never farther', async () => {
    await raise([finding({ severity: 'note' })]);
    await raise([finding({ severity: 'urgent' })], nextMorning);
    expect(await only()).toMatchObject({ severity: 'urgent', changedHow: 'worsened', dueOn: '2026-12-16' });
    await raise([finding({ severity: 'note' })], nextMorning);
    expect(await only()).toMatchObject({ severity: 'note', changedHow: 'improved', dueOn: '2026-12-16' });
  });

  test('that worsens takes back a putting off', async () => {
    await raise([finding()]);
    await putOffUntil('2026-12-20');
    await raise([finding({ severity: 'urgent' })], nextMorning);
    expect(await only()).toMatchObject({ state: 'raised', putOffUntil: null });
  });
});

const putOffUntil = (until: string) =>
  inTransaction((tx) =>
    execute(
      tx,
      `update alerts set state = 'put off', put_off_until = :until where borrower_id = :id and open_slot is not null`,
      { until, id: borrower.id },
    ),
  );

test.each([
  ['2026-12-03', 'put off'],
  ['2026-12-02', 'raised'],
  ['2026-12-01', 'raised'],
])('put off until %s, on 2 December it is %s', async (until, state) => {
  await raise([finding()]);
  await putOffUntil(until);
  await raise([finding()], nextMorning);
  expect((await only()).state).toBe(state);
});

describe('without its finding', () => {
  test.each(['soon', 'note'] as const)('%s closes by itself and says so', async (severity) => {
    await raise([finding({ severity })]);
    await raise([], nextMorning);
    const alert = await only();
    expect(alert).toMatchObject({ state: 'closed', openSlot: null, changedHow: 'closed' });
    expect(await events(alert.id)).toEqual(['Raised', 'Condition gone']);
  });

  test('urgent stays open and says once that its condition is gone', async () => {
    await raise([finding({ severity: 'urgent', kind: 'test not met' })]);
    await raise([], nextMorning);
    await raise([], new Date('2026-12-03T02:30:00Z'));
    const alert = await only();
    expect(alert).toMatchObject({ state: 'raised', conditionGoneAt: nextMorning });
    expect(alert.openSlot).not.toBeNull();
    expect(await events(alert.id)).toEqual(['Raised', 'Condition gone, confirm']);
  });

  test('nothing is closed where the figures cannot say', async () => {
    await raise([finding()]);
    await raise([], nextMorning, { isUnknown: () => true });
    expect(await only()).toMatchObject({ state: 'raised', counter: 1 });
  });
});

test('after closing, the same facts open nothing and a later day opens another', async () => {
  await raise([finding()]);
  await raise([], nextMorning);
  await raise([finding()], nextMorning);
  expect(await stored()).toHaveLength(1);
  await raise([finding({ factDate: '2026-12-31' })], nextMorning);
  expect((await stored()).map((alert) => alert.state)).toEqual(['closed', 'raised']);
});

test('the database itself refuses a second open alert of the same borrower, covenant and kind', async () => {
  await raise([finding()]);
  const second = inTransaction((tx) =>
    insertAlert(tx, {
      borrowerId: borrower.id,
      deskId: desk.id,
      ownerId: desk.manager.id,
      finding: finding(),
      dueOn: '2026-12-29',
      runId: null,
      inputVersion: 1,
      changeNumber: 1,
      now: morning,
    }),
  );
  await expect(second.catch((error: unknown) => isDuplicate(error))).resolves.toBe(true);
});

test('a borrower-wide alert and one of a covenant do not take each other’s place', async () => {
  await raise([finding(), finding({ covenantId: null }), finding({ kind: 'step-down ahead' })]);
  await raise([finding(), finding({ covenantId: null }), finding({ kind: 'step-down ahead' })], nextMorning);
  expect(await stored()).toHaveLength(3);
});
