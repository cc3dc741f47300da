/** Figures in another currency: methods.md A3 (income at average rates, balance sheet at the closing rate). */
import { Decimal } from '../money/decimal.ts';

/** What a burden over earnings stands on, in the currency of the agreement. */
export interface TranslatedSides {
  readonly numerator: Decimal;
  readonly denominator: Decimal;
}

/**
 * Debt at the closing rate, earnings at the average rate: a gap opens between the two with no economic change. A
 * constant-rate clause gives the average rate for both. Rates are units of the agreement's currency for one unit.
 *
 * @example translatedSides({ debt: decimal(30), earnings: decimal(10), debtRate: decimal('1.15'), earningsRate: decimal('1.08') }) // => { numerator: 34.5, denominator: 10.8 }
 */
export const translatedSides = ({
  debt,
  earnings,
  debtRate,
  earningsRate,
}: {
  readonly debt: Decimal;
  readonly earnings: Decimal;
  readonly debtRate: Decimal;
  readonly earningsRate: Decimal;
}): TranslatedSides => ({ numerator: debt.times(debtRate), denominator: earnings.times(earningsRate) });

/**
 * Twelve months in another currency: the sum of the quarters, each at its own average rate.
 *
 * @example translatedQuarters([{ flow: decimal(10), averageRate: decimal('1.1') }, { flow: decimal(20), averageRate: decimal('1.2') }]) // => 35
 */
export const translatedQuarters = (
  quarters: readonly { readonly flow: Decimal; readonly averageRate: Decimal }[],
): Decimal => Decimal.sum(0, ...quarters.map(({ flow, averageRate }) => flow.times(averageRate)));
