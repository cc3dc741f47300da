import { addMonthsToMonthEnd, daysBetween, type PlainDate } from '../calendar/plainDate.ts';

/**
 * The calendar quarter end that a borrower's quarter end is compared at: the nearest one, which is never more than
 * 45 days and a half away and brings years that end in February beside those that end in March.
 *
 * Source: methods.md B6, peers of the same quarter end within 45 days.
 *
 * @example comparisonQuarterEnd('2026-02-28') // => '2026-03-31'
 */
export function comparisonQuarterEnd(quarterEnd: PlainDate): PlainDate {
  const [year, month] = quarterEnd.split('-').map(Number) as [number, number];
  const own = addMonthsToMonthEnd(`${year}-01-01` as PlainDate, Math.ceil(month / 3) * 3 - 1);
  const before = addMonthsToMonthEnd(own, -3);
  return daysBetween(before, quarterEnd) < daysBetween(quarterEnd, own) ? before : own;
}
