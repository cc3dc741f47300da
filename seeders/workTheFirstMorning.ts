/**
 * What the desk did with its first night: an alert taken, one closed, one borrower put on the watchlist by two
 * persons. Through the services, so that each leaves its audit entry. The borrower that is just passing is left for
 * whoever tries the product.
 */
import { addDays, plainDate } from '../src/core/calendar/plainDate.ts';
import type { AlertKind } from '../src/core/alerts/alert.ts';
import { ROLES, type Person } from '../src/server/auth/policy.ts';
import { inTransaction } from '../src/server/db/inTransaction.ts';
import { listAlerts, type AlertListRecord } from '../src/server/db/repositories/alertLists.ts';
import { findPerson, listActivePeople } from '../src/server/db/repositories/people.ts';
import type { PersonActor } from '../src/server/services/actor.ts';
import { decideProposal } from '../src/server/services/decideProposal.ts';
import { proposeWatchlist } from '../src/server/services/proposeWatchlist.ts';
import { workAlert } from '../src/server/services/workAlert.ts';
import type { Outcome } from '../src/server/services/write.ts';
import { BORROWER_ROWS, type Scenario } from './demo/borrowerTable.ts';

export async function workTheFirstMorning(now: Date): Promise<void> {
  const today = plainDate(now.toISOString().slice(0, 10));

  const thin = await openAlert('thin headroom', 'thin headroom');
  done(await workAlert(await ownerOf(thin, now), thin.id, thin.version, { step: 'take' }));

  const explained = await openAlert('thin current ratio', 'thin headroom');
  done(
    await workAlert(await ownerOf(explained, now), explained.id, explained.version, {
      step: 'close',
      reason: 3,
      text: 'Stock bought for the winter season; the ageing was seen and clears in January.',
    }),
  );

  const failed = await openAlert('interest cover not met', 'test not met');
  const owner = await ownerOf(failed, now);
  const proposed = done(
    await proposeWatchlist(owner, {
      borrowerId: failed.borrowerId,
      alertId: failed.id,
      change: 'entry',
      grade: 'W2',
      reason: 'Interest cover was not met on our figures after one loss-making quarter.',
      ownerId: owner.person.id,
      plan: 'Monthly figures from the borrower; cost plan by the next test; decide on a reset then.',
      nextReviewOn: addDays(today, 60),
    }),
  );
  done(
    await decideProposal(
      await committeeMember(now),
      { id: proposed.id, version: 1 },
      { decision: 'approve', text: 'Agreed; come back with the cost plan before the next test.' },
    ),
  );
}

/** The open alert of the kind that the story's borrower has. */
async function openAlert(scenario: Scenario, kind: AlertKind): Promise<AlertListRecord> {
  const names = BORROWER_ROWS.filter((row) => row.scenario === scenario).map(({ name }) => name);
  const { rows } = await inTransaction((tx) =>
    listAlerts(
      tx,
      'all',
      {
        ownerIds: null,
        notTaken: true,
        kind,
        severity: null,
        sector: null,
        mayFallBelow: null,
        dueBy: null,
        state: 'open',
        borrowerId: null,
      },
      { sort: 'borrower', direction: 'up', page: 1, perPage: 200 },
    ),
  );
  const found = rows.find(({ borrowerName }) => names.includes(borrowerName));
  if (!found) throw new Error(`the night raised no "${kind}" for a borrower that is "${scenario}"`);
  return found;
}

async function ownerOf({ ownerId }: AlertListRecord, now: Date): Promise<PersonActor> {
  const record = await inTransaction((tx) => findPerson(tx, ownerId));
  if (!record) throw new Error(`no person ${ownerId}`);
  return acting(record, now);
}

async function committeeMember(now: Date): Promise<PersonActor> {
  const people = await inTransaction(listActivePeople);
  const member = people.find(({ roles }) => roles.includes('committee member'));
  if (!member) throw new Error('the demo desk has no committee');
  return acting(member, now);
}

type PersonRecord = NonNullable<Awaited<ReturnType<typeof findPerson>>>;

function acting(record: PersonRecord, now: Date): PersonActor {
  const person: Person = {
    id: record.id,
    name: record.name,
    email: record.email,
    roles: ROLES.filter((role) => record.roles.includes(role)),
    deskIds: record.deskIds,
  };
  return { person, requestId: 'demo-desk', address: 'local', idempotencyKey: null, now };
}

function done<T>(outcome: Outcome<T>): T {
  if (!outcome.ok) throw new Error(`the demo desk could not be worked: ${JSON.stringify(outcome.error)}`);
  return outcome.value;
}
