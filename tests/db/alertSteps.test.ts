/** What people do with an alert: who may, in which order, with whose second word; every step is on record. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { alertStep, closingConfirmation, type AlertStep } from '../../src/contracts/alerts.ts';
import type { AlertFinding, AlertKind, Severity } from '../../src/core/alerts/alert.ts';
import type { PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { Person } from '../../src/server/auth/policy.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { execute } from '../../src/server/db/sql.ts';
import { systemActor } from '../../src/server/services/actor.ts';
import { raiseAlerts } from '../../src/server/services/raiseAlerts.ts';
import { showAlert } from '../../src/server/services/showAlert.ts';
import { confirmClosing, handOverAlert, workAlert } from '../../src/server/services/workAlert.ts';
import { acting, done, expectRefused, refused } from '../support/acting.ts';
import {
  buildBorrower,
  buildDesk,
  buildPerson,
  type BuiltBorrower,
  type BuiltDesk,
} from '../support/factories.ts';
import { whileFailing } from '../support/failingStatement.ts';
import { rows } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

const NIGHT = new Date('2026-12-01T02:30:00Z');
const NOW = new Date('2026-12-01T09:00:00Z');
const TEXT = 'A text that says enough.';

let desk: BuiltDesk;
let elsewhere: BuiltDesk;
let committee: Person;
let otherMember: Person;
let deputy: Person;
let borrower: BuiltBorrower;

beforeAll(async () => {
  await useOwnDatabase();
  await inTransaction(async (tx) => {
    desk = await buildDesk(tx, NIGHT);
    elsewhere = await buildDesk(tx, NIGHT);
    const member = (roles: Person['roles'], deskIds: readonly number[]) =>
      buildPerson(tx, { roles, deskIds, now: NIGHT });
    committee = await member(['committee member'], []);
    otherMember = await member(['relationship manager', 'committee member'], [desk.id]);
    deputy = await member(['relationship manager'], [desk.id]);
  });
});
afterAll(closeDatabase);
beforeEach(async () => {
  borrower = await inTransaction((tx) => buildBorrower(tx, desk, { now: NIGHT }));
});

interface StoredAlert {
  readonly id: number;
  readonly version: number;
  readonly state: string;
  readonly takenBy: number | null;
  readonly putOffCount: number;
  readonly closingReason: number | null;
  readonly closedBy: number | null;
  readonly openSlot: string | null;
  readonly changeNumber: number;
}

const finding = (kind: AlertKind, severity: Severity, factDate: AlertFinding['factDate'] = '2026-09-30') => ({
  kind,
  severity,
  factDate,
  covenantId: null,
  sentence: 'A sentence with figures.',
  wouldChange: 'A number.',
  evidence: [],
});

const raise = (given: AlertFinding, owner: Person = desk.manager) =>
  inTransaction((tx) =>
    raiseAlerts(
      tx,
      systemActor('test', NIGHT),
      {
        borrower: { id: borrower.id, name: borrower.name, deskId: desk.id, relationshipManagerId: owner.id },
        asOf: '2026-12-01',
        runId: null,
        view: { inputVersion: 1, figuresChangedAt: null, isUnknown: () => false },
      },
      [given],
    ),
  );

const stored = (where = 'true') =>
  rows<StoredAlert>(
    `select id, version, state, taken_by as takenBy, put_off_count as putOffCount, closing_reason as closingReason,
       closed_by as closedBy, open_slot as openSlot, change_number as changeNumber
     from alerts where borrower_id = :id and ${where} order by id`,
    { id: borrower.id },
  );
async function only(): Promise<StoredAlert> {
  const [alert, second] = await stored();
  if (!alert || second) throw new Error('expected one alert');
  return alert;
}

/** A fresh alert of the desk's relationship manager. */
async function raised(severity: Severity = 'soon', owner: Person = desk.manager): Promise<StoredAlert> {
  await raise(finding('statement late', severity), owner);
  return only();
}

