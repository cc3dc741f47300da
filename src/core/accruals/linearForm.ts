/** A published linear model by the names of its terms: fitted on one cross-section, residual of any firm. */
import type { Result } from '../result.ts';
import { leastSquares, type LeastSquares } from '../statistics/leastSquares.ts';
import type { StatisticsError } from '../statistics/statisticsError.ts';

export interface LinearForm<Term extends string> {
  readonly response: Term;
  readonly regressors: readonly Term[];
  /** What the residual is taken with, where the paper fits with one term and predicts with another. */
  readonly predictors?: readonly Term[];
  readonly constant: boolean;
}

export type Terms<Term extends string> = Readonly<Record<Term, number>>;

/**
 * The form fitted on rows of terms. Errors: those of leastSquares.
 *
 * @example fitForm({ response: 'y', regressors: ['x'], constant: true }, [{ y: 1, x: 0 }, { y: 3, x: 1 }, { y: 5, x: 2 }]).value.coefficients.length // => 2
 */
export const fitForm = <Term extends string>(
  { response, regressors, constant }: LinearForm<Term>,
  rows: readonly Terms<Term>[],
): Result<LeastSquares, StatisticsError> =>
  leastSquares(
    rows.map((row) => row[response]),
    regressors.map((term) => rows.map((row) => row[term])),
    { constant },
  );

/**
 * What the coefficients leave of a response; `at` holds the predictors, which a caller may have drawn in.
 *
 * @example formResidual({ response: 'y', regressors: ['x'], constant: true }, [1, 2], 4, { y: 0, x: 1 }) // => 1
 */
export function formResidual<Term extends string>(
  { regressors, predictors, constant }: LinearForm<Term>,
  coefficients: readonly number[],
  response: number,
  at: Terms<Term>,
): number {
  const slopes = constant ? coefficients.slice(1) : coefficients;
  return (predictors ?? regressors).reduce(
    (left, term, place) => left - slopes[place]! * at[term],
    response - (constant ? coefficients[0]! : 0),
  );
}
