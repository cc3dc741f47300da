/** By when an alert is to be assessed and decided, in business days from the day it is raised or worsens. */
import { daysOn } from '../calendar/deadline.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import type { AlertKind, Severity } from './alert.ts';

export interface AlertClock {
  /** Business days to the first assessment; null where none is asked. */
  readonly assessWithin: number | null;
  readonly decideWithin: number;
}

/** Desk practice, no source: the escalation clock's rows "urgent", "soon" and "note". */
export const CLOCK_BY_SEVERITY: Readonly<Record<Severity, AlertClock>> = {
  urgent: { assessWithin: 3, decideWithin: 10 },
  soon: { assessWithin: 10, decideWithin: 20 },
  note: { assessWithin: null, decideWithin: 20 },
};

/** A suspected failure has its own, shorter row: a second person verifies the figures, then the decision. */
export const CLOCK_OF_TEST_NOT_MET: AlertClock = { assessWithin: 2, decideWithin: 5 };

export interface AlertDue {
  readonly assessBy: PlainDate | null;
  /** The alert's due date. */
  readonly decideBy: PlainDate;
}

/**
 * The days by which an alert raised on `from` is to be assessed and decided. The due date of an alert is the day
 * of the decision, since that is what ends it; the assessment before it is asked for in words.
 *
 * Source: desk practice (escalation clock of the desk, confirmed by no text).
 *
 * @example alertDue('test not met', 'urgent', '2026-12-01') // => { assessBy: '2026-12-03', decideBy: '2026-12-08' }
 */
export function alertDue(kind: AlertKind, severity: Severity, from: PlainDate): AlertDue {
  const clock = kind === 'test not met' ? CLOCK_OF_TEST_NOT_MET : CLOCK_BY_SEVERITY[severity];
  return {
    assessBy: clock.assessWithin === null ? null : daysOn(from, clock.assessWithin, 'business'),
    decideBy: daysOn(from, clock.decideWithin, 'business'),
  };
}
