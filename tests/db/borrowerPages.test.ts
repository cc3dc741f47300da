/** The lists and pages that a person reads: sorted, filtered and paged in the database, of the own desks only. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { alertQuery, ALERT_SORTS, type AlertRow } from '../../src/contracts/alerts.ts';
import { borrowerQuery, BORROWER_SORTS, type BorrowerRow } from '../../src/contracts/borrowers.ts';
import type { Person } from '../../src/server/auth/policy.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { execute } from '../../src/server/db/sql.ts';
import { assessNow } from '../../src/server/services/assessNow.ts';
import { listAlerts } from '../../src/server/services/listAlerts.ts';
import { listBorrowers } from '../../src/server/services/listBorrowers.ts';
import { runNight } from '../../src/server/services/runNight.ts';
import { showAlert } from '../../src/server/services/showAlert.ts';
import { showBorrower } from '../../src/server/services/showBorrower.ts';
import { workAlert } from '../../src/server/services/workAlert.ts';
import { acting, done, expectRefused } from '../support/acting.ts';
import {
  buildBorrower,
  buildDesk,
  buildPerson,
  buildStatements,
  type BuiltBorrower,
  type BuiltDesk,
} from '../support/factories.ts';
import { ACCEPTED, buildNightBook, LAST_QUARTER, rows, type NightBook } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

const NIGHT = new Date('2026-12-01T01:30:00Z');
const NOW = new Date('2026-12-01T09:00:00Z');
const TEXT = 'A text that says enough.';

let book: NightBook;
let elsewhere: BuiltDesk;
let foreign: BuiltBorrower;
/** Without figures, and so without headroom or score. */
let empty: BuiltBorrower;
let people: Readonly<Record<'committee' | 'auditor' | 'administrator' | 'deputy', Person>>;

beforeAll(async () => {
  await useOwnDatabase();
  book = await buildNightBook();
  await inTransaction(async (tx) => {
    elsewhere = await buildDesk(tx, ACCEPTED);
    foreign = await buildBorrower(tx, elsewhere, { now: ACCEPTED, name: '100_% Wool' });
    empty = await buildBorrower(tx, book.desk, { now: ACCEPTED, name: '100% Linen', sectorCode: '13.1' });
    const person = (roles: Person['roles'], deskIds: readonly number[] = []) =>
      buildPerson(tx, { roles, deskIds, now: ACCEPTED });
    people = {
      committee: await person(['committee member']),
      auditor: await person(['auditor']),
      administrator: await person(['administrator']),
      deputy: await person(['relationship manager'], [book.desk.id]),
    };
  });
  await runNight({ businessDate: '2026-11-30', kind: 'nightly', startedBy: null, now: NIGHT });
});
afterAll(closeDatabase);

const alerts = async (asked: Record<string, unknown> = {}, person: Person = book.desk.manager, now = NOW) =>
  done(await listAlerts(acting(person, now), alertQuery.parse(asked)));
const borrowers = async (asked: Record<string, unknown> = {}, person: Person = book.desk.manager) =>
  done(await listBorrowers(acting(person, NOW), borrowerQuery.parse(asked)));
const alertOf = async (borrower: BuiltBorrower): Promise<AlertRow> => {
  const [row] = (await alerts({ borrowerId: borrower.id })).rows;
  if (!row) throw new Error(`the night raised nothing for ${borrower.name}`);
  return row;
};
const namesOf = (listed: { readonly rows: readonly (BorrowerRow | AlertRow)[] }) =>
  listed.rows.map((row) => ('borrowerName' in row ? row.borrowerName : row.name));

