import { addMonths, type PlainDate } from '../calendar/plainDate.ts';

/**
 * Whole months between a valuation and a test date.
 *
 * @example valuationAgeMonths('2025-06-30', '2026-09-29') // => 14
 */
export function valuationAgeMonths(valuationDate: PlainDate, testDate: PlainDate): number {
  let months = 0;
  while (addMonths(valuationDate, months + 1) <= testDate) months += 1;
  return months;
}

/**
 * Why a loan-to-value test cannot be made on a valuation; null where it can. Source: methods.md A4.
 *
 * @example valuationTooOld({ valuationDate: '2023-06-30', testDate: '2025-12-31', mostMonths: 24 }) // => 'valuation older than 24 months'
 */
export const valuationTooOld = ({
  valuationDate,
  testDate,
  mostMonths,
}: {
  readonly valuationDate: PlainDate;
  readonly testDate: PlainDate;
  readonly mostMonths: number;
}): string | null =>
  addMonths(valuationDate, mostMonths) < testDate ? `valuation older than ${mostMonths} months` : null;
