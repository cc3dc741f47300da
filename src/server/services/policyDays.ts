import type { PlainDate } from '../../core/calendar/plainDate.ts';

/**
 * The earliest day from which a change of the policy may hold: not before today, so that nothing is applied to days
 * that are over, and not before the version that it follows, so that versions come into force in their order.
 */
export const earliestChange = (today: PlainDate, latestFrom: PlainDate | null): PlainDate =>
  latestFrom !== null && latestFrom > today ? latestFrom : today;