const CLOSE: AlertStep = { step: 'close', reason: 3, text: TEXT };
const step = async (given: AlertStep, person: Person = desk.manager, now = NOW) => {
  const { id, version } = await only();
  return workAlert(acting(person, now), id, version, given);
};
const confirm = async (person: Person, yes = true) => {
  const { id, version } = await only();
  return confirmClosing(acting(person, NOW), id, version, { confirm: yes, text: TEXT });
};
const deskChange = async () =>
  (
    await rows<{ number: number }>('select change_number as number from desk_changes where desk_id = :id', {
      id: desk.id,
    })
  )[0]?.number ?? 0;
const onRecord = async (id: number) => ({
  events: (
    await rows<{ what: string }>(
      'select what from alert_events where alert_id = :id and person_id is not null order by id',
      { id },
    )
  ).map(({ what }) => what),
  audited: (
    await rows<{ action: string }>(
      `select action from audit_entries where subject_kind = 'alert' and subject_id = :id and person_id is not null order by seq`,
      { id: String(id) },
    )
  ).map(({ action }) => action),
});

describe('every step', () => {
  test('is one event, one audit entry, the next version and the next change of the desk', async () => {
    const { id } = await raised();
    const life: readonly [AlertStep, string][] = [
      [{ step: 'take' }, 'taken'],
      [{ step: 'wait', waitFor: 'borrower', text: TEXT }, 'waiting for borrower'],
      [{ step: 'assess', text: TEXT }, 'assessed'],
      [CLOSE, 'closed'],
    ];
    for (const [given, state] of life) {
      const [before, change] = [await only(), await deskChange()];
      expect(done(await step(given))).toEqual({ id, version: before.version + 1, state });
      expect(await only()).toMatchObject({ state, version: before.version + 1, changeNumber: change + 1 });
      expect(await deskChange()).toBe(change + 1);
    }
    expect(await onRecord(id)).toEqual({
      events: ['Taken', 'Waiting for borrower', 'Assessed', 'Closed: Timing or seasonality, evidence seen'],
      audited: ['alert-take', 'alert-wait', 'alert-assess', 'alert-close'],
    });
  });

  test('of somebody who saw an older version is stale, and says how the alert stands', async () => {
    const { id, version } = await raised();
    done(await step({ step: 'take' }));
    const late = await workAlert(acting(desk.manager, NOW), id, version, { step: 'assess', text: TEXT });
    expectRefused(late, 'stale', 'it is taken', 'Nothing was changed');
    expect(refused(late)).toMatchObject({ currentVersion: version + 1 });
  });

  test('that two people take at once is taken by one', async () => {
    const { id, version } = await raised();
    const both = await Promise.all(
      [1, 2].map(() => workAlert(acting(desk.manager, NOW), id, version, { step: 'take' })),
    );
    expect(both.map((outcome) => (outcome.ok ? 'done' : outcome.error.kind)).sort()).toEqual([
      'done',
      'stale',
    ]);
    expect((await onRecord(id)).events).toEqual(['Taken']);
  });

  test('with the same key is taken once', async () => {
    const { id, version } = await raised();
    const send = () =>
      workAlert(acting(desk.manager, NOW, { key: `take-${id}` }), id, version, { step: 'take' });
    expect(done(await send())).toEqual(done(await send()));
    expect((await onRecord(id)).events).toEqual(['Taken']);
  });

  test.each([
    { table: 'alert_events', at: 'insert' },
    { table: 'desk_changes', at: 'update' },
    { table: 'audit_entries', at: 'insert' },
  ] as const)('that is cut at $table leaves the alert as it was', async (failing) => {
    const before = await raised();
    const change = await deskChange();
    await expect(whileFailing(failing, () => step({ step: 'take' }))).rejects.toThrow('fails in tests');
    expect(await only()).toEqual(before);
    expect(await deskChange()).toBe(change);
    expect(await onRecord(before.id)).toEqual({ events: [], audited: [] });
  });
});

