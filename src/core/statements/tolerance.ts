/** How far two figures that should be the same may lie apart: methods.md A2. */
import { decimal, Decimal } from '../money/decimal.ts';
import type { Tie } from './statement.ts';

export const ROUNDING_SHARE = decimal('0.0001');
/** Up to this share of the reference a difference is shown and taken; above, the figures do not tie. */
export const WARNING_SHARE = decimal('0.005');

/**
 * The difference that rounding explains: the larger of half a rounding unit for each rounded figure and 0.01 % of
 * the reference (total assets for balances and cash, revenue for income).
 *
 * In the currency units of the reference. Source: methods.md A2.
 *
 * @example roundingTolerance({ roundingUnit: decimal(1), figures: 3, reference: decimal(100000) }) // => 10
 */
export function roundingTolerance({
  roundingUnit,
  figures,
  reference,
}: {
  readonly roundingUnit: Decimal;
  readonly figures: number;
  readonly reference: Decimal;
}): Decimal {
  return Decimal.max(roundingUnit.times(figures).div(2), reference.abs().times(ROUNDING_SHARE));
}

/**
 * Ties within rounding; a warning up to 0.5 % of the reference; above that the figures do not tie.
 *
 * @example tieOf(decimal(3), decimal(1), decimal(1000)) // => 'warning'
 */
export function tieOf(
  difference: Decimal,
  tolerance: Decimal,
  reference: Decimal,
): Exclude<Tie, 'not-checked'> {
  if (difference.abs().lte(tolerance)) return 'ties';
  return difference.abs().lte(reference.abs().times(WARNING_SHARE)) ? 'warning' : 'does-not-tie';
}
