import type { Decimal } from '../money/decimal.ts';

/**
 * Tangible net worth = equity - goodwill - other intangibles + shareholder loans that are subordinated.
 * Same currency unit throughout. Source: methods.md A3.
 *
 * @example tangibleNetWorth({ equity: decimal(40), goodwill: decimal(12), otherIntangibles: decimal(3), subordinatedShareholderLoans: decimal(5) }) // => 30
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