describe('an alert is worked', () => {
  test('by its owner, not by another relationship manager, the head or an analyst of the desk', async () => {
    await raised();
    expectRefused(await step({ step: 'take' }, deputy), 'not-allowed', 'relationship manager or deputy');
    expectRefused(await step({ step: 'take' }, desk.head), 'not-allowed');
    expect(refused(await step({ step: 'take' }, desk.analyst)).kind).toBe('not-found');
    expect((await only()).state).toBe('raised');
  });

  test('by the deputy from the first day to the last, by the lender’s clock', async () => {
    await inTransaction((tx) =>
      execute(
        tx,
        `insert into deputies (person_id, deputy_id, from_date, until_date) values (:owner, :deputy, '2026-12-02', '2026-12-03')`,
        { owner: desk.manager.id, deputy: deputy.id },
      ),
    );
    await raised();
    const at = (instant: string) => step({ step: 'assess', text: TEXT }, deputy, new Date(instant));
    // In Paris the day begins at 23:00 UTC.
    expectRefused(await at('2026-12-01T22:59:59Z'), 'not-allowed');
    done(await at('2026-12-01T23:00:00Z'));
    done(await at('2026-12-03T22:59:59Z'));
    expectRefused(await at('2026-12-03T23:00:00Z'), 'not-allowed');
    expect((await only()).takenBy).toBe(deputy.id);
  });

  test('on its own desk: for others it is not there', async () => {
    const { id, version } = await raised('urgent');
    done(await step({ step: 'wait', waitFor: 'analyst', text: TEXT }));
    for (const person of [elsewhere.manager, elsewhere.head, elsewhere.analyst]) {
      const actor = acting(person, NOW);
      for (const outcome of [
        await workAlert(actor, id, version + 1, { step: 'take' }),
        await handOverAlert(actor, id, version + 1, { text: TEXT }),
        await confirmClosing(actor, id, version + 1, { confirm: true, text: TEXT }),
        await showAlert(actor, id),
      ])
        expect(refused(outcome)).toEqual({ kind: 'not-found', what: 'alert' });
    }
  });

  test('by the analyst only where the owner asked, and goes back to the owner', async () => {
    const { id } = await raised();
    const handOver = async () =>
      handOverAlert(acting(desk.analyst, NOW), id, (await only()).version, { text: TEXT });
    expectRefused(await handOver(), 'conflict', 'not waiting for the analyst');
    done(await step({ step: 'wait', waitFor: 'analyst', text: TEXT }));
    expect(done(await handOver()).state).toBe('taken');
    expect((await only()).takenBy).toBe(desk.manager.id);
  });
});

describe('putting off', () => {
  const until = (day: PlainDate): AlertStep => ({ step: 'put off', until: day, text: TEXT });

  test.each([
    ['2026-12-01', false],
    ['2026-12-02', true],
    ['2026-12-31', true],
    ['2027-01-01', false],
  ] as const)('on 1 December until %s: %s', async (day, allowed) => {
    await raised();
    const outcome = await step(until(day));
    if (allowed) expect(done(outcome).state).toBe('put off');
    else expect(refused(outcome)).toMatchObject({ kind: 'invalid', errors: [{ field: 'until' }] });
  });

  test('is for two times at most', async () => {
    await raised();
    done(await step(until('2026-12-05')));
    done(await step(until('2026-12-12')));
    expectRefused(await step(until('2026-12-20')), 'conflict', '2 times already');
    expect(await only()).toMatchObject({ state: 'put off', putOffCount: 2, takenBy: null });
  });

  test('is not for urgent', async () => {
    await raised('urgent');
    expectRefused(await step(until('2026-12-05')), 'conflict', 'urgent alert cannot be put off');
  });
});

