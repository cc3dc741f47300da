/** A borrower stands on the watchlist by two persons' word, with the five things that an entry needs. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { newWatchlistProposal, type NewWatchlistProposal } from '../../src/contracts/watchlist.ts';
import type { Person } from '../../src/server/auth/policy.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { execute } from '../../src/server/db/sql.ts';
import type { PersonActor } from '../../src/server/services/actor.ts';
import { decideProposal, withdrawProposal } from '../../src/server/services/decideProposal.ts';
import { listWatchlist } from '../../src/server/services/listWatchlist.ts';
import { proposeWatchlist } from '../../src/server/services/proposeWatchlist.ts';
import { showBorrower } from '../../src/server/services/showBorrower.ts';
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

const NOW = new Date('2026-12-01T09:00:00Z');
const WORDS = 'Words that are long enough.';

let desk: BuiltDesk;
let elsewhere: BuiltDesk;
let committee: Person;
let secondMember: Person;
/** Relationship manager of the desk and committee member. */
let both: Person;
let borrower: BuiltBorrower;

beforeAll(async () => {
  await useOwnDatabase();
  await inTransaction(async (tx) => {
    desk = await buildDesk(tx, NOW);
    elsewhere = await buildDesk(tx, NOW);
    committee = await buildPerson(tx, { roles: ['committee member'], name: 'First Member', now: NOW });
    secondMember = await buildPerson(tx, { roles: ['committee member'], now: NOW });
    both = await buildPerson(tx, {
      roles: ['relationship manager', 'committee member'],
      deskIds: [desk.id],
      now: NOW,
    });
  });
});
afterAll(closeDatabase);
beforeEach(async () => {
  borrower = await inTransaction((tx) => buildBorrower(tx, desk, { now: NOW }));
});

const content = (over: Partial<NewWatchlistProposal> = {}): NewWatchlistProposal => ({
  borrowerId: borrower.id,
  alertId: null,
  change: 'entry',
  grade: 'W1',
  reason: 'Leverage rises and cash does not follow.',
  ownerId: desk.manager.id,
  plan: 'Monthly figures until the next test.',
  nextReviewOn: '2027-01-31',
  ...over,
});
const propose = (over: Partial<NewWatchlistProposal> = {}, actor: PersonActor = acting(desk.manager, NOW)) =>
  proposeWatchlist(actor, content(over));
const decide = (
  id: number,
  over: { person?: Person; version?: number; decision?: 'approve' | 'decline' } = {},
) => {
  const { person = committee, version = 1, decision = 'approve' } = over;
  return decideProposal(acting(person, NOW), { id, version }, { decision, text: WORDS });
};
/** On the watchlist by two persons. */
async function entered(over: Partial<NewWatchlistProposal> = {}): Promise<void> {
  done(await decide(done(await propose(over)).id));
}

const entries = () =>
  rows<{ grade: string; state: string; plan: string; enteredOn: string; version: number }>(
    `select grade, state, plan, entered_on as enteredOn, version from watchlist_entries where borrower_id = :id order by id`,
    { id: borrower.id },
  );
const proposals = () =>
  rows<{ id: number; state: string; decidedBy: number | null }>(
    'select id, state, decided_by as decidedBy from proposals where borrower_id = :id order by id',
    { id: borrower.id },
  );
const actions = async () =>
  (
    await rows<{ action: string }>(
      `select action from audit_entries where borrower_id = :id and subject_kind = 'proposal' order by seq`,
      { id: borrower.id },
    )
  ).map(({ action }) => action);

