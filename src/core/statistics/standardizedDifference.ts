import { normalCdf } from './normalDistribution.ts';

export interface StandardizedDifference {
  /** Mean of the two neighbours. */
  readonly expected: number;
  /** By Burgstahler & Dichev's variance, which takes neighbouring counts as independent; null without spread. */
  readonly zIndependent: number | null;
  /** By the exact multinomial variance; null without spread. */
  readonly zMultinomial: number | null;
}

/**
 * How far a bin's count lies from the mean of its two neighbours, in standard deviations: V = N p(1 - p) + N/4 (p₋ +
 * p₊)(1 - p₋ - p₊), to which the multinomial adds N p (p₋ + p₊). Three empty bins have no z, neither 0 nor infinite.
 *
 * `n` counts all observations, those in no bin too. Source: methods.md Part C 1.1; Burgstahler & Dichev (1997, Journal
 * of Accounting and Economics 24:99-126).
 *
 * @example standardizedDifference({ previous: 409, at: 459, next: 550, n: 16018 }).zIndependent // => -0.79125…
 */
export function standardizedDifference({
  previous,
  at,
  next,
  n,
}: {
  readonly previous: number;
  readonly at: number;
  readonly next: number;
  readonly n: number;
}): StandardizedDifference {
  const expected = (previous + next) / 2;
  const p = at / n;
  const besides = (previous + next) / n;
  const independent = n * p * (1 - p) + (n / 4) * besides * (1 - besides);
  const multinomial = independent + n * p * besides;
  return {
    expected,
    zIndependent: independent > 0 ? (at - expected) / Math.sqrt(independent) : null,
    zMultinomial: multinomial > 0 ? (at - expected) / Math.sqrt(multinomial) : null,
  };
}

/** Counts of the four bins around a cut-off, outermost left first. */
export interface FourBins {
  readonly farLeft: number;
  readonly left: number;
  readonly right: number;
  readonly farRight: number;
}

export interface FourBinContrast {
  readonly difference: number;
  readonly variance: number;
  /** Null without spread. */
  readonly z: number | null;
  /** One-sided: that the right bin has more than a straight line through the four would give it; null without z. */
  readonly pValue: number | null;
}

/**
 * Both sides of a cut-off in one contrast: (right - left) - (far right - far left)/3, with its multinomial variance.
 * The two standardized differences are correlated by -2/3 and are not two pieces of evidence; this one is.
 *
 * Source: methods.md Part C 1.3 (own derivation).
 *
 * @example fourBinContrast({ farLeft: 409, left: 459, right: 550, farRight: 533 }, 16018).z // => 1.48839…
 */
export function fourBinContrast(bins: FourBins, n: number): FourBinContrast {
  const difference = bins.right - bins.left - (bins.farRight - bins.farLeft) / 3;
  const squares = bins.right + bins.left + (bins.farRight + bins.farLeft) / 9;
  const variance = squares - difference ** 2 / n;
  const z = variance > 0 ? difference / Math.sqrt(variance) : null;
  return { difference, variance, z, pValue: z === null ? null : normalCdf(-z) };
}
