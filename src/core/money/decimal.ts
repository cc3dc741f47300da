/**
 * The only door to decimal.js.
 *
 * 34 significant digits, as IEEE 754 decimal128 has, so that a sum of DECIMAL(20,4) amounts is exact and a
 * quotient carries far more digits than any agreement compares. Rounding half up is what agreements mean by
 * "rounded to two decimal places"; it is applied only where an agreement rounds.
 */
import { Decimal as DecimalBase } from 'decimal.js';

export const Decimal = DecimalBase.clone({
  precision: 34,
  rounding: DecimalBase.ROUND_HALF_UP,
  toExpNeg: -30,
  toExpPos: 40,
});
export type Decimal = DecimalBase;

/**
 * A decimal from exact text or a whole count.
 *
 * @example decimal('0.1').plus('0.2') // => 0.3
 */
export const decimal = (value: string | number | Decimal): Decimal => new Decimal(value);

export const ZERO: Decimal = new Decimal(0);

/**
 * The decimal that a spreadsheet cell shows: its binary double at 15 significant digits, which is what
 * spreadsheets store and print (0.1 + 0.2 becomes 0.3, not 0.30000000000000004).
 *
 * Common practice, no source. Throws RangeError for NaN and infinities, which are no amounts.
 *
 * @example decimalFromDouble(0.1 + 0.2).toString() // => '0.3'
 */
export function decimalFromDouble(value: number): Decimal {
  if (!Number.isFinite(value)) throw new RangeError(`not an amount: ${value}`);
  return new Decimal(value.toPrecision(15));
}