describe('a proposal', () => {
  test.each(['grade', 'reason', 'ownerId', 'plan', 'nextReviewOn'] as const)(
    'without %s is refused',
    (field) => {
      const rest = Object.fromEntries(Object.entries(content()).filter(([name]) => name !== field));
      expect(newWatchlistProposal.safeParse(content()).success).toBe(true);
      expect(newWatchlistProposal.safeParse(rest).error?.issues.map(({ path }) => path[0])).toEqual([field]);
    },
  );

  test('by itself puts nobody on the watchlist, and says who waits for what', async () => {
    const { id } = done(await propose());
    expect(await entries()).toEqual([]);
    expect(await actions()).toEqual(['propose-watchlist']);
    const { entries: standing, proposals: waiting } = done(await listWatchlist(acting(committee, NOW)));
    expect(standing.filter(({ borrowerId }) => borrowerId === borrower.id)).toEqual([]);
    expect(waiting.find((row) => row.id === id)).toMatchObject({
      state: 'proposed',
      grade: 'W1',
      ownerName: desk.manager.name,
      proposedBy: desk.manager.name,
      decidedBy: null,
    });
  });

  test('names an owner of the desk who is active', async () => {
    const owner = await inTransaction((tx) =>
      buildPerson(tx, { roles: ['analyst'], deskIds: [desk.id], now: NOW }),
    );
    expect(refused(await propose({ ownerId: elsewhere.manager.id }))).toMatchObject({
      kind: 'invalid',
      errors: [{ field: 'ownerId' }],
    });
    await inTransaction((tx) =>
      execute(tx, 'update people set is_active = 0 where id = :id', { id: owner.id }),
    );
    expect(refused(await propose({ ownerId: owner.id }))).toMatchObject({ kind: 'invalid' });
    await inTransaction((tx) =>
      execute(tx, 'update people set is_active = 1 where id = :id', { id: owner.id }),
    );
    done(await propose({ ownerId: owner.id }));
  });

  test.each([
    // In Paris it is 2 December from 23:00 UTC of the day before.
    ['2026-12-01T22:59:59Z', '2026-12-01', false],
    ['2026-12-01T22:59:59Z', '2026-12-02', true],
    ['2026-12-01T23:00:00Z', '2026-12-02', false],
    ['2026-12-01T23:00:00Z', '2026-12-03', true],
  ] as const)('at %s with the next review on %s: %s', async (instant, nextReviewOn, allowed) => {
    const outcome = await propose({ nextReviewOn }, acting(desk.manager, new Date(instant)));
    if (allowed) done(outcome);
    else expect(refused(outcome)).toMatchObject({ kind: 'invalid', errors: [{ field: 'nextReviewOn' }] });
  });

  test('is one a borrower, also of two at the same moment', async () => {
    const outcomes = await Promise.all([propose(), propose({ grade: 'W2' }, acting(desk.analyst, NOW))]);
    expect(outcomes.map((outcome) => (outcome.ok ? 'done' : outcome.error.kind)).sort()).toEqual([
      'conflict',
      'done',
    ]);
    expectRefused(await propose(), 'conflict', 'waiting for a decision');
    expect(await proposals()).toHaveLength(1);
  });

  test('of another desk’s borrower, or by a role without it, is not found', async () => {
    for (const person of [
      elsewhere.manager,
      elsewhere.analyst,
      { ...desk.manager, roles: ['auditor'] } satisfies Person,
    ])
      expect(refused(await propose({}, acting(person, NOW)))).toEqual({
        kind: 'not-found',
        what: 'borrower',
      });
  });

  test('is withdrawn by its proposer only, and leaves room for another', async () => {
    const { id } = done(await propose());
    const withdraw = (person: Person, version = 1) => withdrawProposal(acting(person, NOW), { id, version });
    expectRefused(await withdraw(desk.analyst), 'not-allowed', 'Only the person who proposed');
    expect(refused(await withdraw(elsewhere.manager)).kind).toBe('not-found');
    expectRefused(await withdraw(desk.manager, 2), 'stale');
    done(await withdraw(desk.manager));
    expectRefused(await withdraw(desk.manager, 2), 'conflict', 'withdrawn');
    expectRefused(await decide(id, { version: 2 }), 'conflict', 'withdrawn');
    done(await propose());
    expect(await actions()).toEqual(['propose-watchlist', 'withdraw-proposal', 'propose-watchlist']);
  });
});

describe('a decision', () => {
  test('to approve makes the entry as proposed, and both names stand with it', async () => {
    const { id } = done(await propose({ grade: 'W2' }));
    expect(done(await decide(id))).toEqual({ id, state: 'approved' });
    const { watchlist } = done(await showBorrower(acting(desk.analyst, NOW), borrower.id));
    expect(watchlist).toMatchObject({
      grade: 'W2',
      reason: content().reason,
      plan: content().plan,
      ownerName: desk.manager.name,
      nextReviewOn: '2027-01-31',
      enteredOn: '2026-12-01',
      reviewOverdue: false,
      state: 'active',
      proposedBy: desk.manager.name,
      decidedBy: 'First Member',
    });
    expect(await actions()).toEqual(['propose-watchlist', 'decide-proposal']);
  });

  test('to decline leaves no entry and room for another proposal', async () => {
    const { id } = done(await propose());
    expect(done(await decide(id, { decision: 'decline' }))).toEqual({ id, state: 'declined' });
    expect(await entries()).toEqual([]);
    done(await propose());
  });

  test('is nobody’s who proposed: with two roles, in a second session, with another version', async () => {
    const { id } = done(await propose({}, acting(both, NOW, { request: 'first session' })));
    for (const session of ['first session', 'second session'])
      expectRefused(
        await decideProposal(
          acting(both, NOW, { request: session }),
          { id, version: 1 },
          { decision: 'approve', text: WORDS },
        ),
        'not-allowed',
        'You proposed this',
      );
    expectRefused(await decide(id, { person: both, version: 2 }), 'not-allowed');
    expect(await entries()).toEqual([]);
    expect(await proposals()).toMatchObject([{ state: 'proposed', decidedBy: null }]);
    done(await decide(id));
  });

  test('is the committee’s: for everybody else the proposal is not there to be decided', async () => {
    const { id } = done(await propose());
    for (const person of [desk.analyst, desk.head, elsewhere.manager])
      expect(refused(await decide(id, { person })).kind).toBe('not-found');
  });

  test('on a version that is not the one seen is stale', async () => {
    const { id } = done(await propose());
    expect(refused(await decide(id, { version: 2 }))).toMatchObject({ kind: 'stale', currentVersion: 1 });
    expect(await entries()).toEqual([]);
  });

  test('of fifty at the same moment is one: one entry, one audit entry, and the others are told by whom', async () => {
    const { id } = done(await propose());
    const outcomes = await Promise.all(
      Array.from({ length: 50 }, (_, index) =>
        decide(id, {
          person: index % 2 === 0 ? committee : secondMember,
          decision: index % 3 === 0 ? 'decline' : 'approve',
        }),
      ),
    );
    const made = outcomes.filter((outcome) => outcome.ok);
    expect(made).toHaveLength(1);
    const [proposal] = await proposals();
    const decider = proposal?.decidedBy === committee.id ? committee : secondMember;
    for (const outcome of outcomes.filter((one) => !one.ok))
      expectRefused(outcome, 'conflict', `by ${decider.name}`);
    expect(await entries()).toHaveLength(made[0]?.value.state === 'approved' ? 1 : 0);
    expect(await actions()).toEqual(['propose-watchlist', 'decide-proposal']);
  }, 60_000);

  test.each([
    { table: 'watchlist_entries', at: 'insert' },
    { table: 'audit_entries', at: 'insert' },
  ] as const)('that is cut at $table is no decision', async (failing) => {
    const { id } = done(await propose());
    await expect(whileFailing(failing, () => decide(id))).rejects.toThrow('fails in tests');
    expect(await entries()).toEqual([]);
    expect(await proposals()).toMatchObject([{ state: 'proposed', decidedBy: null }]);
    done(await decide(id));
  });
});