describe('who sees what', () => {
  test('a desk sees its own borrowers and alerts, committee and auditor all, an administrator none', async () => {
    const own = [book.roomy, book.thin, book.notMet, empty].map(({ name }) => name).sort();
    expect(namesOf(await borrowers()).sort()).toEqual(own);
    expect(namesOf(await borrowers({}, elsewhere.analyst))).toEqual([foreign.name]);
    for (const person of [people.committee, people.auditor])
      expect(namesOf(await borrowers({}, person)).sort()).toEqual([...own, foreign.name].sort());
    expect(await borrowers({}, people.administrator)).toMatchObject({ rows: [], total: 0 });

    const ownAlerts = await alerts();
    expect(ownAlerts.total).toBeGreaterThan(0);
    expect(await alerts({}, elsewhere.manager)).toMatchObject({ rows: [], total: 0 });
    expect(await alerts({}, people.administrator)).toMatchObject({ rows: [], total: 0 });
    expect((await alerts({}, people.committee)).total).toBe(ownAlerts.total);
  });

  test('a borrower of another desk is not found, as one that never was', async () => {
    for (const id of [foreign.id, 999_999]) {
      expectRefused(await showBorrower(acting(book.desk.analyst, NOW), id), 'not-found');
      expectRefused(await showAlert(acting(book.desk.analyst, NOW), id + 1_000_000), 'not-found');
    }
    expectRefused(await showBorrower(acting(people.administrator, NOW), book.thin.id), 'not-found');
    const page = done(await showBorrower(acting(people.committee, NOW), foreign.id));
    expect(page).toMatchObject({
      name: foreign.name,
      computed: { asOf: '2026-11-30' },
      mayImport: false,
      mayPropose: true,
    });
  });

  test('"mine" are the alerts that I own, and on a deputy’s days those of the absent person', async () => {
    const mine = (person: Person, now = NOW) => alerts({ view: 'mine' }, person, now);
    expect((await mine(book.desk.manager)).total).toBe((await alerts()).total);
    expect((await mine(book.desk.head)).total).toBe(0);
    await inTransaction((tx) =>
      execute(
        tx,
        `insert into deputies (person_id, deputy_id, from_date, until_date) values (:owner, :deputy, '2026-12-01', '2026-12-01')`,
        { owner: book.desk.manager.id, deputy: people.deputy.id },
      ),
    );
    expect((await mine(people.deputy)).total).toBe((await alerts()).total);
    // Midnight in Paris.
    expect((await mine(people.deputy, new Date('2026-12-01T23:00:00Z'))).total).toBe(0);
  });
});

describe('the table of borrowers', () => {
  test('finds part of a name, in either case, and takes % and _ as they are written', async () => {
    expect(namesOf(await borrowers({ search: 'lIN' }))).toEqual([empty.name]);
    const all = (search: string) => borrowers({ search, sort: 'name' }, people.committee);
    expect(namesOf(await all('100'))).toEqual(['100_% Wool', '100% Linen']);
    expect(namesOf(await all('%'))).toEqual(['100_% Wool', '100% Linen']);
    expect(namesOf(await all('0_'))).toEqual(['100_% Wool']);
    expect(namesOf(await all('100%'))).toEqual(['100% Linen']);
    expect(namesOf(await all('!'))).toEqual([]);
    expect(namesOf(await all("'"))).toEqual([]);
  });

  test('filters by sector and desk, and a desk out of reach stays out of reach', async () => {
    expect(namesOf(await borrowers({ sector: '13.1' }))).toEqual([empty.name]);
    expect((await borrowers({ deskId: elsewhere.id })).total).toBe(0);
    expect(namesOf(await borrowers({ deskId: elsewhere.id }, people.committee))).toEqual([foreign.name]);
  });

  test('sorts by every key in both directions, what has no value last', async () => {
    const room = async (direction: string) => namesOf(await borrowers({ sort: 'may-fall', direction }));
    expect(await room('up')).toEqual([book.notMet.name, book.thin.name, book.roomy.name, empty.name]);
    expect(await room('down')).toEqual([book.roomy.name, book.thin.name, book.notMet.name, empty.name]);
    const byName = namesOf(await borrowers({ sort: 'name' }));
    expect(namesOf(await borrowers({ sort: 'name', direction: 'down' }))).toEqual([...byName].reverse());
    expect(namesOf(await borrowers({ sort: 'alerts', direction: 'down' }))[0]).toBe(book.notMet.name);
    for (const sort of BORROWER_SORTS) expect((await borrowers({ sort })).rows, sort).toHaveLength(4);
    expect(borrowerQuery.safeParse({ sort: 'b.id; drop table borrowers' }).success).toBe(false);
  });

  test.each(['may-fall', 'drawn', 'quality'])(
    'sorted by %s, its pages name each borrower once',
    async (sort) => {
      const pages = [];
      for (const page of [1, 2, 3, 4, 5]) pages.push(await borrowers({ sort, perPage: 1, page }));
      expect(pages.map(({ rows: { length } }) => length)).toEqual([1, 1, 1, 1, 0]);
      expect(new Set(pages.flatMap(namesOf)).size).toBe(4);
      expect(pages.every(({ total }) => total === 4)).toBe(true);
    },
  );

  test('shows limit and drawn of the borrower’s own currency, its open alerts, and the day of its latest figures', async () => {
    const row = (await borrowers({ search: book.notMet.name })).rows[0];
    expect(row).toMatchObject({
      limit: '12400000.0000',
      drawn: '10000000.0000',
      managerName: book.desk.manager.name,
      latestFigures: LAST_QUARTER,
      watchGrade: null,
      covenantName: 'Total leverage',
      latestOutcome: 'not met',
    });
    const open = (await alerts({ borrowerId: book.notMet.id })).rows;
    expect(row?.openAlerts).toBe(open.length);
    expect(row?.urgentAlerts).toBe(open.filter(({ severity }) => severity === 'urgent').length);
    const unknown = (await borrowers({ search: empty.name })).rows[0];
    expect(unknown).toMatchObject({
      latestFigures: null,
      strip: [],
      mayFall: null,
      latestOutcome: null,
      qualityHeadline: null,
    });
  });
});

