/** A test in words, the same on screens, in mail and in sheets. */
import { MEASURES } from '../measures/index.ts';
import type { MeasureCode } from '../measures/measure.ts';
import type { Decimal } from '../money/decimal.ts';
import { formatLevel, formatMoney, formatMoneyLevel, formatRatio } from '../money/print.ts';
import type { Operator } from './covenant.ts';
import type { CovenantTest } from './covenantTest.ts';

export const OPERATOR_WORDS: Readonly<Record<Operator, string>> = {
  '<=': 'at most',
  '<': 'less than',
  '>=': 'at least',
  '>': 'more than',
};

/**
 * A tested ratio or amount in its unit, with the digits that show the side of the level that it is on.
 *
 * @example testedInWords('net-leverage', decimal('3.4512'), decimal('3.5')) // => '3.45x'
 */
export const testedInWords = (measure: MeasureCode, tested: Decimal, level: Decimal | null): string =>
  MEASURES[measure].unit === 'times'
    ? formatRatio(tested, { beside: level })
    : formatMoney(tested, { beside: level });

/**
 * A level in its measure's unit, with every digit that a ratio's level has.
 *
 * @example levelInWords('minimum-liquidity', decimal(5_250_000)) // => '5.25m'
 */
export const levelInWords = (measure: MeasureCode, level: Decimal): string =>
  MEASURES[measure].unit === 'times' ? formatLevel(level) : formatMoneyLevel(level);

/**
 * A test with its level: 'Net leverage 3.45x, at most 3.50x'.
 *
 * @example testInWords(test) // => 'Net leverage 3.00x, at most 3.50x'
 */
export function testInWords({
  measure,
  tested,
  level,
  operator,
}: Pick<CovenantTest, 'measure' | 'tested' | 'level' | 'operator'>): string {
  const label = MEASURES[measure].label;
  const result = tested ? `${label} ${testedInWords(measure, tested, level)}` : `${label} has no meaning`;
  return level ? `${result}, ${OPERATOR_WORDS[operator]} ${levelInWords(measure, level)}` : result;
}
