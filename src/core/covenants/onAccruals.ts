/** Tests recomputed without the earnings that cash and peers do not show: methods.md B7 (b) to (d). */
import { MEASURES } from '../measures/index.ts';
import { ZERO, decimalFromDouble, type Decimal } from '../money/decimal.ts';
import { accrualHaircut, verdictWithoutEarnings } from './counterfactual.ts';
import type { Covenant } from './covenant.ts';
import type { Counterfactual, CovenantTest } from './covenantTest.ts';
import { hasResult } from './latestLiveTest.ts';

/** Earnings of twelve months that do not rest on cash as the peers' do, in whole units of the covenant's currency. */
export interface EarningsInDoubt {
  readonly unexplained: number;
  readonly workingCapital: number;
}

/**
 * A test with its counterfactuals on accruals beside the one without add-backs: (b) less unexplained accruals, (c)
 * less both, where there are add-backs, (d) less working-capital accruals beyond growth. Never less than nought is
 * taken out. Tests without earnings, and those without a result, do not move.
 *
 * @example withAccrualsTakenOut(test, covenant, { unexplained: 2e6, workingCapital: 0 }).counterfactuals.map(({ kind }) => kind) // => ['without unexplained accruals', 'on a cash basis']
 */
export function withAccrualsTakenOut(
  test: CovenantTest,
  covenant: Covenant,
  inDoubt: EarningsInDoubt,
): CovenantTest {
  const { numerator, denominator, level } = test;
  const measure = MEASURES[covenant.measure];
  if (!numerator || !level || !hasResult(test) || measure.earningsSide === null) return test;
  const { operator, roundingPlaces } = covenant;
  const without = (kind: Counterfactual['kind'], earningsTakenOut: Decimal): Counterfactual => {
    const sides = { numerator, denominator };
    const terms = { operator, level, roundingPlaces };
    const verdict = verdictWithoutEarnings(measure, sides, terms, earningsTakenOut);
    return {
      kind,
      earningsTakenOut,
      ratio: verdict.tested,
      outcome: verdict.outcome,
      breakEvenShare: null,
    };
  };
  const addBacks =
    test.counterfactuals.find(({ kind }) => kind === 'without add-backs')?.earningsTakenOut ?? ZERO;
  const haircut = accrualHaircut(decimalFromDouble(inDoubt.unexplained));
  return {
    ...test,
    counterfactuals: [
      ...test.counterfactuals,
      without('without unexplained accruals', haircut),
      ...(addBacks.isZero() ? [] : [without('without either', addBacks.plus(haircut))]),
      without('on a cash basis', accrualHaircut(decimalFromDouble(inDoubt.workingCapital))),
    ],
  };
}