describe('the table of alerts', () => {
  test('filters by kind, severity, sector, smallest headroom and due day', async () => {
    const all = (await alerts()).rows;
    const expectFiltered = async (asked: Record<string, unknown>, keep: (row: AlertRow) => boolean) => {
      const kept = all.filter(keep);
      expect(kept.length, JSON.stringify(asked)).toBeGreaterThan(0);
      expect(kept.length, JSON.stringify(asked)).toBeLessThan(all.length);
      const listed = await alerts(asked);
      expect(listed.rows.map(({ id }) => id).sort()).toEqual(kept.map(({ id }) => id).sort());
      expect(listed.total).toBe(kept.length);
    };
    await expectFiltered({ kind: 'test not met' }, ({ kind }) => kind === 'test not met');
    await expectFiltered({ severity: 'urgent' }, ({ severity }) => severity === 'urgent');
    // Debt of 13.8 million over 3.5 times 4 million: earnings may fall 1.4 %; of 16 million, none.
    await expectFiltered({ mayFallBelow: 1 }, ({ borrowerId }) => borrowerId === book.notMet.id);
    expect((await alerts({ mayFallBelow: 2 })).rows.map(({ borrowerId }) => borrowerId)).toContain(
      book.thin.id,
    );
    expect((await alerts({ sector: '13.1' })).total).toBe(0);
    expect((await alerts({ sector: '25.6' })).total).toBe(all.length);
  });

  test('"due within" counts the lender’s days: at, just before and just after', async () => {
    const { id, dueOn } = await alertOf(book.notMet);
    const isListed = async (dueWithinDays: number, now: Date) =>
      (await alerts({ dueWithinDays, borrowerId: book.notMet.id }, book.desk.manager, now)).rows.some(
        (row) => row.id === id,
      );
    const days = (Date.parse(dueOn) - Date.parse('2026-12-01')) / 86_400_000;
    expect(await isListed(days, NOW)).toBe(true);
    expect(await isListed(days - 1, NOW)).toBe(false);
    // Half past midnight of 2 December in Paris.
    expect(await isListed(days - 1, new Date('2026-12-01T23:30:00Z'))).toBe(true);
  });

  test('filters by state: what is not taken, what is closed, and "open" is everything else', async () => {
    const before = await alerts();
    const { id, version } = await alertOf(book.thin);
    const manager = acting(book.desk.manager, NOW);
    expect((await alerts({ view: 'not-taken' })).total).toBe(before.total);
    done(await workAlert(manager, id, version, { step: 'take' }));
    expect((await alerts({ view: 'not-taken' })).rows.map((row) => row.id)).not.toContain(id);
    expect((await alerts({ state: 'taken' })).rows.map((row) => row.id)).toEqual([id]);
    expect((await alerts({ state: 'closed' })).total).toBe(0);
    done(await workAlert(manager, id, version + 1, { step: 'close', reason: 3, text: TEXT }));
    expect((await alerts({ state: 'closed' })).rows.map((row) => row.id)).toEqual([id]);
    expect((await alerts()).total).toBe(before.total - 1);
  });

  test('sorts by every key, urgent before soon before note, ties in the order they came', async () => {
    const all = (await alerts()).rows.length;
    for (const sort of ALERT_SORTS)
      for (const direction of ['up', 'down'])
        expect((await alerts({ sort, direction })).rows).toHaveLength(all);
    const ranks = (await alerts({ sort: 'severity' })).rows.map(({ severity }) =>
      ['urgent', 'soon', 'note'].indexOf(severity),
    );
    expect(ranks).toEqual([...ranks].sort());
    const raisedAtOnce = (await alerts({ sort: 'raised', direction: 'down' })).rows.map(({ id }) => id);
    expect(raisedAtOnce).toEqual([...raisedAtOnce].sort((one, other) => one - other));
    expect(alertQuery.safeParse({ sort: 'id' }).success).toBe(false);
  });

  test('its pages name each alert once', async () => {
    const { total } = await alerts();
    const seen = [];
    for (let page = 1; page <= total; page += 1)
      seen.push(...(await alerts({ perPage: 1, page, sort: 'severity' })).rows);
    expect(new Set(seen.map(({ id }) => id)).size).toBe(total);
  });

  test('is new until a day has passed since it was raised', async () => {
    const { raisedAt } = await alertOf(book.notMet);
    const isNew = async (after: number) =>
      (
        await alerts(
          { borrowerId: book.notMet.id },
          book.desk.manager,
          new Date(Date.parse(raisedAt) + after),
        )
      ).rows[0]?.newSinceYesterday;
    expect(await isNew(86_399_999)).toBe(true);
    expect(await isNew(86_400_000)).toBe(false);
  });
});

