/** Findings become alerts: one open alert per borrower, covenant and kind, every change an event and an audit entry. */
import type { Transaction } from 'sequelize';
import type { AlertFinding, AlertState } from '../../core/alerts/alert.ts';
import { alertChanges, type AlertChange, type AlertView } from '../../core/alerts/alertChanges.ts';
import { alertDue } from '../../core/alerts/clock.ts';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { unreachable } from '../../core/result.ts';
import {
  ALERT_EVENTS,
  closeByItself,
  endPuttingOff,
  insertAlert,
  insertAlertEvent,
  listAlertsForUpdate,
  markConditionGone,
  markSeen,
  updateAlertFacts,
  type AlertEventWord,
  type BorrowerAlert,
} from '../db/repositories/alerts.ts';
import { nextChange } from '../db/repositories/alertStates.ts';
import type { BorrowerPlace } from '../db/repositories/borrowerInputs.ts';
import type { Actor } from './actor.ts';
import { audit } from './write.ts';

export interface AlertSubject {
  readonly borrower: BorrowerPlace;
  /** The day the clock of the alert starts. */
  readonly asOf: PlainDate;
  readonly runId: number | null;
  readonly view: AlertView;
}

/** How many alerts of the borrower changed, and how. */
export interface AlertCounts {
  readonly raised: number;
  readonly worsened: number;
  readonly updated: number;
  readonly conditionGone: number;
  readonly closed: number;
}

/**
 * Runs inside the transaction that stores the assessment. The caller holds the borrower (holdBorrower), so that no
 * second assessment of it writes alerts at the same time; the unique slot is what refuses a double all the same.
 */
export async function raiseAlerts(
  tx: Transaction,
  actor: Actor,
  subject: AlertSubject,
  findings: readonly AlertFinding[],
): Promise<AlertCounts> {
  const product: Actor = { ...actor, person: null, idempotencyKey: null };
  const known = await wake(tx, product, subject, await listAlertsForUpdate(tx, subject.borrower.id));
  const changes = alertChanges(known, findings, subject.view);
  for (const change of changes) await apply(tx, product, subject, known, change);
  const count = (wanted: (change: AlertChange) => boolean) => changes.filter(wanted).length;
  return {
    raised: count((change) => change.change === 'raise'),
    worsened: count((change) => change.change === 'update' && change.how === 'worsened'),
    updated: count((change) => change.change === 'update' && change.how !== 'worsened'),
    conditionGone: count((change) => change.change === 'condition gone'),
    closed: count((change) => change.change === 'close'),
  };
}

/** Where an alert goes that nobody puts off any more. */
const stateWhenAwake = (alert: BorrowerAlert): AlertState => (alert.isTaken ? 'taken' : 'raised');

async function wake(
  tx: Transaction,
  actor: Actor,
  subject: AlertSubject,
  alerts: readonly BorrowerAlert[],
): Promise<BorrowerAlert[]> {
  const awake: BorrowerAlert[] = [];
  for (const alert of alerts) {
    const isDue =
      alert.state === 'put off' && alert.putOffUntil !== null && alert.putOffUntil <= subject.asOf;
    if (!isDue) {
      awake.push(alert);
      continue;
    }
    const state = stateWhenAwake(alert);
    const change = await nextChangeOf(tx, actor, subject, alert.id);
    await endPuttingOff(tx, { ...change, state });
    await record(tx, actor, subject, {
      id: alert.id,
      what: ALERT_EVENTS['put off ended'],
      text: `The day it was put off until has come: ${alert.putOffUntil ?? ''}.`,
      before: { state: alert.state },
      after: { state },
    });
    awake.push({ ...alert, state, putOffUntil: null });
  }
  return awake;
}

