/** Financial years and their quarters. A period end within six days of a month end belongs to that month. */
import { addDays, addMonthsToMonthEnd, monthCount, monthEnd, type PlainDate } from './plainDate.ts';

/** Years of 52 or 53 weeks end on a weekday near the month end: methods.md A3. */
const DAYS_NEAR_MONTH_END = 6;

export interface FiscalPosition {
  /** The calendar year in which the financial year ends. */
  readonly fiscalYear: number;
  readonly quarter: 1 | 2 | 3 | 4;
  /** Whole months since the last year end, 1 to 12. */
  readonly monthsIntoYear: number;
}

/**
 * The month end that a period end stands for: the nearest one where it lies within six days, else the day itself.
 *
 * Source: the rule for years of 52 and 53 weeks, methods.md A3.
 *
 * @example reportingMonthEnd('2025-01-03') // => '2024-12-31'
 */
export function reportingMonthEnd(date: PlainDate): PlainDate {
  const known = MONTH_ENDS.get(date);
  if (known !== undefined) return known;
  const found = nearestMonthEnd(date);
  MONTH_ENDS.set(date, found);
  return found;
}

// Asked of every statement for every figure that is read; days are few, so what was found is kept.
const MONTH_ENDS = new Map<PlainDate, PlainDate>();

function nearestMonthEnd(date: PlainDate): PlainDate {
  const day = Number(date.slice(8));
  const own = monthEnd(date);
  if (Number(own.slice(8)) - day <= DAYS_NEAR_MONTH_END) return own;
  return day <= DAYS_NEAR_MONTH_END ? addDays(date, -day) : date;
}

/**
 * Whether two period ends stand for the same month end.
 *
 * @example isSamePeriodEnd('2025-01-03', '2024-12-31') // => true
 */
export const isSamePeriodEnd = (one: PlainDate, other: PlainDate): boolean =>
  one === other ||
  (Math.abs(monthCount(one) - monthCount(other)) <= 1 && reportingMonthEnd(one) === reportingMonthEnd(other));

/**
 * Where a period end lies in the financial year: its year is the calendar year in which it ends, its quarter is
 * the months since the last year end divided by three, rounded up.
 *
 * `fiscalYearEndMonth` counts 1 to 12. Source: methods.md A3.
 *
 * @example fiscalPosition('2025-06-30', 3) // => { fiscalYear: 2026, quarter: 1, monthsIntoYear: 3 }
 */
export function fiscalPosition(periodEnd: PlainDate, fiscalYearEndMonth: number): FiscalPosition {
  const date = reportingMonthEnd(periodEnd);
  const [year, month] = [Number(date.slice(0, 4)), Number(date.slice(5, 7))];
  const monthsIntoYear = ((month - fiscalYearEndMonth + 11 + 12) % 12) + 1;
  return {
    fiscalYear: month > fiscalYearEndMonth ? year + 1 : year,
    quarter: Math.ceil(monthsIntoYear / 3) as 1 | 2 | 3 | 4,
    monthsIntoYear,
  };
}

/**
 * The last day of the financial year before the one that `periodEnd` lies in.
 *
 * @example lastYearEndBefore('2026-09-30', 3) // => '2026-03-31'
 */
export function lastYearEndBefore(periodEnd: PlainDate, fiscalYearEndMonth: number): PlainDate {
  const { monthsIntoYear } = fiscalPosition(periodEnd, fiscalYearEndMonth);
  return addMonthsToMonthEnd(reportingMonthEnd(periodEnd), -monthsIntoYear);
}

/**
 * The period end so many months earlier, as a month end.
 *
 * @example monthsBefore('2026-05-31', 3) // => '2026-02-28'
 */
export const monthsBefore = (periodEnd: PlainDate, months: number): PlainDate =>
  addMonthsToMonthEnd(reportingMonthEnd(periodEnd), -months);
