/** The explainable check beside the peers' figure: headroom that returns to its own mean. */
import type { Bound } from '../covenants/headroom.ts';
import { multivariateNormalCdf } from '../statistics/multivariateNormal.ts';
import { normalCdf } from '../statistics/normalDistribution.ts';

/** Neighbouring twelve-month figures share three quarters of four. */
export const PERSISTENCE = 0.75;
export const FEWEST_OWN_TESTS = 8;
const LAST_TESTS = 12;
/** Below it the tests never moved but for the last digit of a double. */
const LEAST_DEVIATION = 1e-9;

/**
 * Chance that headroom ends below nought after some quarters, were it to return to its mean with normal shocks: the
 * check beside the peers' figure. Headroom, mean, deviation and tightening are shares of the level; the deviation is
 * that of the series, not of its shocks; tightening is what scheduled steps take.
 *
 * Source: methods.md Part C 2.2 a.
 *
 * @example chanceByReversion({ headroom: 0.06, mean: 0.12, persistence: 0.75, deviation: 0.1, tightening: 0.05, quarters: 1 }) // => 0.35272…
 */
export function chanceByReversion(given: {
  readonly headroom: number;
  readonly mean: number;
  readonly persistence: number;
  readonly deviation: number;
  readonly tightening: number;
  readonly quarters: number;
}): number {
  const kept = given.persistence ** given.quarters;
  const expected = given.mean + kept * (given.headroom - given.mean) - given.tightening;
  return normalCdf(-expected / (given.deviation * Math.sqrt(1 - kept * kept)));
}

/**
 * The same with the mean and deviation of the covenant's own last twelve tests, headroom as shares of the level, oldest
 * first. Null below eight tests and where they never moved.
 *
 * @example chanceFromOwnTests([0.1, 0.2], { bound: 'most', ratio: 3, level: 3.5, levelAhead: 3.5, quarters: 1 }) // => null
 */
export function chanceFromOwnTests(
  headrooms: readonly number[],
  test: {
    readonly bound: Bound;
    readonly ratio: number;
    readonly level: number;
    readonly levelAhead: number;
    readonly quarters: number;
  },
): number | null {
  const last = headrooms.slice(-LAST_TESTS);
  if (last.length < FEWEST_OWN_TESTS) return null;
  const mean = last.reduce((sum, one) => sum + one, 0) / last.length;
  const deviation = Math.sqrt(last.reduce((sum, one) => sum + (one - mean) ** 2, 0) / (last.length - 1));
  if (deviation < LEAST_DEVIATION) return null;
  const [now, ahead] = [test.ratio / test.level, test.ratio / test.levelAhead];
  return chanceByReversion({
    headroom: test.bound === 'most' ? 1 - now : now - 1,
    mean,
    persistence: PERSISTENCE,
    deviation,
    tightening: test.bound === 'most' ? ahead - now : now - ahead,
    quarters: test.quarters,
  });
}

/**
 * Chance that at least one of up to three tests is not met next quarter: slacks as logs of ratio over level, and the
 * covariance of the ratios' quarterly log changes over the book.
 *
 * Source: methods.md Part C 2.2 b; Murfin (2012, Journal of Finance 67:1565-1601).
 *
 * @example chanceOfAnyNotMet([0], [[0.04]]) // => 0.5
 */
export const chanceOfAnyNotMet = (
  logSlacks: readonly number[],
  covariance: readonly (readonly number[])[],
): number => 1 - multivariateNormalCdf(logSlacks, covariance);
