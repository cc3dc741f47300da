import type { PlainDate } from '../calendar/plainDate.ts';
import { isMaximum } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import type { Bound } from '../covenants/headroom.ts';
import { MEASURES } from '../measures/index.ts';
import type { MeasureCode } from '../measures/measure.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { leverageOn } from './leverage.ts';

/** One covenant's result test by test, as the book's changes are taken from it. */
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
  /** The tested ratio; of an amount the amount itself, because changes are multiples of what was. */
  readonly ratio: number;
  /** False where earnings (or what carries a burden) are not positive: it has no meaning and counts as not met. */
  readonly hasEarnings: boolean;
  /** In force on the day, for looking back at what was said; null where there was none. */
  readonly level: number | null;
  /** Net leverage of the borrower on the day, by which it stands among its peers; null where it has no meaning. */
  readonly leverage?: number | null;
}

/**
 * The results of one covenant's tests. A test whose figures are missing is no point of the series, nor is one
 * without a charge to cover: nothing is a multiple of it.
 *
 * @example ratioSeries({ borrowerId: 1, sector: 'metal goods' }, [test], book)?.points[0]?.ratio // => 3
 */
export function ratioSeries(
  borrower: { readonly borrowerId: number; readonly sector: string },
  tests: readonly CovenantTest[],
  book: StatementBook,
): RatioSeries | null {
  const [first] = tests;
  if (!first) return null;
  return {
    ...borrower,
    covenantId: first.covenantId,
    measure: first.measure,
    bound: isMaximum(first.operator) ? 'most' : 'least',
    points: tests.flatMap((test) => {
      const result = resultOf(test);
      if (!result) return [];
      const { testDate, level } = test;
      return [
        { testDate, ...result, level: level?.toNumber() ?? null, leverage: leverageOn(book, test.testDate) },
      ];
    }),
  };
}

function resultOf({
  measure,
  numerator,
  denominator,
}: CovenantTest): Pick<RatioAt, 'ratio' | 'hasEarnings'> | null {
  if (!numerator) return null;
  switch (MEASURES[measure].shape) {
    case 'amount':
      return { ratio: numerator.toNumber(), hasEarnings: true };
    case 'burden':
      if (!denominator) return null;
      return denominator.gt(0)
        ? { ratio: numerator.div(denominator).toNumber(), hasEarnings: true }
        : { ratio: 0, hasEarnings: false };
    case 'cover':
      if (!denominator?.gt(0)) return null;
      return { ratio: numerator.div(denominator).toNumber(), hasEarnings: numerator.gt(0) };
  }
}
