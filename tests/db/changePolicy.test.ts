/** The policy changes by two persons and becomes a new version; what was computed before keeps its own. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { newPolicyProposal } from '../../src/contracts/policy.ts';
import type { PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { Person } from '../../src/server/auth/policy.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { execute } from '../../src/server/db/sql.ts';
import { assessBorrower } from '../../src/server/services/assessBorrower.ts';
import { systemActor } from '../../src/server/services/actor.ts';
import { barCounts } from '../../src/server/services/barCounts.ts';
import { decidePolicy, withdrawPolicy } from '../../src/server/services/decidePolicy.ts';
import { proposePolicy } from '../../src/server/services/proposePolicy.ts';
import { runNight } from '../../src/server/services/runNight.ts';
import { showPolicy } from '../../src/server/services/showPolicy.ts';
import { acting, done, expectRefused, refused } from '../support/acting.ts';
import { buildPerson } from '../support/factories.ts';
import { whileFailing } from '../support/failingStatement.ts';
import { ACCEPTED, buildNightBook, rows, type NightBook } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

const NOW = new Date('2026-12-01T09:00:00Z');
const WORDS = 'Words that are long enough.';

let book: NightBook;
let administrator: Person;
let otherAdministrator: Person;
let member: Person;
let secondMember: Person;
/** Administrator and committee member at once. */
let both: Person;

beforeAll(async () => {
  await useOwnDatabase();
  book = await buildNightBook();
  await inTransaction(async (tx) => {
    administrator = await buildPerson(tx, { roles: ['administrator'], now: ACCEPTED });
    otherAdministrator = await buildPerson(tx, { roles: ['administrator'], now: ACCEPTED });
    member = await buildPerson(tx, { roles: ['committee member'], now: ACCEPTED });
    secondMember = await buildPerson(tx, { roles: ['committee member'], now: ACCEPTED });
    both = await buildPerson(tx, { roles: ['administrator', 'committee member'], now: ACCEPTED });
  });
});
afterAll(closeDatabase);
beforeEach(() =>
  inTransaction(async (tx) => {
    await execute(tx, 'delete from policies', {});
    await execute(tx, `delete from proposals where kind = 'policy'`, {});
  }),
);

interface Change {
  readonly from?: number;
  readonly validFrom?: string;
  readonly values?: Readonly<Record<string, string>>;
}

const command = ({ from = 1, validFrom = '2026-12-01', values = { thinBelow: '0.5' } }: Change = {}) =>
  newPolicyProposal.parse({ from, validFrom, reason: WORDS, values });
const propose = (change: Change = {}, person: Person = administrator, now = NOW) =>
  proposePolicy(acting(person, now), command(change));
const decide = (
  id: number,
  {
    person = member,
    version = 1,
    decision = 'confirm',
    now = NOW,
  }: { person?: Person; version?: number; decision?: 'confirm' | 'decline'; now?: Date } = {},
) => decidePolicy(acting(person, now), { id, version }, { decision, text: WORDS });
/** Changed by two persons. */
const change = async (what: Change = {}, now = NOW) =>
  done(await decide(done(await propose(what, administrator, now)).id, { now }));

const versions = () => rows<{ version: number }>('select version from policies order by version');
const shown = async (now = NOW, person: Person = member) => done(await showPolicy(acting(person, now)));

