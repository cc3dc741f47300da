/** The amount at which a test would stand elsewhere, in words: what would change an alert. */
import { isMaximum } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { amountAtLevel } from '../covenants/headroom.ts';
import { MEASURES } from '../measures/index.ts';
import type { MeasureCode } from '../measures/measure.ts';
import { decimal, ZERO, type Decimal } from '../money/decimal.ts';
import { formatMoney } from '../money/print.ts';

/**
 * The borrower's earnings in the test, or the tested amount where it has none.
 *
 * @example subjectAmount(test) // => 13000000
 */
export const subjectAmount = ({ measure, numerator, denominator, earnings }: CovenantTest): Decimal | null =>
  earnings ?? (isOnDenominator(measure) ? denominator : numerator);

/** Earnings, value and net worth carry a burden; what covers and an amount stand above. */
const isOnDenominator = (measure: MeasureCode): boolean => MEASURES[measure].shape === 'burden';

/**
 * The earnings (or tested amount) at which a share of them is left before the test is not met; nought is at the
 * level itself. Null where the sides are not known.
 *
 * @example amountThatLeaves(test, decimal('3.9'), decimal('0.5')) // => 20000000
 */
export function amountThatLeaves(test: CovenantTest, level: Decimal, share: Decimal): Decimal | null {
  const { numerator, denominator, earnings, operator } = test;
  if (!numerator) return null;
  const { shape, earningsSide } = MEASURES[test.measure];
  const atLevel = amountAtLevel(shape, { numerator, denominator }, level);
  if (!atLevel) return null;
  const left = decimal(1).minus(share);
  if (shape === 'amount' && isMaximum(operator)) return atLevel.times(left);
  // Of a cash cover the earnings are told, not the cash that covers: what lies between the two stays as it is.
  const besideEarnings = earnings && earningsSide === 'numerator' ? earnings.minus(numerator) : ZERO;
  return atLevel.plus(besideEarnings).div(left);
}

/**
 * 'EBITDA of 12.9m instead of 12.0m (0.9m more)'.
 *
 * @example insteadOf(test, decimal(14e6)) // => 'EBITDA of 14.0m instead of 13.0m (1.0m more)'
 */
export function insteadOf(test: CovenantTest, needed: Decimal): string {
  const { subject } = MEASURES[test.measure].words;
  const amount = subjectAmount(test);
  if (!amount) return `${subject} of ${formatMoney(needed)}`;
  const by = needed.minus(amount);
  return `${subject} of ${formatMoney(needed, { beside: amount })} instead of ${formatMoney(amount, { beside: needed })} (${formatMoney(by.abs())} ${by.lt(0) ? 'less' : 'more'})`;
}

/**
 * ', or 3.0m less net debt', where the other side can be named and would have to shrink.
 *
 * @example orOtherSide(nightOf({ ebitda: 12, debt: 51, cash: 6 }).tests[0]) // => ', or 3 less net debt'
 */
export function orOtherSide({ measure, headroom }: CovenantTest): string {
  const { otherSide } = MEASURES[measure].words;
  const { otherSideMayRise: rise } = headroom;
  return otherSide && rise?.lt(0) ? `, or ${formatMoney(rise.abs())} less ${otherSide}` : '';
}
