export interface PoissonBinomial {
  readonly mean: number;
  readonly variance: number;
  /** Probability of 0, 1, 2 … successes. */
  readonly probabilities: readonly number[];
  readonly n: number;
  readonly method: 'convolution';
}

/**
 * Number of successes in independent trials that each have a chance of their own, exactly, by convolution: n²/2
 * steps of positive terms. No package of the registry has it; Hong (2013, Computational Statistics & Data Analysis
 * 59) compares ways to compute it.
 *
 * @example poissonBinomial([0.5, 0.5]).probabilities // => [0.25, 0.5, 0.25]
 */
export function poissonBinomial(chances: readonly number[]): PoissonBinomial {
  const probabilities = new Array<number>(chances.length + 1).fill(0);
  probabilities[0] = 1;
  chances.forEach((chance, trial) => {
    for (let count = trial + 1; count > 0; count -= 1)
      probabilities[count] = probabilities[count]! * (1 - chance) + probabilities[count - 1]! * chance;
    probabilities[0] = probabilities[0]! * (1 - chance);
  });
  return {
    mean: chances.reduce((sum, chance) => sum + chance, 0),
    variance: chances.reduce((sum, chance) => sum + chance * (1 - chance), 0),
    probabilities,
    n: chances.length,
    method: 'convolution',
  };
}
