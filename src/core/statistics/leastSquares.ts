import { err, ok, type Result } from '../result.ts';
import { factorise, inverseDiagonal, solveUpper } from './householder.ts';
import type { StatisticsError } from './statisticsError.ts';

export interface LeastSquares {
  /** In the order of the columns; the constant first where one was asked for. */
  readonly coefficients: readonly number[];
  readonly standardErrors: readonly number[];
  readonly residuals: readonly number[];
  /** Root of the residual sum of squares over the degrees of freedom. */
  readonly residualStandardDeviation: number;
  readonly degreesOfFreedom: number;
  /** About the mean with a constant, about zero without; null where the response has no spread. */
  readonly rSquared: number | null;
  readonly n: number;
  readonly method: 'ordinary least squares by Householder QR with column pivoting';
}

/**
 * Ordinary least squares. `columns` holds one array per regressor, each as long as `response`; units are the
 * caller's.
 *
 * Solved by QR and never through X'X, which would square the condition of near-collinear regressors: NIST's
 * Longley data lose half their digits that way. Errors: `too-few-points` unless at least one degree of freedom is
 * left, `rank-deficient` where a column is a combination of the others. Checked against NIST StRD certified values.
 *
 * @example leastSquares([1, 3, 5, 7], [[0, 1, 2, 3]], { constant: true }).value.n // => 4
 */
export function leastSquares(
  response: readonly number[],
  columns: readonly (readonly number[])[],
  options: { readonly constant: boolean },
): Result<LeastSquares, StatisticsError> {
  const n = response.length;
  const design = options.constant ? [new Array<number>(n).fill(1), ...columns] : columns;
  if (design.some((column) => column.length !== n))
    throw new RangeError('leastSquares needs columns of one length');
  if (n <= design.length) return err({ kind: 'too-few-points', needed: design.length + 1, given: n });

  const factors = factorise(design, response);
  if (factors.rank < design.length) {
    return err({ kind: 'rank-deficient', rank: factors.rank, columns: design.length });
  }
  const coefficients = solveUpper(factors);
  const residuals = response.map(
    (value, row) => value - design.reduce((sum, column, k) => sum + column[row]! * coefficients[k]!, 0),
  );
  const degreesOfFreedom = n - design.length;
  const squaredResiduals = sumOfSquares(residuals);
  const variance = squaredResiduals / degreesOfFreedom;
  const mean = options.constant ? response.reduce((sum, value) => sum + value, 0) / n : 0;
  const total = sumOfSquares(response.map((value) => value - mean));
  return ok({
    coefficients,
    standardErrors: inverseDiagonal(factors).map((diagonal) => Math.sqrt(diagonal * variance)),
    residuals,
    residualStandardDeviation: Math.sqrt(variance),
    degreesOfFreedom,
    rSquared: total === 0 ? null : 1 - squaredResiduals / total,
    n,
    method: 'ordinary least squares by Householder QR with column pivoting',
  });
}

const sumOfSquares = (values: readonly number[]): number =>
  values.reduce((sum, value) => sum + value * value, 0);