describe('closing', () => {
  test('by the owner alone frees the slot, so that a later day raises another', async () => {
    await raised();
    done(await step(CLOSE));
    expect(await only()).toMatchObject({
      state: 'closed',
      openSlot: null,
      closingReason: 3,
      closedBy: desk.manager.id,
    });
    expectRefused(await step({ step: 'take' }), 'conflict', 'closed');
    await raise(finding('statement late', 'soon'));
    expect(await stored()).toHaveLength(1);
    await raise(finding('statement late', 'soon', '2026-12-31'));
    expect((await stored()).map(({ state }) => state)).toEqual(['closed', 'raised']);
  });

  test.each([
    ['soon', 7, 'closed'],
    ['soon', 8, 'closing to be confirmed'],
    ['soon', 9, 'closing to be confirmed'],
    ['note', 10, 'closed'],
    ['urgent', 1, 'closing to be confirmed'],
  ] as const)('a %s alert for reason %i: %s', async (severity, reason, state) => {
    await raised(severity);
    expect(done(await step({ step: 'close', reason, text: TEXT })).state).toBe(state);
  });

  test('takes a reason from the list and a text', () => {
    for (const bad of [{ reason: 0 }, { reason: 13 }, { reason: 1.5 }, { text: 'no' }])
      expect(alertStep.safeParse({ ...CLOSE, ...bad }).success, JSON.stringify(bad)).toBe(false);
    expect(alertStep.safeParse({ step: 'close', reason: 12, text: TEXT }).success).toBe(true);
    expect(closingConfirmation.safeParse({ confirm: true, text: '' }).success).toBe(false);
  });

  test('that waits for a second person is not the owner’s any more, and is confirmed by the head of the desk', async () => {
    const { id } = await raised('urgent');
    done(await step(CLOSE));
    expectRefused(await step({ step: 'assess', text: TEXT }), 'conflict', 'second person');
    expectRefused(await confirm(desk.manager), 'not-allowed');
    expectRefused(await confirm(deputy), 'not-allowed', 'head of the desk');
    expect((await only()).openSlot).not.toBeNull();
    expect(done(await confirm(desk.head)).state).toBe('closed');
    expect(await only()).toMatchObject({ openSlot: null, closingReason: 3, closedBy: desk.manager.id });
    expect(await onRecord(id)).toEqual({
      events: ['Asked to close: Timing or seasonality, evidence seen', 'Closing confirmed'],
      audited: ['alert-close', 'alert-confirm-closing'],
    });
  });

  test('of the head’s own alert is confirmed by the committee, not by the head', async () => {
    await raised('urgent', desk.head);
    done(await step(CLOSE, desk.head));
    expectRefused(await confirm(desk.head), 'not-allowed', 'unless the alert is the head’s own');
    expect(done(await confirm(committee)).state).toBe('closed');
  });

  test('is not confirmed by whoever asked for it, also with two roles', async () => {
    await raised('urgent', otherMember);
    done(await step(CLOSE, otherMember));
    expectRefused(await confirm(otherMember), 'not-allowed', 'You asked for this closing');
    expect((await only()).state).toBe('closing to be confirmed');
  });

  test('that is not confirmed leaves the alert open with its owner, and no reason on it', async () => {
    const { id } = await raised('urgent');
    done(await step(CLOSE));
    expect(done(await confirm(committee, false)).state).toBe('taken');
    expect(await only()).toMatchObject({ closingReason: null, closedBy: null, takenBy: desk.manager.id });
    expect(done(await showAlert(acting(desk.manager, NOW), id)).closing).toBeNull();
    expectRefused(await confirm(committee), 'conflict', 'No closing waits');
  });
});

describe('the page of an alert', () => {
  const steps = async (person: Person) => {
    const { id } = await only();
    const offered = done(await showAlert(acting(person, NOW), id)).steps;
    return Object.entries(offered).flatMap(([name, may]) => (may ? [name] : []));
  };

  test('offers each person the steps that the server takes from them', async () => {
    await raised();
    expect(await steps(desk.manager)).toEqual(['take', 'work', 'putOff', 'close', 'propose']);
    expect(await steps(desk.analyst)).toEqual(['propose']);
    expect(await steps({ ...committee, roles: ['auditor'] })).toEqual([]);
    done(await step({ step: 'wait', waitFor: 'analyst', text: TEXT }));
    expect(await steps(desk.analyst)).toEqual(['handOver', 'propose']);
    done(await step({ step: 'close', reason: 8, text: TEXT }));
    expect(await steps(desk.manager)).toEqual([]);
    expect(await steps(desk.head)).toEqual(['confirmClosing']);
    expect(await steps(committee)).toEqual(['confirmClosing']);
    done(await confirm(committee));
    expect(await steps(desk.manager)).toEqual([]);
  });

  test('shows who did what, newest first, and "Underkeel" for what the night did', async () => {
    const { id } = await raised();
    done(await step({ step: 'assess', text: TEXT }));
    const { events } = done(await showAlert(acting(desk.manager, NOW), id));
    expect(events.map(({ who, what, text }) => [who, what, text])).toEqual([
      [desk.manager.name, 'Assessed', TEXT],
      ['Underkeel', 'Raised', 'A sentence with figures.'],
    ]);
  });
});