describe('a proposal', () => {
  test('by itself changes nothing, and waits where the committee sees it', async () => {
    const { id } = done(await propose());
    expect(await versions()).toEqual([]);
    const view = await shown();
    expect(view).toMatchObject({ inForce: 1, latest: 1, mayPropose: false, mayConfirm: true });
    expect(view.proposals).toMatchObject([
      {
        id,
        state: 'proposed',
        proposedBy: administrator.name,
        changes: [{ key: 'thinBelow', before: '10\u00a0%', after: '50\u00a0%' }],
      },
    ]);
    expect((await barCounts(member)).policyToDecide).toBe(1);
    expect((await barCounts(administrator)).policyToDecide).toBeNull();
    expect((await barCounts(book.desk.analyst)).policyToDecide).toBeNull();
  });

  test('is the administrator’s', async () => {
    for (const person of [member, book.desk.analyst, book.desk.manager])
      expectRefused(await propose({}, person), 'not-allowed', 'Only an administrator');
  });

  test.each([
    [{ validFrom: '2026-11-30' }, 'validFrom'],
    [{ values: { thinBelow: '0.10' } }, 'values'],
    [{ values: { 'repeated.atLeast': '7' } }, 'values.repeated.atLeast'],
    [{ values: { 'stepDown.soonDays': '181' } }, 'values.stepDown.soonDays'],
  ])('of %o is refused, and says which value', async (what, field) => {
    expect(refused(await propose(what))).toMatchObject({ kind: 'invalid', errors: [{ field }] });
    expect((await shown()).proposals).toEqual([]);
  });

  test.each([{ thinBelow: '0.51' }, { thinBelow: 'ten' }, { 'stepDown.soonDays': '1.5' }, { unknown: '1' }])(
    'with the value %o is no proposal',
    (values) => {
      expect(
        newPolicyProposal.safeParse({ from: 1, validFrom: '2026-12-01', reason: WORDS, values }).success,
      ).toBe(false);
    },
  );

  test('that starts from another version than the latest is stale', async () => {
    expect(refused(await propose({ from: 2 }))).toMatchObject({ kind: 'stale', currentVersion: 1 });
  });

  test('is one at a time, also of two at the same moment', async () => {
    const outcomes = await Promise.all([propose(), propose({}, otherAdministrator)]);
    expect(outcomes.map((outcome) => (outcome.ok ? 'done' : outcome.error.kind)).sort()).toEqual([
      'conflict',
      'done',
    ]);
  });

  test('is withdrawn by its proposer only, and leaves room for another', async () => {
    const { id } = done(await propose());
    const withdraw = (person: Person) => withdrawPolicy(acting(person, NOW), { id, version: 1 });
    expectRefused(await withdraw(otherAdministrator), 'not-allowed', 'Only the person who proposed');
    done(await withdraw(administrator));
    expectRefused(await decide(id, { version: 2 }), 'conflict', 'withdrawn');
    done(await propose());
  });
});

describe('a decision', () => {
  test('to confirm makes the next version, with both names, its day and its reason', async () => {
    expect(await change({ validFrom: '2026-12-15' })).toMatchObject({ state: 'approved', policyVersion: 2 });
    const view = await shown();
    expect(view).toMatchObject({ inForce: 1, latest: 2, earliest: '2026-12-15' });
    expect(view.versions).toMatchObject([
      {
        version: 2,
        validFrom: '2026-12-15',
        standing: 'from a later day',
        proposedBy: administrator.name,
        confirmedBy: member.name,
        reason: WORDS,
        changes: [{ key: 'thinBelow' }],
      },
      { version: 1, validFrom: null, validTo: '2026-12-14', standing: 'in force', confirmedBy: null },
    ]);
    const later = await shown(new Date('2026-12-15T09:00:00Z'));
    expect(later.inForce).toBe(2);
    expect(later.versions.map(({ standing }) => standing)).toEqual(['in force', 'earlier']);
  });

  test('to decline leaves the policy as it is, and room for another', async () => {
    const { id } = done(await propose());
    expect(done(await decide(id, { decision: 'decline' }))).toMatchObject({
      state: 'declined',
      policyVersion: null,
    });
    expect(await versions()).toEqual([]);
    done(await propose());
  });

  test('is nobody’s who proposed, with both roles, whatever the version', async () => {
    const { id } = done(await propose({}, both));
    for (const version of [1, 2])
      expectRefused(await decide(id, { person: both, version }), 'not-allowed', 'You proposed this');
    expect((await barCounts(both)).policyToDecide).toBe(0);
    expect(await versions()).toEqual([]);
    done(await decide(id));
  });

  test('is the committee’s', async () => {
    const { id } = done(await propose());
    for (const person of [otherAdministrator, book.desk.analyst, book.desk.head])
      expectRefused(await decide(id, { person }), 'not-allowed', 'Only a committee member');
  });

  test('on a version that is not the one seen is stale', async () => {
    const { id } = done(await propose());
    expect(refused(await decide(id, { version: 2 }))).toMatchObject({ kind: 'stale', currentVersion: 1 });
  });

  test('of many at the same moment is one: one version, one audit entry', async () => {
    const { id } = done(await propose());
    const outcomes = await Promise.all(
      Array.from({ length: 20 }, (_, index) =>
        decide(id, { person: index % 2 === 0 ? member : secondMember }),
      ),
    );
    expect(outcomes.filter((outcome) => outcome.ok)).toHaveLength(1);
    for (const outcome of outcomes.filter((one) => !one.ok))
      expectRefused(outcome, 'conflict', 'approved by');
    expect(await versions()).toEqual([{ version: 2 }]);
    expect(
      await rows(`select seq from audit_entries where action = 'decide-policy' and subject_id = :id`, {
        id: String(id),
      }),
    ).toHaveLength(1);
  });

  test('after the day on which it was to hold is refused: nothing is applied to days that are over', async () => {
    const { id } = done(await propose({ validFrom: '2026-12-01' }));
    // In Paris it is 2 December from 23:00 UTC of the day before.
    expectRefused(
      await decide(id, { now: new Date('2026-12-01T23:00:00Z') }),
      'conflict',
      '1 Dec 2026',
      '2 Dec 2026',
    );
    expect(await versions()).toEqual([]);
    done(await decide(id, { now: new Date('2026-12-01T22:59:59Z') }));
  });

  test.each(['policies', 'audit_entries'])('that is cut at %s is no decision', async (table) => {
    const { id } = done(await propose());
    await expect(whileFailing({ table, at: 'insert' }, () => decide(id))).rejects.toThrow('fails in tests');
    expect(await versions()).toEqual([]);
    expect((await shown()).proposals).toMatchObject([{ id, state: 'proposed' }]);
    done(await decide(id));
  });
});

