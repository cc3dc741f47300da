import {
  PUT_OFF_MOST_DAYS,
  PUT_OFF_MOST_TIMES,
  type AlertStep,
  type ClosingConfirmation,
  type HandingOver,
} from '../../contracts/alerts.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';
import { CLOSING_REASONS, type AlertState } from '../../core/alerts/alert.ts';
import { addDays, plainDate } from '../../core/calendar/plainDate.ts';
import { err, ok, unreachable, type Result } from '../../core/result.ts';
import { may } from '../auth/policy.ts';
import {
  findAlertForUpdate,
  moveAlert,
  type AlertMove,
  type AlertRecord,
} from '../db/repositories/alertStates.ts';
import { actsFor } from '../db/repositories/borrowerDesks.ts';
import type { Transaction } from 'sequelize';
import type { PersonActor } from './actor.ts';
import { audit, write, type Outcome } from './write.ts';

type Step = Pick<AlertMove, 'state' | 'what' | 'text' | 'takenBy' | 'putOffUntil' | 'closing'>;
type Planned = Result<Step, ServiceProblem>;

export interface AlertMoved {
  readonly id: number;
  readonly version: number;
  readonly state: AlertState;
}

/** A step of the owner or the owner's deputy. */
export const workAlert = (
  actor: PersonActor,
  id: number,
  version: number,
  step: AlertStep,
): Promise<Outcome<AlertMoved>> =>
  move(
    actor,
    { id, version, verb: `alert-${step.step.replace(' ', '-')}`, command: step },
    async (tx, alert) => {
      if (!may(actor.person, 'work an alert', alert.deskId)) return err({ kind: 'not-found', what: 'alert' });
      const on = actor.now.toISOString().slice(0, 10);
      if (!(await actsFor(tx, { personId: actor.person.id, ownerId: alert.ownerId, on })))
        return notAllowed('This alert belongs to the borrower’s relationship manager or deputy.');
      return plan(actor, alert, step);
    },
  );

/** The analyst, asked by the owner, hands the alert back with what was found. */
export const handOverAlert = (
  actor: PersonActor,
  id: number,
  version: number,
  command: HandingOver,
): Promise<Outcome<AlertMoved>> =>
  move(actor, { id, version, verb: 'alert-hand-over', command }, async (_tx, alert) => {
    if (!may(actor.person, 'hand over an alert', alert.deskId))
      return err({ kind: 'not-found', what: 'alert' });
    if (alert.state !== 'waiting for analyst') return conflict('This alert is not waiting for the analyst.');
    return Promise.resolve(ok({ state: 'taken', what: 'Handed over to the owner', text: command.text }));
  });

/** The second person's word on closing an urgent alert, or for a reason that asks for one. */
export const confirmClosing = (
  actor: PersonActor,
  id: number,
  version: number,
  command: ClosingConfirmation,
): Promise<Outcome<AlertMoved>> =>
  move(actor, { id, version, verb: 'alert-confirm-closing', command }, async (_tx, alert) => {
    const isHead = alert.deskHeadId === actor.person.id;
    const decides = actor.person.roles.includes('committee member');
    if (!may(actor.person, 'confirm a closing', alert.deskId))
      return err({ kind: 'not-found', what: 'alert' });
    if (!isHead && !decides)
      return notAllowed('The head of the desk or a committee member confirms this closing.');
    if (alert.closedBy === actor.person.id)
      return notAllowed('You asked for this closing; another person confirms it.');
    if (alert.state !== 'closing to be confirmed')
      return conflict('No closing waits for a second person here.');
    return Promise.resolve(
      ok(
        command.confirm
          ? { state: 'closed', what: 'Closing confirmed', text: command.text }
          : { state: 'taken', what: 'Closing not confirmed', text: command.text },
      ),
    );
  });

