import {
  PUT_OFF_MOST_DAYS,
  type AlertStep,
  type ClosingConfirmation,
  type HandingOver,
} from '../../contracts/alerts.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';
import { CLOSING_REASONS, type AlertState } from '../../core/alerts/alert.ts';
import { addDays, type PlainDate } from '../../core/calendar/plainDate.ts';
import { err, ok, unreachable, type Result } from '../../core/result.ts';
import { deskScope, type Action, type Person } from '../auth/policy.ts';
import {
  findAlertForUpdate,
  moveAlert,
  type AlertMove,
  type AlertRecord,
} from '../db/repositories/alertStates.ts';
import { actsFor } from '../db/repositories/borrowerDesks.ts';
import { findWaitingProposal } from '../db/repositories/proposals.ts';
import type { Transaction } from 'sequelize';
import type { PersonActor } from './actor.ts';
import { hindrance } from './alertHindrance.ts';
import { lenderDay } from './lenderDay.ts';
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
): Promise<Outcome<AlertMoved>> => {
  const verb = `alert-${step.step.replace(' ', '-')}`;
  const request = { id, version, verb, right: 'work an alert', command: step } as const;
  return move(actor, request, async (tx, alert) => {
    const today = await lenderDay(tx, actor.now);
    if (!(await actsFor(tx, actor.person.id, today)).includes(alert.ownerId))
      return notAllowed('This alert belongs to the borrower’s relationship manager or deputy.');
    const waiting = await findWaitingProposal(tx, alert.borrowerId);
    const why = hindrance(step.step, { ...alert, proposalWaits: waiting?.alertId === id });
    return why === null ? plan(alert, step, actor.person, today) : conflict(why);
  });
};

/** The analyst, asked by the owner, hands the alert back with what was found. */
export const handOverAlert = (
  actor: PersonActor,
  id: number,
  version: number,
  command: HandingOver,
): Promise<Outcome<AlertMoved>> => {
  const request = { id, version, verb: 'alert-hand-over', right: 'hand over an alert', command } as const;
  return move(actor, request, (_tx, alert) =>
    alert.state === 'waiting for analyst'
      ? ok({ state: 'taken', what: 'Handed over to the owner', text: command.text })
      : conflict('This alert is not waiting for the analyst.'),
  );
};

/**
 * The second person's word on closing an urgent alert, or for a reason that asks for one. That it is not the word of
 * whoever asked for the closing is tested by the UPDATE itself.
 */
export const confirmClosing = (
  actor: PersonActor,
  id: number,
  version: number,
  command: ClosingConfirmation,
): Promise<Outcome<AlertMoved>> => {
  const verb = 'alert-confirm-closing';
  const request = { id, version, verb, right: 'confirm a closing', command } as const;
  return move(actor, request, (_tx, alert) => {
    if (!isSecondPerson(actor.person, alert))
      return notAllowed(
        'The head of the desk, unless the alert is the head’s own, or a committee member confirms this closing.',
      );
    if (alert.state !== 'closing to be confirmed')
      return conflict('No closing waits for a second person here.');
    return ok(
      command.confirm
        ? { state: 'closed', what: 'Closing confirmed', text: command.text }
        : { state: 'taken', what: 'Closing not confirmed', text: command.text },
    );
  });
};

/** Whether the person's word on a closing counts, whoever asked for it. */
export const isSecondPerson = (
  person: Person,
  alert: { readonly deskHeadId: number | null; readonly ownerId: number },
): boolean =>
  person.roles.includes('committee member') ||
  (alert.deskHeadId === person.id && alert.ownerId !== person.id);

/** What the step makes of the alert. Whoever works it has taken it, putting it off aside. */
function plan(alert: AlertRecord, step: AlertStep, person: Person, today: PlainDate): Planned {
  const taking = alert.takenBy === null ? { takenBy: person.id } : {};
  switch (step.step) {
    case 'take':
      return ok({ state: 'taken', what: 'Taken', text: '', takenBy: person.id });
    case 'wait': {
      const state = `waiting for ${step.waitFor}` as const;
      return ok({ ...taking, state, what: `Waiting for ${step.waitFor}`, text: step.text });
    }
    case 'assess':
      return ok({ ...taking, state: 'assessed', what: 'Assessed', text: step.text });
    case 'put off':
      return planPuttingOff(step, today);
    case 'close': {
      const reason = CLOSING_REASONS.find((listed) => listed.code === step.reason);
      if (!reason) return conflict('That reason is not in the list.');
      const second = alert.severity === 'urgent' || reason.secondPerson;
      return ok({
        ...taking,
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

function planPuttingOff({ until, text }: { until: string; text: string }, today: PlainDate): Planned {
  if (until <= today || until > addDays(today, PUT_OFF_MOST_DAYS)) {
    const message = `Choose a day from tomorrow to ${PUT_OFF_MOST_DAYS} days ahead.`;
    return err({
      kind: 'invalid',
      detail: `${message} Nothing was changed.`,
      errors: [{ field: 'until', code: 'invalid', message }],
    });
  }
  return ok({ state: 'put off', what: `Put off until ${until}`, text, putOffUntil: until });
}

interface MoveRequest {
  readonly id: number;
  readonly version: number;
  readonly verb: string;
  readonly right: Action;
  readonly command: unknown;
}

/** Found, as it was seen, allowed and fitting, in this order; then one event, one change of the desk, one audit entry. */
async function move(
  actor: PersonActor,
  { id, version, verb, right, command }: MoveRequest,
  decide: (tx: Transaction, alert: AlertRecord) => Planned | Promise<Planned>,
): Promise<Outcome<AlertMoved>> {
  return write(actor, verb, { id, version, command }, async (tx) => {
    const alert = await findAlertForUpdate(tx, id, deskScope(actor.person, right));
    if (!alert) return err({ kind: 'not-found', what: 'alert' });
    if (alert.version !== version)
      return err({
        kind: 'stale',
        detail: `Somebody changed this alert since you opened it: it is ${alert.state}. Nothing was changed. Look again and repeat if still right.`,
        currentVersion: alert.version,
      });
    const step = await decide(tx, alert);
    if (!step.ok) return step;
    if (!(await moveAlert(tx, { alert, personId: actor.person.id, now: actor.now, ...step.value })))
      return notAllowed('You asked for this closing; another person confirms it.');
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
