/** An alert that goes into a watchlist proposal: it waits with it, and comes back or stays with the decision. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { NewWatchlistProposal } from '../../src/contracts/watchlist.ts';
import type { Severity } from '../../src/core/alerts/alert.ts';
import type { Person } from '../../src/server/auth/policy.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { systemActor } from '../../src/server/services/actor.ts';
import { decideProposal, withdrawProposal } from '../../src/server/services/decideProposal.ts';
import { proposeWatchlist } from '../../src/server/services/proposeWatchlist.ts';
import { raiseAlerts } from '../../src/server/services/raiseAlerts.ts';
import { showAlert } from '../../src/server/services/showAlert.ts';
import { workAlert } from '../../src/server/services/workAlert.ts';
import { acting, done, expectRefused, refused } from '../support/acting.ts';
import {
  buildBorrower,
  buildDesk,
  buildPerson,
  type BuiltBorrower,
  type BuiltDesk,
} from '../support/factories.ts';
import { rows } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

const NOW = new Date('2026-12-01T09:00:00Z');
const WORDS = 'Words that are long enough.';

let desk: BuiltDesk;
let committee: Person;
let borrower: BuiltBorrower;

beforeAll(async () => {
  await useOwnDatabase();
  await inTransaction(async (tx) => {
    desk = await buildDesk(tx, NOW);
    committee = await buildPerson(tx, { roles: ['committee member'], name: 'First Member', now: NOW });
  });
});
afterAll(closeDatabase);
beforeEach(async () => {
  borrower = await inTransaction((tx) => buildBorrower(tx, desk, { now: NOW }));
});

const propose = (over: Partial<NewWatchlistProposal>, person: Person = desk.manager) =>
  proposeWatchlist(acting(person, NOW), {
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
const decide = (id: number, decision: 'approve' | 'decline') =>
  decideProposal(acting(committee, NOW), { id, version: 1 }, { decision, text: WORDS });

describe('an alert that a proposal carries', () => {
  const raised = async (severity: Severity = 'soon') => {
    await inTransaction((tx) =>
      raiseAlerts(
        tx,
        systemActor('test', NOW),
        {
          borrower: {
            id: borrower.id,
            name: borrower.name,
            deskId: desk.id,
            relationshipManagerId: desk.manager.id,
          },
          asOf: '2026-12-01',
          runId: null,
          view: { inputVersion: 1, figuresChangedAt: null, isUnknown: () => false },
        },
        [
          {
            kind: 'thin headroom',
            severity,
            factDate: '2026-09-30',
            covenantId: null,
            sentence: 'Thin.',
            wouldChange: 'Less debt.',
            evidence: [],
          },
        ],
      ),
    );
    return (await alert()).id;
  };
  const alert = async () => {
    const [found] = await rows<{
      id: number;
      version: number;
      state: string;
      takenBy: number | null;
      openSlot: string | null;
    }>(
      'select id, version, state, taken_by as takenBy, open_slot as openSlot from alerts where borrower_id = :id',
      { id: borrower.id },
    );
    if (!found) throw new Error('no alert was raised');
    return found;
  };
  const closeWith = async (reason: number) => {
    const { id, version } = await alert();
    return workAlert(acting(desk.manager, NOW), id, version, { step: 'close', reason, text: WORDS });
  };
  const events = async (id: number) =>
    done(await showAlert(acting(desk.manager, NOW), id)).events.map(({ who, what, text }) => [
      who,
      what,
      text,
    ]);

  test('waits with it: nobody takes a step on it before the decision', async () => {
    const alertId = await raised();
    done(await propose({ alertId, grade: 'W2', reason: 'r'.repeat(1_000) }));
    expect(await alert()).toMatchObject({ state: 'carried into a proposal', takenBy: desk.manager.id });
    expect((await events(alertId))[0]).toEqual([
      desk.manager.name,
      'Proposed for watchlist at W2',
      'r'.repeat(1_000),
    ]);
    expectRefused(await closeWith(7), 'conflict', 'waits for a decision');
    const page = done(await showAlert(acting(desk.manager, NOW), alertId));
    expect(page.proposalWaiting).toBe(true);
    expect(Object.values(page.steps).some(Boolean)).toBe(false);
  });

  test('stays carried once approved, until its owner closes it as covered by the entry', async () => {
    const alertId = await raised();
    done(await decide(done(await propose({ alertId })).id, 'approve'));
    expect((await alert()).state).toBe('carried into a proposal');
    const { steps } = done(await showAlert(acting(desk.manager, NOW), alertId));
    expect(Object.entries(steps).flatMap(([name, may]) => (may ? [name] : []))).toEqual(['close']);
    const { id, version } = await alert();
    expectRefused(
      await workAlert(acting(desk.manager, NOW), id, version, { step: 'take' }),
      'conflict',
      'only be closed',
    );
    expect(done(await closeWith(7)).state).toBe('closed');
    expect((await alert()).openSlot).toBeNull();
  });

  test('goes back to its owner once declined, with the reason', async () => {
    const alertId = await raised();
    done(await decide(done(await propose({ alertId })).id, 'decline'));
    expect(await alert()).toMatchObject({ state: 'taken', takenBy: desk.manager.id });
    expect((await events(alertId))[0]).toEqual(['First Member', 'Proposal declined', WORDS]);
    done(await closeWith(3));
  });

  test('goes back to its owner once withdrawn; one that nobody took is not taken by that', async () => {
    const alertId = await raised();
    const { id } = done(await propose({ alertId }, desk.analyst));
    done(await withdrawProposal(acting(desk.analyst, NOW), { id, version: 1 }));
    expect(await alert()).toMatchObject({ state: 'raised', takenBy: null });
    expect((await events(alertId))[0]).toEqual([desk.analyst.name, 'Proposal withdrawn', '']);
  });

  test('is of that borrower and open', async () => {
    const alertId = await raised();
    done(await closeWith(3));
    expectRefused(await propose({ alertId }), 'conflict', 'This alert is closed');
    expect((await alert()).state).toBe('closed');
    borrower = await inTransaction((tx) => buildBorrower(tx, desk, { now: NOW }));
    expect(refused(await propose({ alertId }))).toEqual({ kind: 'not-found', what: 'alert' });
    expect(await rows('select id from proposals where borrower_id = :id', { id: borrower.id })).toEqual([]);
  });

  test('whose closing waits for a second person is not carried', async () => {
    const alertId = await raised('urgent');
    done(await closeWith(3));
    expectRefused(await propose({ alertId }), 'conflict', 'closing to be confirmed');
  });
});
