/** How much of a blow a test can take before it is not met. */
import { isNotMet } from '../covenants/covenantTest.ts';
import { verdictOn, type Terms } from '../covenants/holdAgainstLevel.ts';
import type { Sides } from '../covenants/headroom.ts';
import { MEASURES } from '../measures/index.ts';
import { decimal, ZERO, type Decimal } from '../money/decimal.ts';
import { bendsOf, sidesAfter, type Blow, type Struck } from './blow.ts';

const ONE = decimal(1);

/**
 * The smallest share of a blow, nought to one, beyond which the test is not met; null where the whole of it leaves the
 * test met. The sides move in straight lines between their bends, so the share is exact, whatever the test does on
 * the way: earnings that turn to nought, cash that turns to debt.
 *
 * Compared unrounded: a test that only the agreement's rounding makes met can take nothing.
 *
 * @example shareBeforeNotMet({ ...covenant, sides: { numerator: decimal(42), denominator: decimal(15) }, cash: null }, { operator: '<=', level: decimal('3.5') }, { earnings: decimal(15), cash: decimal(0), interest: decimal(0) }) // => 0.2
 */
export function shareBeforeNotMet(
  struck: Struck,
  { operator, level }: Pick<Terms, 'operator' | 'level'>,
  blow: Blow,
): Decimal | null {
  const measure = MEASURES[struck.measure];
  const corners = [ZERO, ...bendsOf(struck, blow), ONE];
  for (let k = 1; k < corners.length; k += 1) {
    const [from, to] = [corners[k - 1]!, corners[k]!];
    const stretch = { from, to, start: sidesAfter(struck, blow, from), end: sidesAfter(struck, blow, to) };
    const cuts = cutsOf(stretch, level, measure.shape);
    for (let at = 1; at < cuts.length; at += 1) {
      const middle = cuts[at - 1]!.plus(cuts[at]!).div(2);
      const verdict = verdictOn(measure, sidesOn(stretch, middle), { operator, level, roundingPlaces: null });
      if (isNotMet(verdict.outcome)) return cuts[at - 1]!;
    }
  }
  return null;
}

/** A part of the way on which both sides move in straight lines. */
interface Stretch {
  readonly from: Decimal;
  readonly to: Decimal;
  readonly start: Sides;
  readonly end: Sides;
}

/** Where the verdict can change: a side turns to nought, or the test stands at its level. */
function cutsOf(stretch: Stretch, level: Decimal, shape: 'burden' | 'cover' | 'amount'): readonly Decimal[] {
  const { from, to, start, end } = stretch;
  const gap = ({ numerator, denominator }: Sides): Decimal =>
    numerator.minus(shape === 'amount' || !denominator ? level : level.times(denominator));
  const zeros = [
    zeroBetween(start.numerator, end.numerator),
    start.denominator && end.denominator ? zeroBetween(start.denominator, end.denominator) : null,
    zeroBetween(gap(start), gap(end)),
  ];
  const inside = zeros.flatMap((zero) => (zero ? [from.plus(to.minus(from).times(zero))] : []));
  return [from, ...inside.sort((a, b) => a.comparedTo(b)), to];
}

/** Where a straight line from one value to another crosses nought, as a share of the way. */
function zeroBetween(start: Decimal, end: Decimal): Decimal | null {
  if (start.isZero() || end.isZero() || start.isNegative() === end.isNegative()) return null;
  return start.div(start.minus(end));
}

function sidesOn({ from, to, start, end }: Stretch, at: Decimal): Sides {
  const share = at.minus(from).div(to.minus(from));
  const between = (one: Decimal, other: Decimal): Decimal => one.plus(other.minus(one).times(share));
  return {
    numerator: between(start.numerator, end.numerator),
    denominator: start.denominator && end.denominator ? between(start.denominator, end.denominator) : null,
  };
}
