/** Which alerts a person reads of this morning, in which block, and what is asked of each. */
import { alertDue } from '../../core/alerts/clock.ts';
import type { AlertState } from '../../core/alerts/alert.ts';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { unreachable } from '../../core/result.ts';
import { ALERT_EVENTS } from '../db/repositories/alerts.ts';
import type { DigestAlert } from '../db/repositories/digestAlerts.ts';
import { DIGEST_BLOCKS, type DigestBlockName } from '../mail/digest.ts';

export interface DigestDay {
  readonly businessDate: PlainDate;
  /** The business date of the digest before this one; what fell due since then is overdue for the first time. */
  readonly since: PlainDate | null;
  /** False where an earlier attempt of the date has told of them already. */
  readonly tellsDueDates: boolean;
}

export interface BlockedAlerts {
  readonly blocks: ReadonlyMap<DigestBlockName, readonly DigestAlert[]>;
  /** Open, overdue and told of before: a count. */
  readonly stillOverdue: number;
  /** Open with new figures of the same severity: a count. */
  readonly newFigures: number;
  /** Open and in no block. */
  readonly unchanged: number;
}

/** The alerts stay in their order within a block. */
export function digestBlocks(alerts: readonly DigestAlert[], day: DigestDay): BlockedAlerts {
  const blocks = new Map<DigestBlockName, DigestAlert[]>(DIGEST_BLOCKS.map((name) => [name, []]));
  let [stillOverdue, newFigures, unchanged] = [0, 0, 0];
  for (const alert of alerts) {
    const name = blockOf(alert, day);
    if (name) blocks.get(name)?.push(alert);
    else if (alert.isOpen) {
      unchanged += 1;
      if (isOverdue(alert, day)) stillOverdue += 1;
      if (alert.events.includes(ALERT_EVENTS['new facts'])) newFigures += 1;
    }
  }
  return { blocks, stillOverdue, newFigures, unchanged };
}

const isOverdue = (alert: DigestAlert, day: DigestDay): boolean =>
  alert.state !== 'put off' && alert.dueOn < day.businessDate;

function blockOf(alert: DigestAlert, day: DigestDay): DigestBlockName | null {
  const had = (...words: DigestAlert['events']) => words.some((word) => alert.events.includes(word));
  const isRaised = had(ALERT_EVENTS.raised);
  if (!alert.isOpen) return !isRaised && had(ALERT_EVENTS.closed) ? 'Improved' : null;
  if (isRaised) return 'New';
  if (had(ALERT_EVENTS.gone) && alert.conditionGone) return 'Improved';
  if (had(ALERT_EVENTS.worsened, ALERT_EVENTS.back)) return 'Worse';
  if (day.tellsDueDates && alert.state !== 'put off') {
    if (alert.dueOn === day.businessDate) return 'Due today';
    if (isOverdue(alert, day) && (day.since === null || alert.dueOn >= day.since)) return 'Overdue';
  }
  return had(ALERT_EVENTS.improved) ? 'Improved' : null;
}

/** The next step, by when. */
export function askedOf(alert: DigestAlert, businessDate: PlainDate): string {
  if (!alert.isOpen) return 'Nothing: it closed by itself.';
  if (alert.conditionGone) return 'Confirm that the condition is gone, and close it with a reason.';
  const by =
    alert.dueOn < businessDate
      ? `; it was due on ${formatDay(alert.dueOn)}`
      : alert.dueOn === businessDate
        ? ' today'
        : ` by ${formatDay(alert.dueOn)}`;
  return stepOf(alert, businessDate, by);
}

function stepOf(alert: DigestAlert, businessDate: PlainDate, by: string): string {
  const state: AlertState = alert.state;
  switch (state) {
    case 'raised': {
      const { assessBy } = alertDue(alert.kind, alert.severity, businessDate);
      const assess =
        assessBy && assessBy < alert.dueOn ? ` assess by ${formatDay(assessBy)},` : ' assess it,';
      return `Take it,${assess} decide${by}.`;
    }
    case 'taken':
      return `Assess it and decide${by}.`;
    case 'waiting for borrower':
      return `Get the borrower’s answer and decide${by}.`;
    case 'waiting for analyst':
      return `Get the analyst’s answer and decide${by}.`;
    case 'assessed':
      return `Close it with a reason or propose what follows${by}.`;
    case 'put off':
      return `Put off; decide${by}.`;
    case 'carried into a proposal':
      return `Its proposal waits for a decision${by}.`;
    case 'closing to be confirmed':
      return `A second person confirms the closing${by}.`;
    case 'closed':
    case 'superseded':
      return 'Nothing.';
    default:
      return unreachable(state);
  }
}
