import { ZERO, type Decimal } from '../money/decimal.ts';
import { isMet, isNotMet, type Counterfactual } from './covenantTest.ts';
import { withEarnings } from './equityCure.ts';
import { amountAtLevel, type Sides } from './headroom.ts';
import { verdictOn, type Shaped, type Terms, type Verdict } from './holdAgainstLevel.ts';

/**
 * A haircut for accruals that the peers do not show: never less than nought, a negative residual is not added back.
 *
 * @example accrualHaircut(decimal(-2)) // => 0
 */
export const accrualHaircut = (unexplainedAccruals: Decimal): Decimal =>
  unexplainedAccruals.gt(0) ? unexplainedAccruals : ZERO;

/**
 * The test recomputed with earnings taken out. Interest and tax are left as they are. Source: methods.md B7.
 *
 * @example verdictWithoutEarnings(netLeverage, { numerator: decimal(42), denominator: decimal(13) }, { operator: '<=', level: decimal('3.5'), roundingPlaces: null }, decimal(2)).outcome // => 'not met'
 */
export const verdictWithoutEarnings = (
  measure: Shaped,
  sides: Sides,
  terms: Terms,
  takenOut: Decimal,
): Verdict => verdictOn(measure, withEarnings(measure, sides, takenOut.negated()), terms);

/**
 * Whether a test that is met rests on what was taken out: it would not have been met without.
 *
 * @example restsOn({ outcome: 'met' }, { outcome: 'not met' }) // => true
 */
export const restsOn = (reported: Pick<Verdict, 'outcome'>, without: Pick<Verdict, 'outcome'>): boolean =>
  isMet(reported.outcome) && isNotMet(without.outcome);

/**
 * The share of the add-backs that a test needs to be met: the earnings at which it stands at its level less the
 * earnings before add-backs, over the add-backs. Null where it is met without them, or not met with them.
 * Source: methods.md B7.
 *
 * @example breakEvenShare({ earningsNeeded: decimal(12), earningsBefore: decimal(11), addBacks: decimal(2) }) // => 0.5
 */
export function breakEvenShare({
  earningsNeeded,
  earningsBefore,
  addBacks,
}: {
  readonly earningsNeeded: Decimal;
  readonly earningsBefore: Decimal;
  readonly addBacks: Decimal;
}): Decimal | null {
  if (addBacks.lte(0)) return null;
  const share = earningsNeeded.minus(earningsBefore).div(addBacks);
  return share.lte(0) || share.gt(1) ? null : share;
}

/**
 * What the test would have come to without any add-backs. Empty where the covenant has none or rests on no
 * earnings. Source: methods.md B7(a).
 *
 * @example withoutAddBacks(netLeverage, { numerator: decimal(42), denominator: decimal(13) }, { operator: '<=', level: decimal('3.5'), roundingPlaces: null }, decimal(2))[0].breakEvenShare // => 0.5
 */
export function withoutAddBacks(
  measure: Shaped,
  sides: Sides,
  terms: Terms,
  addBacks: Decimal,
): readonly Counterfactual[] {
  if (addBacks.isZero() || measure.earningsSide === null) return [];
  const without = withEarnings(measure, sides, addBacks.negated());
  const verdict = verdictOn(measure, without, terms);
  const earningsBefore = measure.earningsSide === 'numerator' ? without.numerator : without.denominator;
  const earningsNeeded = amountAtLevel(measure.shape, sides, terms.level);
  const decides = restsOn(verdictOn(measure, sides, terms), verdict);
  return [
    {
      kind: 'without add-backs',
      earningsTakenOut: addBacks,
      ratio: verdict.tested,
      outcome: verdict.outcome,
      breakEvenShare:
        decides && earningsNeeded && earningsBefore
          ? breakEvenShare({ earningsNeeded, earningsBefore, addBacks })
          : null,
    },
  ];
}
