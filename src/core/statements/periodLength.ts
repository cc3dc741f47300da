/** Flows of odd length set against a year: notes and agreed formulas, never a tested figure of their own accord. */
import { daysBetween } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import type { InputUsed } from './reading.ts';
import type { Statement } from './statement.ts';

const DAYS_OF_52_WEEKS = 364;
const WEEKS_OF_LONG_YEAR = 53;
/** A calendar year's, in a leap year; years of 53 weeks have 371. */
export const DAYS_OF_LONGEST_YEAR = 366;

/**
 * A flow of some months set to a year, only where the agreement provides for it. Source: methods.md A3.
 *
 * @example annualisedByMonths(decimal('7.2'), 9) // => 9.6
 */
export const annualisedByMonths = (value: Decimal, months: number): Decimal => value.times(12).div(months);

/**
 * The same by days: x basis / days, the basis (365, 360) being the agreement's.
 *
 * @example annualisedByDays(decimal(73), 73, 365) // => 365
 */
export const annualisedByDays = (value: Decimal, days: number, basis: number): Decimal =>
  value.times(basis).div(days);

/**
 * The 52-week equivalent of a flow of some weeks: a note beside the reported figure, which is what is tested.
 * Source: methods.md A3.
 *
 * @example equivalentOf52Weeks(decimal('10.6'), 53) // => 10.4
 */
export const equivalentOf52Weeks = (value: Decimal, weeks: number): Decimal =>
  value.times(DAYS_OF_52_WEEKS).div(weeks * 7);

export interface LengthInWeeks {
  readonly weeks: number;
  readonly days: number;
  readonly flag: '53-week LTM' | null;
}

/**
 * The length of twelve months made of quarters of whole weeks, flagged where there are 53.
 *
 * @example lengthOfQuarters([13, 13, 13, 14]) // => { weeks: 53, days: 371, flag: '53-week LTM' }
 */
export function lengthOfQuarters(quarterWeeks: readonly number[]): LengthInWeeks {
  const weeks = quarterWeeks.reduce((sum, each) => sum + each, 0);
  return { weeks, days: weeks * 7, flag: weeks === WEEKS_OF_LONG_YEAR ? '53-week LTM' : null };
}

/**
 * The days that the flows of a result span, each counted as it enters (twelve months take the year to date a year
 * earlier away); null where nothing flows. Source: methods.md A3.
 *
 * @example daysOfFlow(statements, test.inputs) // => 365
 */
export function daysOfFlow(statements: readonly Statement[], inputs: readonly InputUsed[]): number | null {
  const line = inputs.find(({ months }) => months > 0)?.line;
  if (line === undefined) return null;
  let days = 0;
  for (const input of inputs) {
    const statement = input.line === line && statements.find(({ id }) => id === input.statementId);
    if (statement) days += input.sign * (daysBetween(statement.periodStart, statement.periodEnd) + 1);
  }
  return days;
}

/**
 * Days in words, as weeks where they are whole ones.
 *
 * @example lengthInWords(371) // => '53 weeks (371 days)'
 */
export const lengthInWords = (days: number): string =>
  days % 7 === 0 ? `${days / 7} weeks (${days} days)` : `${days} days`;
