import { chiSquaredUpperTail } from './chiSquared.ts';
import { normalCdf } from './normalDistribution.ts';
import { normalQuantile } from './normalQuantile.ts';

export interface CombinedPValue {
  readonly statistic: number;
  readonly pValue: number;
  readonly n: number;
  readonly method: 'Fisher' | 'Stouffer';
}

/**
 * Fisher's combination: -2 times the sum of the logs, chi-squared with twice as many degrees of freedom. Needs
 * independent p-values: with positive dependence it is too small. Throws RangeError unless each lies in (0, 1].
 *
 * Source: methods.md Part C 5.5; Fisher (1932), Statistical Methods for Research Workers.
 *
 * @example fisherCombination([0.03, 0.2, 0.008]).statistic // => 19.88861909411…
 */
export function fisherCombination(pValues: readonly number[]): CombinedPValue {
  assertPValues(pValues);
  const statistic = -2 * pValues.reduce((sum, p) => sum + Math.log(p), 0);
  return {
    statistic,
    pValue: chiSquaredUpperTail(statistic, 2 * pValues.length),
    n: pValues.length,
    method: 'Fisher',
  };
}

/**
 * Stouffer's combination of one-sided p-values, by the weights given. `correlation` is that of any two of the
 * underlying normal scores: 0 where they are independent. Throws RangeError unless each p-value lies in (0, 1] and
 * has a weight.
 *
 * Source: methods.md Part C 5.5; Stouffer et al. (1949), The American Soldier.
 *
 * @example stoufferCombination([0.03, 0.2, 0.008], [2, 1, 1]).pValue // => 0.00210032…
 */
export function stoufferCombination(
  pValues: readonly number[],
  weights: readonly number[] = pValues.map(() => 1),
  correlation = 0,
): CombinedPValue {
  assertPValues(pValues);
  if (weights.length !== pValues.length)
    throw new RangeError('stoufferCombination needs one weight a p-value');
  const weighted = pValues.reduce((sum, p, k) => sum - weights[k]! * normalQuantile(p), 0);
  const squares = weights.reduce((sum, weight) => sum + weight * weight, 0);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const variance = squares + correlation * (total * total - squares);
  const statistic = weighted / Math.sqrt(variance);
  return { statistic, pValue: normalCdf(-statistic), n: pValues.length, method: 'Stouffer' };
}

function assertPValues(pValues: readonly number[]): void {
  if (pValues.length === 0 || pValues.some((p) => !(p > 0 && p <= 1)))
    throw new RangeError('a combination needs p-values above 0 and at most 1');
}
