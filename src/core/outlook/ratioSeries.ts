import type { PlainDate } from '../calendar/plainDate.ts';
import { isMaximum } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import type { Bound } from '../covenants/headroom.ts';
import type { MeasureCode } from '../measures/measure.ts';

/** One covenant's ratio test by test, as the book's changes are taken from it. */
export interface RatioSeries {
  readonly borrowerId: number;
  readonly covenantId: number;
  readonly sector: string;
  readonly measure: MeasureCode;
  readonly bound: Bound;
  /** Oldest first; tests without figures are left out. */
  readonly points: readonly RatioAt[];
}

export interface RatioAt {
  readonly testDate: PlainDate;
  readonly ratio: number;
  /** False where what carries the burden is not positive: the ratio has no meaning and counts as not met. */
  readonly hasEarnings: boolean;
  /** In force on the day, for looking back at what was said; null where there was none. */
  readonly level: number | null;
}

/**
 * The ratios of one covenant's tests. An amount has no ratio and makes no series; a test whose figures are missing is
 * no point of it.
 *
 * @example ratioSeries({ borrowerId: 1, sector: 'metal goods' }, [test])?.points[0]?.ratio // => 3
 */
export function ratioSeries(
  borrower: { readonly borrowerId: number; readonly sector: string },
  tests: readonly CovenantTest[],
): RatioSeries | null {
  const [first] = tests;
  if (!first) return null;
  const points = tests.flatMap(({ testDate, numerator, denominator, level }) => {
    if (!numerator || !denominator) return [];
    const hasEarnings = denominator.gt(0);
    const ratio = hasEarnings ? numerator.div(denominator).toNumber() : 0;
    return [{ testDate, ratio, hasEarnings, level: level?.toNumber() ?? null }];
  });
  const bound = isMaximum(first.operator) ? 'most' : 'least';
  return { ...borrower, covenantId: first.covenantId, measure: first.measure, bound, points };
}
