import { err, ok, type Result } from '../result.ts';
import { binomialLowerTail, binomialUpperTail } from './binomialDistribution.ts';
import { normalDensity } from './normalDistribution.ts';
import type { StatisticsError } from './statisticsError.ts';

export interface SignTest {
  /** Observations nearest to the cut-off that are counted; more than chosen where several are equally near. */
  readonly nearest: number;
  /** How many of them are at or above it. */
  readonly atOrAbove: number;
  readonly pTwoSided: number;
  /** That more are at or above than a coin would give. */
  readonly pAtLeast: number;
  readonly n: number;
  readonly method: 'Bugni & Canay, approximate sign test';
}

/**
 * Sign test on the q observations nearest to a cut-off: where the density is continuous there, each is as likely on
 * either side. q by `nearestToCount`; observations as near as the last of them count too, whatever their order.
 *
 * `too-few-points` below the least q that can reject, `no-spread` where all values are equal.
 * Source: methods.md Part C 3.4; Bugni & Canay (2021, Journal of Econometrics 221:138-159) and their program rdcont 2.0.
 *
 * @example approximateSignTest([-3, -2, -1, 1, 2, 3], 0, 0.05, 'one-sided').value.atOrAbove // => 3
 */
export function approximateSignTest(
  values: readonly number[],
  cutoff: number,
  alpha: number,
  sides: Sides,
): Result<SignTest, StatisticsError> {
  const n = values.length;
  const needed = leastCount(alpha, sides);
  if (n < needed) return err({ kind: 'too-few-points', needed, given: n });
  const mean = values.reduce((sum, value) => sum + value, 0) / n;
  const deviation = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (n - 1));
  if (!(deviation > 0)) return err({ kind: 'no-spread' });
  const chosen = Math.min(n, nearestToCount((cutoff - mean) / deviation, n, alpha, sides));
  const distances = Float64Array.from(values, (value) => Math.abs(value - cutoff)).sort();
  const farthest = distances[chosen - 1]!;
  const near = values.filter((value) => Math.abs(value - cutoff) <= farthest);
  const atOrAbove = near.filter((value) => value >= cutoff).length;
  return ok(signTestOf(atOrAbove, near.length, n));
}

/**
 * The same test where the counts are known.
 *
 * @example signTestOf(119, 218, 6559).pTwoSided // => 0.198037422…
 */
export function signTestOf(atOrAbove: number, nearest: number, n: number): SignTest {
  const pAtLeast = binomialUpperTail(atOrAbove, nearest, 0.5);
  const pAtMost = binomialLowerTail(atOrAbove, nearest, 0.5);
  return {
    nearest,
    atOrAbove,
    pTwoSided: Math.min(1, 2 * Math.min(pAtLeast, pAtMost)),
    pAtLeast,
    n,
    method: 'Bugni & Canay, approximate sign test',
  };
}

export type Sides = 'one-sided' | 'two-sided';

/**
 * How many observations to count: the rule of thumb C √N with C = (4 σ φ(c)² / φ(μ + σ))^(2/3) under a normal density,
 * then the count nearby whose attainable level is best. `cutoff` is in standard deviations from the mean.
 *
 * @example nearestToCount(0, 100, 0.05, 'one-sided') // => 30
 */
export function nearestToCount(cutoff: number, n: number, alpha: number, sides: Sides): number {
  const constant = ((4 * normalDensity(cutoff) ** 2) / normalDensity(1)) ** (2 / 3);
  return bestCountNear(Math.max(leastCount(alpha, sides), Math.ceil(constant * Math.sqrt(n))), alpha, sides);
}

/**
 * Within 4 ln q of a count, the one whose test comes nearest to the level without passing it: a coin's tail has steps.
 *
 * @example bestCountNear(223, 0.05, 'two-sided') // => 218
 */
export function bestCountNear(count: number, alpha: number, sides: Sides): number {
  const reach = Math.ceil(4 * Math.log(count));
  let best = count;
  let bestLevel = 0;
  for (let q = Math.max(count - reach, leastCount(alpha, sides)); q <= count + reach; q += 1) {
    const level = attainableTail(q, tailOf(alpha, sides));
    if (level > bestLevel) [best, bestLevel] = [q, level];
  }
  return best;
}

const tailOf = (alpha: number, sides: Sides): number => (sides === 'one-sided' ? alpha : alpha / 2);

/** Below this count not even all on one side is unusual enough. */
const leastCount = (alpha: number, sides: Sides): number =>
  Math.ceil(-Math.log(tailOf(alpha, sides)) / Math.LN2);

/** The largest tail of a fair coin in q throws that is at most `tail`. */
function attainableTail(q: number, tail: number): number {
  let low = -1;
  let high = Math.floor(q / 2);
  while (low < high) {
    const middle = Math.ceil((low + high) / 2);
    if (binomialLowerTail(middle, q, 0.5) <= tail) low = middle;
    else high = middle - 1;
  }
  return binomialLowerTail(low, q, 0.5);
}