describe('a borrower on the watchlist', () => {
  test('is not proposed for entry again, and one that is not on it is not proposed for a change or an exit', async () => {
    for (const change of ['grade', 'exit'] as const)
      expectRefused(await propose({ change }), 'conflict', 'not on the watchlist');
    await entered();
    expectRefused(await propose(), 'conflict', 'stands on the watchlist at W1');
  });

  test('changes grade by two persons, and the entry keeps its day', async () => {
    await entered();
    const { id } = done(await propose({ change: 'grade', grade: 'W3', plan: 'Meet the board this month.' }));
    expect(await entries()).toMatchObject([{ grade: 'W1' }]);
    done(await decide(id));
    expect(await entries()).toEqual([
      {
        grade: 'W3',
        state: 'active',
        plan: 'Meet the board this month.',
        enteredOn: '2026-12-01',
        version: 2,
      },
    ]);
  });

  test('leaves through probation, still on the list', async () => {
    await entered();
    done(await decide(done(await propose({ change: 'exit' })).id));
    expect(await entries()).toMatchObject([{ state: 'probation' }]);
    const { entries: standing } = done(await listWatchlist(acting(desk.analyst, NOW)));
    expect(standing.find(({ borrowerId }) => borrowerId === borrower.id)).toMatchObject({
      state: 'probation',
    });
  });

  test('whose review day has passed is overdue from the next day on', async () => {
    await entered({ nextReviewOn: '2026-12-02' });
    const overdueAt = async (instant: string) =>
      done(await listWatchlist(acting(desk.analyst, new Date(instant)))).entries.find(
        ({ borrowerId }) => borrowerId === borrower.id,
      )?.reviewOverdue;
    expect(await overdueAt('2026-12-02T22:59:59Z')).toBe(false);
    expect(await overdueAt('2026-12-02T23:00:00Z')).toBe(true);
  });

  test('is seen by its desk and the committee, not by another desk', async () => {
    await entered();
    const names = async (person: Person) =>
      done(await listWatchlist(acting(person, NOW))).entries.map(({ borrowerName }) => borrowerName);
    expect(await names(desk.analyst)).toContain(borrower.name);
    expect(await names(committee)).toContain(borrower.name);
    expect(await names(elsewhere.manager)).not.toContain(borrower.name);
  });

  test('that entered while an entry was proposed is not entered twice', async () => {
    const { id } = done(await propose());
    await inTransaction((tx) =>
      execute(
        tx,
        `insert into watchlist_entries (borrower_id, proposal_id, grade, reason, owner_id, plan, next_review_on, state, open_slot, entered_on)
         values (:borrowerId, :id, 'W1', 'reason', :ownerId, 'plan', '2027-01-31', 'active', :slot, '2026-12-01')`,
        { borrowerId: borrower.id, id, ownerId: desk.manager.id, slot: `borrower:${borrower.id}` },
      ),
    );
    expectRefused(await decide(id), 'conflict', 'on the watchlist already', 'Decline this proposal');
    expect(await proposals()).toMatchObject([{ state: 'proposed' }]);
  });
});
