import distribution from '@stdlib/stats-base-dists-binomial-cdf';
import probability from '@stdlib/stats-base-dists-binomial-pmf';

/**
 * Probability of at most `successes` out of `trials`.
 *
 * @example binomialLowerTail(1, 2, 0.5) // => 0.75
 */
export function binomialLowerTail(successes: number, trials: number, share: number): number {
  if (successes < 0) return 0;
  return successes >= trials ? 1 : distribution(successes, trials, share);
}

/**
 * Probability of at least `successes` out of `trials`: the lower tail of the failures, so that a small probability
 * keeps its digits.
 *
 * @example binomialUpperTail(2, 2, 0.5) // => 0.25
 */
export const binomialUpperTail = (successes: number, trials: number, share: number): number =>
  binomialLowerTail(trials - successes, trials, 1 - share);

export type Alternative = 'greater' | 'less' | 'two-sided';

export interface ExactBinomial {
  readonly estimate: number;
  readonly pValue: number;
  readonly n: number;
  readonly alternative: Alternative;
  readonly method: 'exact binomial';
}

/**
 * Exact binomial test of a share. Two-sided, it adds the probabilities of all counts that are no likelier than the
 * one seen (as R's binom.test and scipy's binomtest do).
 *
 * Throws RangeError unless 0 <= successes <= trials and trials >= 1.
 *
 * @example exactBinomial(7, 8, 0.5, 'greater').pValue // => 0.03515625
 */
export function exactBinomial(
  successes: number,
  trials: number,
  share: number,
  alternative: Alternative,
): ExactBinomial {
  if (trials < 1 || successes < 0 || successes > trials)
    throw new RangeError('exactBinomial needs at least one trial and no more successes than trials');
  return {
    estimate: successes / trials,
    pValue: pValueOf(successes, trials, share, alternative),
    n: trials,
    alternative,
    method: 'exact binomial',
  };
}

function pValueOf(successes: number, trials: number, share: number, alternative: Alternative): number {
  switch (alternative) {
    case 'greater':
      return binomialUpperTail(successes, trials, share);
    case 'less':
      return binomialLowerTail(successes, trials, share);
    case 'two-sided':
      return twoSided(successes, trials, share);
  }
}

/** Probabilities that differ by rounding only count as equal. */
const EQUAL_WITHIN = 1 + 1e-7;

function twoSided(successes: number, trials: number, share: number): number {
  const limit = probability(successes, trials, share) * EQUAL_WITHIN;
  const isNoLikelier = (count: number): boolean => probability(count, trials, share) <= limit;
  if (successes < trials * share) {
    let from = Math.ceil(trials * share);
    while (from <= trials && !isNoLikelier(from)) from += 1;
    return binomialLowerTail(successes, trials, share) + binomialUpperTail(from, trials, share);
  }
  if (successes > trials * share) {
    let to = Math.floor(trials * share);
    while (to >= 0 && !isNoLikelier(to)) to -= 1;
    return binomialLowerTail(to, trials, share) + binomialUpperTail(successes, trials, share);
  }
  return 1;
}