test('a strip shows the last tests of the current assessment, oldest first, and moves with the next one', async () => {
  const strip = async () => (await borrowers({ search: book.roomy.name })).rows[0];
  const before = await strip();
  // Tests from March 2026, every quarter, with figures to September.
  expect(
    before?.strip
      .filter(({ mayFall }) => mayFall !== null)
      .map(({ testDate, outcome }) => [testDate, outcome]),
  ).toEqual([
    ['2026-03-31', 'met'],
    ['2026-06-30', 'met'],
    ['2026-09-30', 'met'],
  ]);
  // 8 million over 3.5 times 4 million: earnings may fall 1 − 8 / 14.
  expect(Number(before?.mayFall)).toBeCloseTo(1 - 8 / 14, 9);

  await inTransaction((tx) =>
    buildStatements(tx, book.roomy, {
      last: LAST_QUARTER,
      quarters: [{ ebitda: 1_000_000, debt: 15_000_000 }],
      knownFrom: NOW,
      receivedOn: '2026-12-01',
    }),
  );
  expect(await strip()).toEqual(before);
  await assessNow(acting(book.desk.analyst, NOW), book.roomy.id);
  const after = await strip();
  expect(after).toMatchObject({ latestOutcome: 'not met' });
  expect(after?.strip.find(({ testDate }) => testDate === LAST_QUARTER)?.outcome).toBe('not met');
  expect(
    await rows('select id from assessments where borrower_id = :id', { id: book.roomy.id }),
  ).toHaveLength(2);
  const page = done(await showBorrower(acting(book.desk.analyst, NOW), book.roomy.id));
  expect(page.computed).toMatchObject({
    peersAreLastNights: true,
    peersAsOf: '2026-11-30',
    asOf: '2026-12-01',
  });
  expect(page.alerts.map(({ kind }) => kind)).toContain('test not met');
});
