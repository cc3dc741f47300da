import { err, ok, type Result } from '../result.ts';
import { leastSquares } from './leastSquares.ts';
import { normalCdf, normalDensity } from './normalDistribution.ts';
import type { StatisticsError } from './statisticsError.ts';

export interface BinaryResponseFit {
  /** The constant first. */
  readonly coefficients: readonly number[];
  readonly logLikelihood: number;
  readonly n: number;
  readonly steps: number;
  readonly method: 'maximum likelihood by Fisher scoring';
}

export type Link = 'probit' | 'logit';

const MOST_STEPS = 50;

/**
 * Probability of a yes as a function of regressors, with a constant, by maximum likelihood.
 *
 * Each step of Fisher scoring is a weighted least squares, solved by QR. Errors: those of leastSquares, and
 * `no-convergence` where the outcomes are perfectly separated, which has no finite answer. Checked against Greene's
 * published probit of the Spector & Mazzeo data.
 *
 * @example binaryResponse('logit', [false, true, false, true], [[0, 0, 1, 1]]).value.n // => 4
 */
export function binaryResponse(
  link: Link,
  isYes: readonly boolean[],
  columns: readonly (readonly number[])[],
): Result<BinaryResponseFit, StatisticsError> {
  const n = isYes.length;
  const design = [new Array<number>(n).fill(1), ...columns];
  let coefficients: readonly number[] = design.map(() => 0);
  for (let step = 1; step <= MOST_STEPS; step += 1) {
    const points = isYes.map((yes, row) => workingPoint(link, yes, indexAt(design, coefficients, row)));
    const fit = leastSquares(
      points.map((point) => point.weight * point.response),
      design.map((column) => column.map((value, row) => value * points[row]!.weight)),
      { constant: false },
    );
    if (!fit.ok) return fit;
    const next = fit.value.coefficients;
    const change = Math.max(...next.map((value, k) => Math.abs(value - coefficients[k]!)));
    coefficients = next;
    if (!Number.isFinite(change)) break;
    if (change < 1e-10 * (1 + Math.max(...next.map(Math.abs)))) {
      const logLikelihood = isYes.reduce((sum, yes, row) => {
        const chance = probability(link, indexAt(design, coefficients, row));
        return sum + Math.log(yes ? chance : 1 - chance);
      }, 0);
      return ok({
        coefficients,
        logLikelihood,
        n,
        steps: step,
        method: 'maximum likelihood by Fisher scoring',
      });
    }
  }
  return err({ kind: 'no-convergence', steps: MOST_STEPS });
}

const indexAt = (
  design: readonly (readonly number[])[],
  coefficients: readonly number[],
  row: number,
): number => design.reduce((sum, column, k) => sum + column[row]! * coefficients[k]!, 0);

const probability = (link: Link, index: number): number =>
  link === 'probit' ? normalCdf(index) : 1 / (1 + Math.exp(-index));

/** McCullagh & Nelder's adjusted response and the root of its weight. */
function workingPoint(link: Link, yes: boolean, index: number): { response: number; weight: number } {
  const chance = probability(link, index);
  const slope = link === 'probit' ? normalDensity(index) : chance * (1 - chance);
  return {
    response: index + ((yes ? 1 : 0) - chance) / slope,
    weight: slope / Math.sqrt(chance * (1 - chance)),
  };
}
