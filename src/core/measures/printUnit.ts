/** A tested figure and a level in the unit of their measure, the same on screens, in mail and in sheets. */
import type { Decimal } from '../money/decimal.ts';
import {
  formatLevel,
  formatMoney,
  formatMoneyLevel,
  formatRatio,
  formatShare,
  type PrintOptions,
} from '../money/print.ts';
import { unreachable } from '../result.ts';
import type { MeasureUnit } from './measure.ts';

/**
 * A figure of a measure; beside a level with the digits that show the side of it.
 *
 * @example figureInUnit('share', decimal('0.65')) // => '65.0\u00a0%'
 */
export function figureInUnit(
  unit: MeasureUnit,
  value: Decimal,
  options: Pick<PrintOptions, 'beside'> = {},
): string {
  switch (unit) {
    case 'times':
      return formatRatio(value, options);
    case 'share':
      return formatShare(value, options);
    case 'money':
      return formatMoney(value, options);
    default:
      return unreachable(unit);
  }
}

/**
 * A level as the agreement states it, with every digit it has.
 *
 * @example levelInUnit('share', decimal('0.0825')) // => '8.25\u00a0%'
 */
export function levelInUnit(unit: MeasureUnit, level: Decimal): string {
  switch (unit) {
    case 'times':
      return formatLevel(level);
    case 'share':
      return formatShare(level, { places: Math.max(1, level.dp() - 2) });
    case 'money':
      return formatMoneyLevel(level);
    default:
      return unreachable(unit);
  }
}
