import type { Decimal } from '../money/decimal.ts';

/**
 * Tangible net worth = equity - goodwill - other intangibles + shareholder loans that are subordinated.
 * Same currency unit throughout. Source: methods.md A3.
 *
 * @example tangibleNetWorth({ equity, goodwill, otherIntangibles, subordinatedShareholderLoans })
 */
export const tangibleNetWorth = ({
  equity,
  goodwill,
  otherIntangibles,
  subordinatedShareholderLoans,
}: {
  readonly equity: Decimal;
  readonly goodwill: Decimal;
  readonly otherIntangibles: Decimal;
  readonly subordinatedShareholderLoans: Decimal;
}): Decimal => equity.minus(goodwill).minus(otherIntangibles).plus(subordinatedShareholderLoans);