async function apply(
  tx: Transaction,
  actor: Actor,
  subject: AlertSubject,
  known: readonly BorrowerAlert[],
  change: AlertChange,
): Promise<void> {
  switch (change.change) {
    case 'seen':
      return markSeen(tx, {
        id: change.alert.id,
        finding: change.finding,
        inputVersion: subject.view.inputVersion,
        now: actor.now,
      });
    case 'raise':
      return raise(tx, actor, subject, change.finding);
    case 'update': {
      const alert = known.find((one) => one.id === change.alert.id);
      if (!alert) throw new Error(`alert ${change.alert.id} is not among the borrower's`);
      return update(tx, actor, subject, alert, change);
    }
    case 'close':
      await closeByItself(tx, await nextChangeOf(tx, actor, subject, change.alert.id));
      return record(tx, actor, subject, {
        id: change.alert.id,
        what: ALERT_EVENTS.closed,
        text: 'Closed by itself: the condition is gone.',
        before: { state: change.alert.state },
        after: { state: 'closed' },
      });
    case 'condition gone':
      await markConditionGone(tx, await nextChangeOf(tx, actor, subject, change.alert.id));
      return record(tx, actor, subject, {
        id: change.alert.id,
        what: ALERT_EVENTS.gone,
        text: 'The condition is gone. A person confirms the closing.',
        before: { conditionGone: false },
        after: { conditionGone: true },
      });
    default:
      return unreachable(change);
  }
}

async function raise(
  tx: Transaction,
  actor: Actor,
  subject: AlertSubject,
  finding: AlertFinding,
): Promise<void> {
  const { borrower, asOf, runId } = subject;
  const dueOn = alertDue(finding.kind, finding.severity, asOf).decideBy;
  const id = await insertAlert(tx, {
    borrowerId: borrower.id,
    deskId: borrower.deskId,
    ownerId: borrower.relationshipManagerId,
    finding,
    dueOn,
    runId,
    inputVersion: subject.view.inputVersion,
    changeNumber: await nextChange(tx, borrower.deskId),
    now: actor.now,
  });
  await record(tx, actor, subject, {
    id,
    what: ALERT_EVENTS.raised,
    text: finding.sentence,
    before: null,
    after: { kind: finding.kind, severity: finding.severity, factDate: finding.factDate, dueOn },
  });
}

async function update(
  tx: Transaction,
  actor: Actor,
  subject: AlertSubject,
  alert: BorrowerAlert,
  { finding, how }: Extract<AlertChange, { change: 'update' }>,
): Promise<void> {
  const worsened = how === 'worsened';
  const sooner = alertDue(finding.kind, finding.severity, subject.asOf).decideBy;
  const isWoken = worsened && alert.state === 'put off';
  await updateAlertFacts(tx, {
    ...(await nextChangeOf(tx, actor, subject, alert.id)),
    finding,
    how,
    inputVersion: subject.view.inputVersion,
    state: isWoken ? stateWhenAwake(alert) : alert.state,
    putOffUntil: isWoken ? null : alert.putOffUntil,
    dueOn: worsened && sooner < alert.dueOn ? sooner : alert.dueOn,
  });
  await record(tx, actor, subject, {
    id: alert.id,
    what: ALERT_EVENTS[how],
    text: finding.sentence,
    before: { severity: alert.severity, factDate: alert.factDate, sentence: alert.sentence },
    after: { severity: finding.severity, factDate: finding.factDate, sentence: finding.sentence },
  });
}

const nextChangeOf = async (tx: Transaction, actor: Actor, subject: AlertSubject, id: number) => ({
  id,
  changeNumber: await nextChange(tx, subject.borrower.deskId),
  now: actor.now,
});

async function record(
  tx: Transaction,
  actor: Actor,
  { borrower }: AlertSubject,
  change: { id: number; what: AlertEventWord; text: string; before: unknown; after: unknown },
): Promise<void> {
  await insertAlertEvent(tx, { alertId: change.id, at: actor.now, what: change.what, text: change.text });
  await audit(tx, actor, {
    action: 'alert-by-product',
    subjectKind: 'alert',
    subjectId: String(change.id),
    borrowerId: borrower.id,
    deskId: borrower.deskId,
    summary: `${borrower.name}: ${change.what.toLowerCase()}`,
    before: change.before,
    after: change.after,
  });
}
