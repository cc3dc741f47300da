/** Equity put in to cure a failed leverage test: methods.md A6. */
import { isSamePeriodEnd, monthsBefore } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { unreachable } from '../result.ts';
import type { Decimal } from '../money/decimal.ts';

/** Whether the money counts as EBITDA, repays debt, or both. */
export type CureMethod = 'ebitda' | 'debt' | 'both';

/**
 * What it takes to bring leverage to its level: N / T - E as EBITDA, N - T E as debt, (N - T E) / (1 + T) as both.
 *
 * Currency units of the sides. Negative where nothing needs curing. The level must be positive.
 *
 * @example cureAmount({ debt: decimal(45), ebitda: decimal(12), level: decimal('3.5'), method: 'debt' }) // => 3
 */
export function cureAmount({
  debt,
  ebitda,
  level,
  method,
}: {
  readonly debt: Decimal;
  readonly ebitda: Decimal;
  readonly level: Decimal;
  readonly method: CureMethod;
}): Decimal {
  const short = debt.minus(level.times(ebitda));
  switch (method) {
    case 'ebitda':
      return debt.div(level).minus(ebitda);
    case 'debt':
      return short;
    case 'both':
      return short.div(level.plus(1));
    default:
      return unreachable(method);
  }
}

export interface CuresUsed {
  readonly usedInFour: number;
  readonly usedInLife: number;
  readonly available: boolean;
}

/**
 * How many cures were used in the four quarters up to the test date and over the life, and whether one is left.
 *
 * @example curesUsed({ curedQuarters: ['2026-03-31'], testDate: '2026-09-30', mostInFour: 2, mostInLife: 5 }) // => { usedInFour: 1, usedInLife: 1, available: true }
 */
export function curesUsed({
  curedQuarters,
  testDate,
  mostInFour,
  mostInLife,
}: {
  readonly curedQuarters: readonly PlainDate[];
  readonly testDate: PlainDate;
  readonly mostInFour: number;
  readonly mostInLife: number;
}): CuresUsed {
  const usedInFour = curedQuarters.filter((quarter) => countsOn(quarter, testDate)).length;
  const usedInLife = curedQuarters.length;
  return { usedInFour, usedInLife, available: usedInFour < mostInFour && usedInLife < mostInLife };
}

/**
 * Reported EBITDA with cure money that counts for its quarter and the next three, for covenant purposes only.
 *
 * @example ebitdaWithCure(decimal(12), '2026-09-30', { quarter: '2026-03-31', amount: decimal(1) }) // => 13
 */
export const ebitdaWithCure = (
  reported: Decimal,
  testDate: PlainDate,
  cure: { readonly quarter: PlainDate; readonly amount: Decimal },
): Decimal => (countsOn(cure.quarter, testDate) ? reported.plus(cure.amount) : reported);

/** The quarter itself or one of the three before the test date. */
const countsOn = (quarter: PlainDate, testDate: PlainDate): boolean =>
  [0, 3, 6, 9].some((months) => isSamePeriodEnd(quarter, monthsBefore(testDate, months)));