function plan(actor: PersonActor, alert: AlertRecord, step: AlertStep): Planned {
  if (alert.state === 'closing to be confirmed')
    return conflict('The closing of this alert waits for a second person.');
  switch (step.step) {
    case 'take':
      if (alert.state !== 'raised' && alert.state !== 'put off')
        return conflict(`This alert is ${alert.state} already.`);
      return ok({ state: 'taken', what: 'Taken', text: '', takenBy: actor.person.id });
    case 'wait':
      return ok({
        state: `waiting for ${step.waitFor}`,
        what: `Waiting for ${step.waitFor}`,
        text: step.text,
      });
    case 'assess':
      return ok({ state: 'assessed', what: 'Assessed', text: step.text });
    case 'put off':
      return planPuttingOff(actor, alert, step);
    case 'close': {
      const reason = CLOSING_REASONS.find((listed) => listed.code === step.reason);
      if (!reason) return conflict('That reason is not in the list.');
      const second = alert.severity === 'urgent' || reason.secondPerson;
      return ok({
        state: second ? 'closing to be confirmed' : 'closed',
        what: second ? `Asked to close: ${reason.label}` : `Closed: ${reason.label}`,
        text: step.text,
        closing: { reason: reason.code, text: step.text },
      });
    }
    default:
      return unreachable(step);
  }
}

function planPuttingOff(
  actor: PersonActor,
  alert: AlertRecord,
  step: { until: string; text: string },
): Planned {
  const today = plainDate(actor.now.toISOString().slice(0, 10));
  if (alert.severity === 'urgent') return conflict('An urgent alert cannot be put off.');
  if (alert.putOffCount >= PUT_OFF_MOST_TIMES)
    return conflict(`This alert was put off ${PUT_OFF_MOST_TIMES} times already.`);
  if (step.until <= today || step.until > addDays(today, PUT_OFF_MOST_DAYS)) {
    const message = `Choose a day from tomorrow to ${PUT_OFF_MOST_DAYS} days ahead.`;
    return err({
      kind: 'invalid',
      detail: `${message} Nothing was changed.`,
      errors: [{ field: 'until', code: 'invalid', message }],
    });
  }
  return ok({
    state: 'put off',
    what: `Put off until ${step.until}`,
    text: step.text,
    putOffUntil: step.until,
  });
}

async function move(
  actor: PersonActor,
  request: { id: number; version: number; verb: string; command: unknown },
  decide: (tx: Transaction, alert: AlertRecord) => Promise<Planned>,
): Promise<Outcome<AlertMoved>> {
  const { id, version, verb, command } = request;
  return write(actor, verb, { id, version, command }, async (tx) => {
    const alert = await findAlertForUpdate(tx, id);
    if (!alert) return err({ kind: 'not-found', what: 'alert' });
    const step = await decide(tx, alert);
    if (!step.ok) return step;
    const stale = err({
      kind: 'stale' as const,
      detail: `Somebody changed this alert since you opened it: it is ${alert.state}. Nothing was changed. Look again and repeat if still right.`,
      currentVersion: alert.version,
    });
    if (alert.version !== version) return stale;
    if (alert.state === 'closed' || alert.state === 'superseded') return conflict('This alert is closed.');
    if (!(await moveAlert(tx, { alert, personId: actor.person.id, now: actor.now, ...step.value })))
      return stale;
    await audit(tx, actor, {
      action: verb,
      subjectKind: 'alert',
      subjectId: String(id),
      borrowerId: alert.borrowerId,
      deskId: alert.deskId,
      summary: `${alert.borrowerName}, ${alert.kind}: ${step.value.what}`,
      before: { state: alert.state },
      after: { state: step.value.state, text: step.value.text, closing: step.value.closing ?? null },
    });
    return ok({ id, version: version + 1, state: step.value.state });
  });
}

const conflict = (why: string) => err({ kind: 'conflict' as const, detail: `${why} Nothing was changed.` });
const notAllowed = (why: string) =>
  err({ kind: 'not-allowed' as const, detail: `${why} Nothing was changed.` });