describe('a further version', () => {
  test('starts from the one confirmed last and keeps its values', async () => {
    await change({ validFrom: '2026-12-10' });
    await change({ from: 2, validFrom: '2026-12-20', values: { qualityWeakBelow: '25' } });
    const { values, versions: all } = await shown(new Date('2026-12-20T09:00:00Z'));
    const valueOf = (key: string) => values.find((value) => value.key === key)?.inForce;
    expect(valueOf('thinBelow')).toBe('50\u00a0%');
    expect(valueOf('qualityWeakBelow')).toBe('25 points');
    expect(all.map(({ version, validTo }) => [version, validTo])).toEqual([
      [3, null],
      [2, '2026-12-19'],
      [1, '2026-12-09'],
    ]);
  });

  test('never holds from a day before the one that it follows', async () => {
    await change({ validFrom: '2026-12-10' });
    expect(
      refused(await propose({ from: 2, validFrom: '2026-12-09', values: { restatedBy: '0.03' } })),
    ).toMatchObject({ kind: 'invalid', errors: [{ field: 'validFrom' }] });
  });

  test('for the same day takes the place of one that then never came into force', async () => {
    await change({ validFrom: '2026-12-10' });
    await change({ from: 2, validFrom: '2026-12-10', values: { thinBelow: '0.1' } });
    const { versions: all } = await shown(new Date('2026-12-10T09:00:00Z'));
    expect(all.map(({ version, standing }) => [version, standing])).toEqual([
      [3, 'in force'],
      [2, 'never in force'],
      [1, 'earlier'],
    ]);
  });
});

describe('what is computed', () => {
  const night = (businessDate: PlainDate, now: Date) =>
    runNight({ businessDate, kind: 'nightly', startedBy: null, now });
  const policiesOf = async (asOf: string) =>
    (
      await rows<{ version: number }>(
        'select distinct policy_version as version from assessments where as_of = :asOf order by 1',
        { asOf },
      )
    ).map(({ version }) => version);
  const roomyAlerts = () =>
    rows<{ kind: string }>(`select kind from alerts where borrower_id = :id`, { id: book.roomy.id });

  test('by the next night and the next day goes by the new version, by a night for an earlier day by that day’s', async () => {
    await night('2026-12-01', new Date('2026-12-01T01:30:00Z'));
    expect(await policiesOf('2026-12-01')).toEqual([1]);
    expect(await roomyAlerts()).toEqual([]);
    const before = await rows<object>('select id, content from assessments order by id');

    await change({ validFrom: '2026-12-02' });
    // By day on 1 December the earlier version is still in force.
    const assess = (asOf: PlainDate, knownAt: Date) =>
      assessBorrower(systemActor('test', knownAt), book.roomy.id, { runId: null, knownAt, asOf });
    done(await assess('2026-12-01', NOW));
    expect(await policiesOf('2026-12-01')).toEqual([1]);

    await night('2026-12-02', new Date('2026-12-02T01:30:00Z'));
    expect(await policiesOf('2026-12-02')).toEqual([2]);
    expect(await roomyAlerts()).toContainEqual({ kind: 'thin headroom' });
    done(await assess('2026-12-02', new Date('2026-12-02T09:00:00Z')));
    expect(await policiesOf('2026-12-02')).toEqual([2]);

    // Computed once more for a day before the change: known now, by the policy of that day.
    await night('2026-11-30', new Date('2026-12-02T10:00:00Z'));
    expect(await policiesOf('2026-11-30')).toEqual([1]);
    const after = await rows<{ id: number }>('select id, content from assessments order by id');
    expect(after.slice(0, before.length)).toEqual(before);
  });
});
