import distribution from '@stdlib/stats-base-dists-chisquare-cdf';

/**
 * Probability that a chi-squared variable is at least `statistic`. Absolute accuracy of about 1e-15: far beyond that
 * it is 0.
 *
 * @example chiSquaredUpperTail(0, 8) // => 1
 */
export const chiSquaredUpperTail = (statistic: number, degreesOfFreedom: number): number =>
  1 - distribution(statistic, degreesOfFreedom);
